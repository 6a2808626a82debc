import { useEffect, useId, useRef, type ReactNode } from 'react';
import { Button } from './button';
import { classNames } from './class-names';

/**
 * A modal dialog on the browser's own <dialog>: focus goes in, stays in, and returns to where it was. Escape and
 * the close button call `onClose`; a press beside the dialog does nothing, because it would lose what was typed.
 */
export function Dialog({
  open,
  onClose,
  title,
  description,
  actions,
  size = 'md',
  children,
}: {
  open: boolean;
  onClose: () => void;
  title: string;
  description?: ReactNode;
  /** Buttons below the content. */
  actions?: ReactNode;
  size?: 'md' | 'lg';
  children?: ReactNode;
}) {
  const ref = useRef<HTMLDialogElement>(null);
  const titleId = useId();
  useEffect(() => {
    const dialog = ref.current;
    if (dialog === null) return;
    if (open && !dialog.open) dialog.showModal();
    if (!open && dialog.open) dialog.close();
  }, [open]);

  return (
    <dialog
      ref={ref}
      aria-labelledby={titleId}
      onCancel={(event) => {
        if (event.target !== ref.current) return;
        event.preventDefault();
        onClose();
      }}
      className={classNames(
        'm-auto max-h-[min(92dvh,56rem)] w-[calc(100%-1.5rem)] border border-edge bg-raised p-0 text-ink',
        size === 'lg' ? 'max-w-3xl' : 'max-w-lg',
      )}
    >
      {open && (
        <div className="grid gap-4 p-4 sm:p-6">
          <div className="flex items-start justify-between gap-4">
            <h2 id={titleId} className="text-lg font-bold">
              {title}
            </h2>
            <Button kind="quiet" size="sm" onClick={onClose} aria-label="Close">
              <span aria-hidden="true">✕</span>
            </Button>
          </div>
          {description !== undefined && <div className="prose-serif">{description}</div>}
          {children}
          {actions !== undefined && <div className="flex flex-wrap justify-end gap-2">{actions}</div>}
        </div>
      )}
    </dialog>
  );
}
