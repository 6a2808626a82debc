import { useEffect, useId, useRef, useState, type ReactNode } from 'react';
import { buttonLook, type ButtonKind, type ButtonSize } from './button-look';
import { classNames } from './class-names';

/** A button that opens a small panel below it; Escape or a press elsewhere closes it. */
export function Popover({
  label,
  ariaLabel,
  align = 'start',
  kind = 'plain',
  size = 'md',
  children,
}: {
  label: ReactNode;
  /** Name of button and panel when `label` is not text enough. */
  ariaLabel?: string;
  align?: 'start' | 'end';
  kind?: ButtonKind;
  size?: ButtonSize;
  children: (close: () => void) => ReactNode;
}) {
  const [open, setOpen] = useState(false);
  const root = useRef<HTMLDivElement>(null);
  const panelId = useId();
  const buttonId = `${panelId}-button`;
  useEffect(() => {
    if (!open) return;
    const onPress = (event: PointerEvent) => {
      if (event.target instanceof Node && root.current?.contains(event.target) !== true) setOpen(false);
    };
    document.addEventListener('pointerdown', onPress);
    return () => document.removeEventListener('pointerdown', onPress);
  }, [open]);

  const close = () => {
    setOpen(false);
    document.getElementById(buttonId)?.focus();
  };
  return (
    <div
      ref={root}
      className="relative"
      onKeyDown={(event) => {
        if (event.key !== 'Escape' || !open) return;
        event.stopPropagation();
        close();
      }}
      onBlur={(event) => {
        if (event.relatedTarget !== null && !event.currentTarget.contains(event.relatedTarget))
          setOpen(false);
      }}
    >
      <button
        id={buttonId}
        type="button"
        aria-expanded={open}
        aria-controls={open ? panelId : undefined}
        aria-label={ariaLabel}
        onClick={() => setOpen(!open)}
        className={classNames(buttonLook(kind, size), 'max-w-full')}
      >
        <span className="truncate">{label}</span>
        <span aria-hidden="true" className="text-xs text-muted">
          {open ? '▴' : '▾'}
        </span>
      </button>
      {open && (
        <div
          id={panelId}
          ref={keepInView}
          className={classNames(
            'absolute top-full z-40 mt-1 max-h-[70dvh] w-max max-w-[min(22rem,92vw)] min-w-full overflow-auto border border-edge bg-raised p-3',
            align === 'end' ? 'right-0' : 'left-0',
          )}
        >
          {children(close)}
        </div>
      )}
    </div>
  );
}

const EDGE_PX = 8;

/** Shifts a panel that would reach beyond the left or right edge of the window. */
function keepInView(panel: HTMLElement | null): void {
  if (panel === null) return;
  const { left, right } = panel.getBoundingClientRect();
  const widthPx = document.documentElement.clientWidth;
  const shift = left < EDGE_PX ? EDGE_PX - left : Math.min(0, widthPx - EDGE_PX - right);
  if (shift !== 0) panel.style.translate = `${shift}px 0`;
}
