import { Navigate, useParams, useSearchParams } from 'react-router-dom';
import type { RunDetail } from '../../../shared/schemas/run';
import { useGroup } from '../../api/use-group';
import { EmptyState } from '../../components/empty-state';
import { LinkButton } from '../../components/link-button';
import { Loading } from '../../components/loading';
import { Page } from '../../components/page';
import { ProblemNotice } from '../../components/problem-notice';
import { DESK_FILTER, type CandidateFilter } from '../../components/candidate-filter';
import { useCandidateFilter } from '../../components/use-candidate-filter';
import { useRun } from '../../api/runs';
import { Desk } from './desk';
import { QueueEnd } from './queue-end';
import { seqOfSearch } from './queue-place';
import { useFirstSeq } from './use-desk';
import { useDeskSession, type DeskSession } from './use-desk-session';

/** The review desk of a run; the address names the filter of the queue and the candidate. */
export function DeskPage() {
  const group = useGroup();
  const number = Number(useParams().run);
  const run = useRun(group.slug, number);
  if (run.isPending)
    return <DeskSheet number={number} content={<Loading rows={8} label="Loading the desk" />} />;
  if (run.isError) {
    return (
      <DeskSheet
        number={number}
        content={<ProblemNotice problem={run.error} retry={() => void run.refetch()} />}
      />
    );
  }
  if (run.data.state !== 'done') return <DeskSheet number={number} content={<NothingYet run={run.data} />} />;
  return <DeskOfRun run={run.data} />;
}

function DeskSheet({ number, content }: { number: number; content: React.ReactNode }) {
  return <Page title={`Review of cross-match ${number}`}>{content}</Page>;
}

function NothingYet({ run }: { run: RunDetail }) {
  const waits = run.state === 'queued' || run.state === 'running';
  return (
    <EmptyState
      title={waits ? 'The cross-match is still at work' : 'This cross-match has no candidates'}
      actions={<LinkButton to={`../cross-match/${run.run}`}>To the cross-match</LinkButton>}
    >
      {waits
        ? 'Its candidates can be reviewed when it is done.'
        : 'It did not come to its end. Start it again from its page.'}
    </EmptyState>
  );
}

function DeskOfRun({ run }: { run: RunDetail }) {
  const { slug } = useGroup();
  const [search] = useSearchParams();
  const [filter, changeFilter] = useCandidateFilter(DESK_FILTER, ['seq']);
  const session = useDeskSession(slug, run.run);
  const seq = seqOfSearch(search);
  const queue = { run, filter, onFilter: changeFilter, session };
  return seq === null ? <FirstOfQueue {...queue} /> : <Desk {...queue} seq={seq} />;
}

/** Finds the first candidate under the filter and puts it into the address, so that it stays the one in sight. */
function FirstOfQueue({
  run,
  filter,
  onFilter,
  session,
}: {
  run: RunDetail;
  filter: CandidateFilter;
  onFilter: (change: Partial<CandidateFilter>) => void;
  session: DeskSession;
}) {
  const { slug } = useGroup();
  const [search] = useSearchParams();
  const first = useFirstSeq(slug, run.run, filter);
  if (first.isFetching) {
    return (
      <DeskSheet number={run.run} content={<Loading rows={8} label="Looking for the first candidate" />} />
    );
  }
  if (first.isError) {
    return (
      <DeskSheet
        number={run.run}
        content={<ProblemNotice problem={first.error} retry={() => void first.refetch()} />}
      />
    );
  }
  if (first.data === null || first.data === undefined) {
    return <QueueEnd run={run} filter={filter} onFilter={onFilter} session={session} />;
  }
  const at = new URLSearchParams(search);
  at.set('seq', String(first.data));
  return <Navigate replace to={{ search: at.toString() }} />;
}
