import { useCallback } from 'react';
import { useQueryClient } from '@tanstack/react-query';
import { useParams } from 'react-router-dom';
import type { RunDetail } from '../../../shared/schemas/run';
import { keys } from '../../api/query-keys';
import { useGroup } from '../../api/use-group';
import { EmptyState } from '../../components/empty-state';
import { JobCard } from '../../components/job-card';
import { LinkButton } from '../../components/link-button';
import { Loading } from '../../components/loading';
import { Page } from '../../components/page';
import { ProblemNotice } from '../../components/problem-notice';
import { formatSepArcsec } from '../../components/quantities';
import { Stamp } from '../../components/stamp';
import { TabPanel, Tabs } from '../../components/tabs';
import { useUrlChoice } from '../../components/use-url-choice';
import { CandidateTable } from './candidate-table';
import { DESK_FILTER, deskAddress } from '../../components/candidate-filter';
import { Diagnosis } from './diagnosis';
import { RunMargin } from './run-margin';
import { againAddress, runName } from '../../components/run-words';
import { useRun } from '../../api/runs';
import { VerdictFigures } from './verdict-figures';

const TABS = ['diagnosis', 'candidates'] as const;

/** One cross-match: its job while it runs, then diagnosis, policy and candidates. */
export function RunPage() {
  const group = useGroup();
  const number = Number(useParams().run);
  const run = useRun(group.slug, number);
  if (run.isPending) {
    return (
      <Page title={`Cross-match ${number}`}>
        <Loading rows={6} label="Loading the cross-match" />
      </Page>
    );
  }
  if (run.isError) {
    return (
      <Page title="Cross-match">
        <ProblemNotice problem={run.error} retry={() => void run.refetch()} />
      </Page>
    );
  }
  return <RunView run={run.data} />;
}

function RunView({ run }: { run: RunDetail }) {
  const group = useGroup();
  return (
    <Page
      title={runName(run)}
      heading={`Cross-match ${run.run}`}
      lead={
        <span className="flex flex-wrap items-center gap-x-4 gap-y-1">
          {run.title !== '' && <span className="text-ink">{run.title}</span>}
          {run.catalogues.map((catalogue) => (
            <Stamp key={catalogue.label} catalogue={catalogue} withLabel size={20} />
          ))}
          <span>within {formatSepArcsec(run.radiusArcsec)}</span>
        </span>
      }
      actions={
        <>
          {group.can('curator') && (
            <LinkButton to={`../${againAddress(run)}`}>Again with other settings</LinkButton>
          )}
          {run.state === 'done' && run.verdicts.undecided > 0 && (
            <LinkButton kind="main" to={`../${deskAddress(run.run, DESK_FILTER)}`}>
              Review
            </LinkButton>
          )}
        </>
      }
      margin={<RunMargin run={run} />}
    >
      {run.state === 'done' ? <RunResult run={run} /> : <RunJob run={run} />}
    </Page>
  );
}

function RunJob({ run }: { run: RunDetail }) {
  const { slug } = useGroup();
  const client = useQueryClient();
  const onFinished = useCallback(() => {
    void client.invalidateQueries({ queryKey: keys.runs(slug) });
    void client.invalidateQueries({ queryKey: keys.today(slug) });
  }, [client, slug]);
  return (
    <>
      <JobCard group={slug} jobId={run.jobId} onFinished={onFinished} />
      {run.state === 'failed' && (
        <p className="max-w-prose">
          This cross-match has no candidates. Start it again with other settings; nothing else has changed.
        </p>
      )}
      {run.state === 'cancelled' && (
        <p className="max-w-prose">
          This cross-match was cancelled before it ended. It keeps its number and has no candidates.
        </p>
      )}
    </>
  );
}

function RunResult({ run }: { run: RunDetail }) {
  const group = useGroup();
  const [tab, setTab] = useUrlChoice('tab', TABS, 'diagnosis');
  if (run.candidates === 0) {
    return (
      <EmptyState
        title="No two sources are this close"
        actions={
          group.can('curator') && (
            <LinkButton to={`../${againAddress(run)}`}>Again with a larger radius</LinkButton>
          )
        }
      >
        No pair of sources lies within {formatSepArcsec(run.radiusArcsec)}. Look at the coverage of the
        catalogues: do they overlap on the sky, and are all positions in degrees of the same frame?
      </EmptyState>
    );
  }
  return (
    <>
      <VerdictFigures run={run} />
      <div>
        <Tabs
          label="Parts of the cross-match"
          current={tab}
          onChange={setTab}
          tabs={[
            { id: 'diagnosis', label: 'Separations and policy' },
            { id: 'candidates', label: 'Candidates', count: run.candidates },
          ]}
        />
        <TabPanel id="diagnosis" current={tab}>
          <Diagnosis run={run} />
        </TabPanel>
        <TabPanel id="candidates" current={tab}>
          <CandidateTable run={run} />
        </TabPanel>
      </div>
    </>
  );
}
