import { useQuery } from '@tanstack/react-query';
import type { RunDetail } from '../../../shared/schemas/run';
import { useGroup } from '../../api/use-group';
import { LinkButton } from '../../components/link-button';
import { Loading } from '../../components/loading';
import { Page } from '../../components/page';
import { ProblemNotice } from '../../components/problem-notice';
import type { CandidateFilter } from '../../components/candidate-filter';
import { DeskHeading, QueueTools } from './desk-heading';
import { DeskMargin } from './desk-margin';
import { DeskView } from './desk-view';
import { GivenStrip } from './given-strip';
import { NextTask } from './next-task';
import { taskQuery } from './use-desk';
import type { DeskSession } from './use-desk-session';

/** One candidate of the queue. */
export function Desk({
  run,
  seq,
  filter,
  onFilter,
  session,
}: {
  run: RunDetail;
  seq: number;
  filter: CandidateFilter;
  onFilter: (change: Partial<CandidateFilter>) => void;
  session: DeskSession;
}) {
  const { slug } = useGroup();
  const task = useQuery(taskQuery(slug, run.run, seq, filter));
  return (
    <Page
      title={`Candidate ${seq} of cross-match ${run.run}`}
      heading={<DeskHeading seq={seq} task={task.data} />}
      lead={`Cross-match ${run.run}${run.title === '' ? '' : `, ${run.title}`}`}
      actions={<QueueTools run={run} filter={filter} onFilter={onFilter} />}
      margin={task.data !== undefined && <DeskMargin task={task.data} run={run} />}
    >
      <GivenStrip verdicts={session.verdicts} goTo={session.goTo} />
      {task.isPending && <Loading rows={10} label={`Loading candidate ${seq}`} />}
      {task.isError && task.data === undefined && (
        <div className="grid justify-items-start gap-3">
          <ProblemNotice problem={task.error} retry={() => void task.refetch()} />
          <LinkButton to={{ search: '' }}>First undecided</LinkButton>
        </div>
      )}
      {task.data !== undefined && (
        <>
          <DeskView key={seq} run={run} task={task.data} filter={filter} session={session} />
          {task.data.nextSeq !== null && (
            <NextTask key={task.data.nextSeq} query={taskQuery(slug, run.run, task.data.nextSeq, filter)} />
          )}
        </>
      )}
    </Page>
  );
}
