import type { ReactNode } from 'react';
import { classNames } from './class-names';

export type Tone = 'plain' | 'good' | 'warn' | 'bad' | 'accent';

const TONES: Record<Tone, string> = {
  plain: 'border-edge text-ink',
  good: 'border-good text-good',
  warn: 'border-warn text-warn',
  bad: 'border-bad text-bad',
  accent: 'border-accent text-accent',
};

/** A short state in words; tone and sign only repeat what the words say. */
export function StatusChip({
  tone = 'plain',
  icon,
  children,
}: {
  tone?: Tone;
  icon?: string;
  children: ReactNode;
}) {
  return (
    <span
      className={classNames(
        'inline-flex items-center gap-1.5 rounded-sm border px-1.5 text-xs whitespace-nowrap',
        TONES[tone],
      )}
    >
      {icon !== undefined && <span aria-hidden="true">{icon}</span>}
      {children}
    </span>
  );
}
