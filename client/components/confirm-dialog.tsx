import type { ReactNode } from 'react';
import { Button } from './button';
import { Dialog } from './dialog';
import { ProblemNotice } from './problem-notice';

/** Asks before something is done; the children say what will change, in numbers. */
export function ConfirmDialog({
  open,
  onClose,
  title,
  confirmLabel,
  onConfirm,
  busy = false,
  problem = null,
  kind = 'bad',
  children,
}: {
  open: boolean;
  onClose: () => void;
  title: string;
  confirmLabel: string;
  onConfirm: () => void;
  busy?: boolean;
  problem?: unknown;
  kind?: 'bad' | 'main';
  children: ReactNode;
}) {
  return (
    <Dialog
      open={open}
      onClose={onClose}
      title={title}
      description={children}
      actions={
        <>
          <Button onClick={onClose}>Leave it</Button>
          <Button kind={kind} busy={busy} onClick={onConfirm}>
            {confirmLabel}
          </Button>
        </>
      }
    >
      {problem !== null && problem !== undefined && <ProblemNotice problem={problem} />}
    </Dialog>
  );
}
