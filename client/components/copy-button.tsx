import { useEffect, useState } from 'react';
import { Button } from './button';
import type { ButtonKind, ButtonSize } from './button-look';
import { copyText } from './copy-text';

const TOLD_MS = 1800;

/** Copies text and says that it did. */
export function CopyButton({
  text,
  label = 'Copy',
  ariaLabel,
  kind = 'plain',
  size = 'sm',
}: {
  text: string | (() => string);
  label?: string;
  ariaLabel?: string;
  kind?: ButtonKind;
  size?: ButtonSize;
}) {
  const [told, setTold] = useState<'copied' | 'not copied' | null>(null);
  useEffect(() => {
    if (told === null) return;
    const timer = setTimeout(() => setTold(null), TOLD_MS);
    return () => clearTimeout(timer);
  }, [told]);
  const copy = async () => {
    const done = await copyText(typeof text === 'string' ? text : text());
    setTold(done ? 'copied' : 'not copied');
  };
  return (
    <>
      <Button kind={kind} size={size} aria-label={ariaLabel} onClick={() => void copy()}>
        {told === null ? label : told === 'copied' ? 'Copied' : 'Not copied'}
      </Button>
      <span role="status" className="sr-only">
        {told ?? ''}
      </span>
    </>
  );
}
