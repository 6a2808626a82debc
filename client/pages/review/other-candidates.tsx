import { Link, useSearchParams } from 'react-router-dom';
import type { Candidate, DeskTask } from '../../../shared/schemas/run';
import { formatFixed, formatSepArcsec } from '../../components/quantities';
import { CandidateVerdict, SideName } from '../../components/candidate-parts';
import { HeadCell } from '../../components/head-cell';
import { withSeq } from './queue-place';

/** What else the run found for A and for B, the closest first. */
export function OtherCandidates({ task: { candidate, others } }: { task: DeskTask }) {
  const [search] = useSearchParams();
  if (others.length === 0)
    return <p className="text-muted">None: neither has another candidate in this run.</p>;
  return (
    <div
      className="overflow-x-auto"
      tabIndex={0}
      role="region"
      aria-label="Other candidates of either source"
    >
      <table className="w-full border-collapse">
        <thead>
          <tr className="border-b border-edge text-left text-xs text-muted">
            <HeadCell>No.</HeadCell>
            <HeadCell>Of</HeadCell>
            <HeadCell>With</HeadCell>
            <HeadCell right>Separation</HeadCell>
            <HeadCell right>PA °</HeadCell>
            <HeadCell>Verdict</HeadCell>
          </tr>
        </thead>
        <tbody>
          {others.map((other) => {
            const { letter, partner } = roleOf(other, candidate);
            return (
              <tr key={other.seq} className="border-b border-rule">
                <td className="py-1 pr-4">
                  <Link
                    to={{ search: withSeq(search, other.seq).toString() }}
                    preventScrollReset
                    className="text-link"
                    aria-label={`Candidate ${other.seq}`}
                  >
                    {other.seq}
                  </Link>
                </td>
                <td className="py-1 pr-4 font-bold text-accent">{letter}</td>
                <td className="py-1 pr-4 whitespace-nowrap">
                  <SideName side={partner} />
                </td>
                <td className="py-1 pr-4 text-right whitespace-nowrap">{formatSepArcsec(other.sepArcsec)}</td>
                <td className="py-1 pr-4 text-right">
                  {other.paDeg === null ? '–' : formatFixed(other.paDeg, 1)}
                </td>
                <td className="py-1">
                  <CandidateVerdict verdict={other.verdict} />
                </td>
              </tr>
            );
          })}
        </tbody>
      </table>
    </div>
  );
}

/** Which of the pair's sources another candidate shares, and its source on the other side. */
function roleOf(other: Candidate, { a, b }: Candidate): { letter: 'A' | 'B'; partner: Candidate['a'] } {
  if (other.a.entryId === a.entryId) return { letter: 'A', partner: other.b };
  if (other.b.entryId === a.entryId) return { letter: 'A', partner: other.a };
  return { letter: 'B', partner: other.a.entryId === b.entryId ? other.b : other.a };
}
