import type { Candidate } from '../../shared/schemas/run';
import { Stamp } from './stamp';
import { VerdictMark } from './verdict-mark';

/** Stamp and designation of one side of a candidate. */
export function SideName({ side }: { side: Candidate['a'] }) {
  return (
    <span
      className="flex max-w-full min-w-0 items-center gap-1.5"
      title={`${side.catalogue}: ${side.designation}`}
    >
      <Stamp catalogue={{ label: side.catalogue, ordinal: side.ordinal }} size={20} />
      <span className="truncate">{side.designation}</span>
    </span>
  );
}

/** The verdict in force on a candidate, or that there is none. */
export function CandidateVerdict({ verdict }: { verdict: Candidate['verdict'] }) {
  return (
    <VerdictMark
      value={verdict?.value ?? null}
      grade={verdict?.grade}
      automatic={verdict?.origin === 'policy'}
    />
  );
}
