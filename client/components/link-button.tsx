import type { ComponentProps } from 'react';
import { Link } from 'react-router-dom';
import { buttonLook, type ButtonKind, type ButtonSize } from './button-look';
import { classNames } from './class-names';

interface Look {
  kind?: ButtonKind;
  size?: ButtonSize;
}

/** A link to a place of the application that looks like a button. */
export function LinkButton({ kind, size, className, ...rest }: ComponentProps<typeof Link> & Look) {
  return <Link {...rest} className={classNames(buttonLook(kind, size), 'hover:border-ink', className)} />;
}

/** A plain link that starts a download and looks like a button. */
export function DownloadLink({ kind, size, className, ...rest }: ComponentProps<'a'> & Look) {
  return (
    <a download {...rest} className={classNames(buttonLook(kind, size), 'hover:border-ink', className)} />
  );
}
