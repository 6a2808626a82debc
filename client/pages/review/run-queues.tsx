import { Link } from 'react-router-dom';
import type { RunDetail, RunSummary } from '../../../shared/schemas/run';
import { useGroup } from '../../api/use-group';
import { LinkButton } from '../../components/link-button';
import { Loading } from '../../components/loading';
import { ProblemNotice } from '../../components/problem-notice';
import { formatCount, formatSepArcsec, plural } from '../../components/quantities';
import { Stamp } from '../../components/stamp';
import { StatusChip } from '../../components/status-chip';
import { deskAddress, NO_FILTER, type CandidateFilter } from '../../components/candidate-filter';
import { useRun } from '../../api/runs';

/** The queues of one cross-match, each with its number and the way to the desk. */
export function RunQueues({
  summary,
  crowded,
}: {
  summary: RunSummary;
  /** Undecided crowded candidates; null while not known. */
  crowded: number | null;
}) {
  const { slug } = useGroup();
  const run = useRun(slug, summary.run);
  const undecided = run.data?.verdicts.undecided ?? 0;
  return (
    <article
      aria-label={`Cross-match ${summary.run}`}
      className="grid gap-3 border border-rule bg-raised p-4"
    >
      <div className="flex flex-wrap items-start justify-between gap-x-6 gap-y-2">
        <div className="grid gap-1">
          <h3 className="font-bold">
            <Link to={`../cross-match/${summary.run}`}>Cross-match {summary.run}</Link>
            {summary.title !== '' && `: ${summary.title}`}
          </h3>
          <p className="flex flex-wrap items-center gap-x-3 gap-y-1 text-muted">
            {summary.catalogues.map((catalogue) => (
              <Stamp key={catalogue.label} catalogue={catalogue} withLabel size={18} />
            ))}
            <span>within {formatSepArcsec(summary.radiusArcsec)}</span>
            <span>{plural(summary.candidates, 'candidate', 'candidates')}</span>
          </p>
        </div>
        {run.data !== undefined &&
          (undecided > 0 ? (
            <LinkButton kind="main" to={`../${deskAddress(summary.run, NO_FILTER)}`}>
              Start
            </LinkButton>
          ) : (
            <StatusChip tone="good" icon="●">
              all decided
            </StatusChip>
          ))}
      </div>
      {run.isPending && <Loading rows={1} label={`Loading the queues of cross-match ${summary.run}`} />}
      {run.isError && <ProblemNotice problem={run.error} retry={() => void run.refetch()} />}
      {run.data !== undefined && <QueueList run={run.data} crowded={crowded} />}
    </article>
  );
}

function QueueList({ run, crowded }: { run: RunDetail; crowded: number | null }) {
  const { verdicts } = run;
  const people = verdicts.same + verdicts.different + verdicts.unsure - verdicts.automatic;
  return (
    <ul className="grid gap-x-8 gap-y-1 sm:grid-cols-2">
      <Queue run={run.run} name="undecided" count={verdicts.undecided} filter={{ verdict: 'undecided' }} />
      <Queue
        run={run.run}
        name="of them crowded"
        count={crowded}
        filter={{ verdict: 'undecided', kind: 'crowded' }}
      />
      <Queue run={run.run} name="unsure" count={verdicts.unsure} filter={{ verdict: 'unsure' }} />
      <Queue run={run.run} name="different" count={verdicts.different} filter={{ verdict: 'different' }} />
      <Queue run={run.run} name="same" count={verdicts.same} filter={{ verdict: 'same' }} />
      <li className="flex gap-3">
        <span className="min-w-14 text-right">{formatCount(verdicts.automatic)}</span>
        <span>
          decided by{' '}
          {verdicts.automatic > 0 ? <Link to={`../cross-match/${run.run}`}>policy</Link> : 'policy'},{' '}
          {formatCount(people)} by people
        </span>
      </li>
    </ul>
  );
}

function Queue({
  run,
  name,
  count,
  filter,
}: {
  run: number;
  name: string;
  count: number | null;
  filter: Partial<CandidateFilter>;
}) {
  return (
    <li className="flex gap-3">
      <span className="min-w-14 text-right">{count === null ? '…' : formatCount(count)}</span>
      {count === 0 ? (
        <span className="text-muted">{name}</span>
      ) : (
        <Link to={`../${deskAddress(run, { ...NO_FILTER, ...filter })}`}>{name}</Link>
      )}
    </li>
  );
}
