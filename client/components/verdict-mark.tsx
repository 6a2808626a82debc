import type { Grade, VerdictValue } from '../../shared/words';

type Shown = VerdictValue | 'undecided';

/** Strokes in a 16 by 16 box: two lines alike, the same struck through, a question mark, an open dash. */
const SIGNS: Record<Shown, string> = {
  same: 'M3 6H13M3 10H13',
  different: 'M3 6H13M3 10H13M10.5 2.5L5.5 13.5',
  unsure: 'M5 5.6C5 2.4 11 2.4 11 5.6C11 8 8 7.8 8 10.4M8 12.6V13.6',
  undecided: 'M4 8H6M7 8H9M10 8H12',
};

const TONES: Record<Shown, string> = {
  same: 'text-good',
  different: 'text-bad',
  unsure: 'text-warn',
  undecided: 'text-muted',
};

/** A verdict as sign and word, with its grade and whether a policy gave it. `null` is 'undecided'. */
export function VerdictMark({
  value,
  grade = null,
  automatic = false,
}: {
  value: VerdictValue | null;
  grade?: Grade | null;
  automatic?: boolean;
}) {
  const shown: Shown = value ?? 'undecided';
  return (
    <span className="inline-flex items-center gap-1.5 whitespace-nowrap">
      <span className={`inline-flex items-center gap-1.5 ${TONES[shown]}`}>
        <VerdictSign value={shown} />
        {shown}
      </span>
      {grade !== null && <span className="text-muted">{grade}</span>}
      {automatic && <span className="border-b border-dotted border-edge text-muted">automatic</span>}
    </span>
  );
}

/** The sign alone, for beside a word that is written elsewhere (buttons). */
export function VerdictSign({ value, size = 16 }: { value: Shown; size?: number }) {
  return (
    <svg viewBox="0 0 16 16" width={size} height={size} aria-hidden="true" className="shrink-0">
      <path d={SIGNS[value]} fill="none" stroke="currentColor" strokeWidth={2} strokeLinecap="round" />
    </svg>
  );
}
