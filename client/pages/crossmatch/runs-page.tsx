import { useCallback } from 'react';
import { useQueryClient } from '@tanstack/react-query';
import type { RunSummary } from '../../../shared/schemas/run';
import { keys } from '../../api/query-keys';
import { useGroup } from '../../api/use-group';
import { EmptyState } from '../../components/empty-state';
import { JobCard } from '../../components/job-card';
import { LinkButton } from '../../components/link-button';
import { Loading } from '../../components/loading';
import { MarginNote } from '../../components/margin';
import { Page } from '../../components/page';
import { ProblemNotice } from '../../components/problem-notice';
import { plural } from '../../components/quantities';
import { Section } from '../../components/section';
import { useReadyCatalogues } from './use-ready-catalogues';
import { RunTable } from './run-table';
import { useRuns } from '../../api/runs';

/** All cross-matches of the group. */
export function RunsPage() {
  const group = useGroup();
  const runs = useRuns(group.slug);
  const items = runs.data?.items ?? [];
  const start = group.can('curator') && (
    <LinkButton kind="main" to="new">
      New cross-match
    </LinkButton>
  );
  return (
    <Page
      title="Cross-match"
      lead="Catalogues compared on the sphere; every pair closer than the radius is a candidate."
      actions={items.length > 0 && start}
      margin={<ListNotes />}
    >
      {runs.isPending && <Loading rows={5} label="Loading the cross-matches" />}
      {runs.isError && <ProblemNotice problem={runs.error} retry={() => void runs.refetch()} />}
      {runs.isSuccess && items.length === 0 && <NoRuns start={start} />}
      {items.length > 0 && (
        <>
          <AtWork runs={items.filter((run) => run.state === 'queued' || run.state === 'running')} />
          <RunTable runs={items} />
        </>
      )}
    </Page>
  );
}

function AtWork({ runs }: { runs: readonly RunSummary[] }) {
  const { slug } = useGroup();
  const client = useQueryClient();
  const onFinished = useCallback(() => {
    void client.invalidateQueries({ queryKey: keys.runs(slug) });
    void client.invalidateQueries({ queryKey: keys.today(slug) });
  }, [client, slug]);
  if (runs.length === 0) return null;
  return (
    <Section title="At work">
      <div className="grid gap-3">
        {runs.map((run) => (
          <JobCard key={run.jobId} group={slug} jobId={run.jobId} onFinished={onFinished} />
        ))}
      </div>
    </Section>
  );
}

/** What to do next depends on how many catalogues can be compared. */
function NoRuns({ start }: { start: React.ReactNode }) {
  const group = useGroup();
  const ready = useReadyCatalogues(group.slug);
  if (ready.isPending) return <Loading label="Loading the catalogues" />;
  if (ready.isError) return <ProblemNotice problem={ready.error} retry={() => void ready.refetch()} />;
  if (ready.data.length < 2) {
    return (
      <EmptyState
        title="No cross-match yet"
        actions={<LinkButton to="../catalogues">To the catalogues</LinkButton>}
      >
        A cross-match compares two or more catalogues that have been imported.{' '}
        {ready.data.length === 0
          ? 'None is ready yet: add two.'
          : `One is ready (${ready.data[0]?.label ?? ''}): add another.`}
      </EmptyState>
    );
  }
  return (
    <EmptyState title="No cross-match yet" actions={start}>
      {plural(ready.data.length, 'catalogue is', 'catalogues are')} ready to be compared.{' '}
      {group.can('curator')
        ? 'Choose two of them and a radius; nothing is decided by that.'
        : 'A curator of the group can start a cross-match.'}
    </EmptyState>
  );
}

function ListNotes() {
  return (
    <>
      <MarginNote title="What a cross-match does">
        It lists every pair of sources closer than its radius, ranks them from either side, and measures how
        many such pairs chance alone would make. It decides nothing: verdicts come from people, or from a rule
        that a curator sets.
      </MarginNote>
      <MarginNote title="It stays as it was">
        A cross-match keeps the revisions of its catalogues, its radius and the version of the software. For
        other settings start another one; verdicts belong to the pair of sources and are seen in both.
      </MarginNote>
    </>
  );
}
