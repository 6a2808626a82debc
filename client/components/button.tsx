import type { ComponentProps } from 'react';
import { buttonLook, type ButtonKind, type ButtonSize } from './button-look';
import { classNames } from './class-names';

export interface ButtonProps extends ComponentProps<'button'> {
  kind?: ButtonKind;
  size?: ButtonSize;
  /** Work is going on: the button can't be pressed again and says so. */
  busy?: boolean;
  busyLabel?: string;
}

/** A button; `main` is for the one action a page is about, `bad` for what takes something away. */
export function Button({ kind, size, busy = false, busyLabel, className, children, ...rest }: ButtonProps) {
  return (
    <button
      type="button"
      {...rest}
      disabled={rest.disabled === true || busy}
      aria-busy={busy || undefined}
      className={classNames(buttonLook(kind, size), className)}
    >
      {busy ? (busyLabel ?? children) : children}
      {busy && <span aria-hidden="true">…</span>}
    </button>
  );
}
