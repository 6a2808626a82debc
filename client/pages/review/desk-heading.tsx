import type { DeskTask, RunDetail } from '../../../shared/schemas/run';
import { Popover } from '../../components/popover';
import { formatCount } from '../../components/quantities';
import { LinkButton } from '../../components/link-button';
import { DESK_FILTER, isNarrowed, type CandidateFilter } from '../../components/candidate-filter';
import { CandidateFilters } from '../../components/candidate-filters';
import { CandidateVerdict } from '../../components/candidate-parts';

/** Which candidate, how it stands, and how many wait. */
export function DeskHeading({ seq, task }: { seq: number; task: DeskTask | undefined }) {
  return (
    <span className="flex flex-wrap items-baseline gap-x-4 gap-y-1">
      Candidate {seq}
      {task !== undefined && (
        <span className="flex flex-wrap items-center gap-x-4 text-sm font-normal">
          <CandidateVerdict verdict={task.candidate.verdict} />
          <span className="text-muted">{formatCount(task.undecidedLeft)} undecided in this queue</span>
        </span>
      )}
    </span>
  );
}

/** The filter of the queue, and the way back to the list. */
export function QueueTools({
  run,
  filter,
  onFilter,
}: {
  run: RunDetail;
  filter: CandidateFilter;
  onFilter: (change: Partial<CandidateFilter>) => void;
}) {
  return (
    <>
      <Popover label={queueName(filter)} ariaLabel={`Filter of the queue: ${queueName(filter)}`}>
        {() => (
          <div className="w-[min(18rem,75vw)]">
            <CandidateFilters run={run} filter={filter} onChange={onFilter} />
          </div>
        )}
      </Popover>
      <LinkButton to={`../cross-match/${run.run}?tab=candidates`}>List</LinkButton>
    </>
  );
}

function queueName(filter: CandidateFilter): string {
  const verdict = filter.verdict === 'any' ? 'all' : filter.verdict;
  const kind = filter.kind === 'any' ? '' : `, ${filter.kind}`;
  const more = isNarrowed({ ...filter, verdict: DESK_FILTER.verdict, kind: DESK_FILTER.kind }, DESK_FILTER)
    ? ', narrowed'
    : '';
  return `Queue: ${verdict}${kind}${more}`;
}
