import type { RunDetail } from '../../../shared/schemas/run';
import { Button } from '../../components/button';
import { EmptyState } from '../../components/empty-state';
import { useKeys } from '../../components/keys';
import { LinkButton } from '../../components/link-button';
import { Page } from '../../components/page';
import { DESK_FILTER, isNarrowed, type CandidateFilter } from '../../components/candidate-filter';
import { CandidateFilters } from '../../components/candidate-filters';
import { GivenStrip } from './given-strip';
import { undoable } from './given-verdicts';
import type { DeskSession } from './use-desk-session';

/** No candidate is left under the filter: either all is decided, or the filter leaves everything out. */
export function QueueEnd({
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
  const canUndo = undoable(session.verdicts.given) !== null;
  useKeys([{ key: 'z', label: 'Take back the last verdict given here', action: session.verdicts.undo }], {
    enabled: canUndo,
  });
  const narrowed = isNarrowed(filter, DESK_FILTER);
  const toRun = <LinkButton to={`../cross-match/${run.run}`}>To the cross-match</LinkButton>;
  return (
    <Page title={`Review of cross-match ${run.run}`} lead={run.title}>
      <GivenStrip verdicts={session.verdicts} goTo={session.goTo} />
      {canUndo && (
        <div>
          <Button onClick={session.verdicts.undo}>Take back the last verdict (Z)</Button>
        </div>
      )}
      {narrowed ? (
        <>
          <CandidateFilters run={run} filter={filter} onChange={onFilter} />
          <EmptyState
            title="Nothing in this queue"
            actions={
              <>
                <Button kind="main" onClick={() => onFilter({ ...DESK_FILTER, order: filter.order })}>
                  All undecided
                </Button>
                {toRun}
              </>
            }
          >
            No candidate of this cross-match meets the conditions above.
          </EmptyState>
        </>
      ) : (
        <EmptyState
          title="Everything is decided"
          actions={
            <>
              <LinkButton kind="main" to="../review">
                Other queues
              </LinkButton>
              <Button onClick={() => onFilter({ verdict: 'unsure' })}>Those with &lsquo;unsure&rsquo;</Button>
              {toRun}
            </>
          }
        >
          Every candidate of this cross-match has a verdict. Any of them can be looked at again and decided
          anew.
        </EmptyState>
      )}
    </Page>
  );
}
