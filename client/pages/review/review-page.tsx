import { useGroup } from '../../api/use-group';
import { EmptyState } from '../../components/empty-state';
import { LinkButton } from '../../components/link-button';
import { Loading } from '../../components/loading';
import { MarginNote } from '../../components/margin';
import { Page } from '../../components/page';
import { ProblemNotice } from '../../components/problem-notice';
import { Section } from '../../components/section';
import { useRuns } from '../../api/runs';
import { ConflictSection } from './conflict-section';
import { RunQueues } from './run-queues';
import { useWaiting } from './use-review';

/** What people have to decide: queues by cross-match, and verdicts in conflict. */
export function ReviewPage() {
  const group = useGroup();
  const runs = useRuns(group.slug);
  const waiting = useWaiting(group.slug);
  const done = runs.data?.items.filter(({ state }) => state === 'done') ?? [];
  return (
    <Page
      title="Review"
      lead="Candidates that wait for a verdict, by cross-match."
      margin={
        <>
          <MarginNote title="The queues">
            <p>
              <em>Undecided</em>: nobody and no rule has said anything. <em>Crowded</em>: those of them that
              are not mutual best, or have rivals. <em>Unsure</em>: somebody looked and could not tell.
            </p>
            <p>The same pair in two cross-matches has one verdict: deciding it in one decides it in both.</p>
          </MarginNote>
          <MarginNote title="Conflicts">
            Objects follow from the verdicts: what is &lsquo;same&rsquo; hangs together, also through others.
            Where that would join two sources that a &lsquo;different&rsquo; verdict keeps apart, Idem does
            not guess: the &lsquo;same&rsquo; that would close the chain is not carried out and stands here.
          </MarginNote>
        </>
      }
    >
      <Section title="Queues">
        {runs.isPending && <Loading rows={4} label="Loading the queues" />}
        {runs.isError && <ProblemNotice problem={runs.error} retry={() => void runs.refetch()} />}
        {runs.isSuccess && done.length === 0 && (
          <EmptyState
            title="Nothing to review yet"
            actions={<LinkButton to="../cross-match">To the cross-matches</LinkButton>}
          >
            {runs.data.items.length === 0
              ? 'Candidates come from a cross-match of two catalogues; there is none yet.'
              : 'No cross-match has come to its end yet.'}
          </EmptyState>
        )}
        {done.length > 0 && waiting.isError && (
          <ProblemNotice problem={waiting.error} retry={() => void waiting.refetch()} />
        )}
        {done.map((run) => (
          <RunQueues
            key={run.run}
            summary={run}
            crowded={
              waiting.data === undefined
                ? null
                : (waiting.data.find((one) => one.run === run.run)?.crowded ?? 0)
            }
          />
        ))}
      </Section>
      <ConflictSection />
    </Page>
  );
}
