import { useRef } from 'react';
import type { DeskTask, RunDetail } from '../../../shared/schemas/run';
import { useGroup } from '../../api/use-group';
import { Section } from '../../components/section';
import { useKeys } from '../../components/keys';
import type { CandidateFilter } from '../../components/candidate-filter';
import { DeskChart } from './desk-chart-view';
import { deskKeysFor, type DeskAct } from './desk-keys';
import { isOnItsWay, undoable } from './given-verdicts';
import { OtherCandidates } from './other-candidates';
import { PairFacts } from './pair-facts';
import { onwardFrom, seqOfSearch } from './queue-place';
import { SourceComparison } from './source-comparison';
import type { DeskSession } from './use-desk-session';
import { VerdictBar } from './verdict-bar';
import { verdictOfDraft, withGrade, type VerdictDraft } from './verdict-draft';
import { VerdictDetails } from './verdict-details';

/** Chart, pair, verdict keys and the two sources of one candidate. */
export function DeskView({
  run,
  task,
  filter,
  session,
}: {
  run: RunDetail;
  task: DeskTask;
  filter: CandidateFilter;
  session: DeskSession;
}) {
  const mayDecide = useGroup().can('contributor');
  const { verdicts, goTo } = session;
  const remark = useRef<HTMLTextAreaElement>(null);
  const { candidate, nextSeq, previousSeq } = task;
  const { seq } = candidate;
  const draft = session.draftOf(seq);
  const onDraft = (changed: VerdictDraft | null) => session.setDraft(seq, changed);
  const busy = isOnItsWay(verdicts.given, seq);

  const act = (wanted: DeskAct) => {
    switch (wanted.kind) {
      case 'verdict': {
        if (busy) return;
        const onward = onwardFrom(nextSeq, filter.verdict);
        const body = verdictOfDraft(candidate, wanted.value, draft, run.run);
        // The first of a queue can only be asked for once this verdict counts, and only if nobody moved on meanwhile.
        const stillHere = () => seqOfSearch(new URLSearchParams(window.location.search)) === seq;
        verdicts.give(seq, body, onward.kind === 'first' ? () => stillHere() && goTo(null) : undefined);
        onDraft(null);
        if (onward.kind === 'candidate') goTo(onward.seq);
        return;
      }
      case 'grade':
        return onDraft(withGrade(draft, wanted.grade));
      case 'next':
        return goTo(nextSeq);
      case 'back':
        return previousSeq === null ? undefined : goTo(previousSeq);
      case 'undo':
        return verdicts.undo();
      case 'remark':
        return remark.current?.focus();
    }
  };
  useKeys(
    deskKeysFor(mayDecide).map(({ key, label, act: wanted }) => ({ key, label, action: () => act(wanted) })),
  );

  return (
    <div className="flex min-w-0 flex-col gap-6 wide:grid wide:grid-cols-[minmax(0,1fr)_18rem] wide:grid-rows-[auto_auto_1fr_auto] wide:gap-x-6">
      <div className="wide:col-span-2">
        <PairFacts candidate={candidate} radiusArcsec={run.radiusArcsec} />
      </div>
      <div className="min-w-0 wide:row-span-2">
        <DeskChart task={task} runRadiusArcsec={run.radiusArcsec} goTo={goTo} />
      </div>
      <VerdictBar
        mayDecide={mayDecide}
        busy={busy}
        canUndo={undoable(verdicts.given) !== null}
        atEnd={nextSeq === null}
        atStart={previousSeq === null}
        onAct={act}
      />
      <VerdictDetails
        mayDecide={mayDecide}
        draft={draft}
        onDraft={onDraft}
        onGrade={(grade) => act({ kind: 'grade', grade })}
        remarkRef={remark}
      />
      <div className="grid min-w-0 gap-6 wide:col-span-2">
        <Section title="The two sources">
          <SourceComparison task={task} />
        </Section>
        <Section title="Other candidates of either">
          <OtherCandidates task={task} />
        </Section>
      </div>
    </div>
  );
}
