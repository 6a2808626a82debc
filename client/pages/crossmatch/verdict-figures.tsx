import { Link } from 'react-router-dom';
import type { RunDetail } from '../../../shared/schemas/run';
import type { VerdictValue } from '../../../shared/words';
import { formatCount, formatShare } from '../../components/quantities';
import { VerdictMark } from '../../components/verdict-mark';
import { deskAddress, NO_FILTER } from '../../components/candidate-filter';

/** How far the candidates of a run are decided; each number leads to its queue. */
export function VerdictFigures({ run }: { run: RunDetail }) {
  const { verdicts, candidates } = run;
  const decided = candidates - verdicts.undecided;
  return (
    <div className="grid gap-2">
      <dl className="grid grid-cols-2 gap-4 sm:grid-cols-4">
        {([null, 'same', 'different', 'unsure'] as const).map((value) => (
          <Figure
            key={value ?? 'undecided'}
            run={run.run}
            value={value}
            count={verdicts[value ?? 'undecided']}
          />
        ))}
      </dl>
      <p className="text-muted">
        {formatCount(decided)} of {formatCount(candidates)} candidates decided
        {candidates > 0 && ` (${formatShare(decided / candidates)})`}, {formatCount(verdicts.automatic)} of
        them by policy.
      </p>
    </div>
  );
}

function Figure({ run, value, count }: { run: number; value: VerdictValue | null; count: number }) {
  const address = deskAddress(run, { ...NO_FILTER, verdict: value ?? 'undecided' });
  return (
    <div className="grid content-start border-l-2 border-rule pl-3">
      <dt className="order-2">
        <VerdictMark value={value} />
      </dt>
      <dd className="text-xl">
        {count === 0 ? (
          '0'
        ) : (
          <Link to={`../${address}`} className="text-ink no-underline hover:underline">
            {formatCount(count)}
          </Link>
        )}
      </dd>
    </div>
  );
}
