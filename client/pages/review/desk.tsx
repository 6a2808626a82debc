import { useState } from 'react';
import { useQuery } from '@tanstack/react-query';
import { useSearchParams } from 'react-router-dom';
import type { RunDetail } from '../../../shared/schemas/run';
import { useGroup } from '../../api/use-group';
import { LinkButton } from '../../components/link-button';
import { Loading } from '../../components/loading';
import { Page } from '../../components/page';
import { ProblemNotice } from '../../components/problem-notice';
import type { CandidateFilter } from '../crossmatch/candidate-filter';
import { DeskView } from './desk-view';
import { DeskHeading, QueueTools } from './desk-heading';
import { DeskMargin } from './desk-margin';
import { NextTask } from './next-task';
import { withSeq } from './queue-place';
import { taskQuery, useGivenVerdicts } from './use-desk';
import { EMPTY_DRAFT, type VerdictDraft } from './verdict-draft';

/** One candidate after the other: what was typed for each stays until it is sent. */
export function Desk({
  run,
  seq,
  filter,
  onFilter,
}: {
  run: RunDetail;
  seq: number;
  filter: CandidateFilter;
  onFilter: (change: Partial<CandidateFilter>) => void;
}) {
  const { slug } = useGroup();
  const [, setSearch] = useSearchParams();
  const [drafts, setDrafts] = useState<ReadonlyMap<number, VerdictDraft>>(new Map());
  const goTo = (next: number | null) =>
    setSearch((before) => withSeq(before, next), { preventScrollReset: true });
  const verdicts = useGivenVerdicts(slug, run.run, goTo);
  const query = taskQuery(slug, run.run, seq, filter);
  const task = useQuery(query);
  const setDraft = (draft: VerdictDraft | null) =>
    setDrafts((before) => {
      const after = new Map(before);
      if (draft === null) after.delete(seq);
      else after.set(seq, draft);
      return after;
    });
  return (
    <Page
      title={`Candidate ${seq} of cross-match ${run.run}`}
      heading={<DeskHeading seq={seq} task={task.data} />}
      lead={`Cross-match ${run.run}${run.title === '' ? '' : `, ${run.title}`}`}
      actions={<QueueTools run={run} filter={filter} onFilter={onFilter} />}
      margin={task.data !== undefined && <DeskMargin task={task.data} run={run} />}
    >
      {task.isPending && <Loading rows={10} label={`Loading candidate ${seq}`} />}
      {task.isError && task.data === undefined && (
        <div className="grid justify-items-start gap-3">
          <ProblemNotice problem={task.error} retry={() => void task.refetch()} />
          <LinkButton to={{ search: '' }}>First undecided</LinkButton>
        </div>
      )}
      {task.data !== undefined && (
        <>
          <DeskView
            key={seq}
            run={run}
            task={task.data}
            filter={filter}
            draft={drafts.get(seq) ?? EMPTY_DRAFT}
            onDraft={setDraft}
            verdicts={verdicts}
            goTo={goTo}
          />
          {task.data.nextSeq !== null && (
            <NextTask key={task.data.nextSeq} query={taskQuery(slug, run.run, task.data.nextSeq, filter)} />
          )}
        </>
      )}
    </Page>
  );
}
