import { useQueryClient } from '@tanstack/react-query';
import { useParams } from 'react-router-dom';
import type { CatalogueDetail } from '../../../shared/schemas/catalogue';
import { keys } from '../../api/query-keys';
import { useGroup } from '../../api/use-group';
import { CoverageMap } from '../../charts/coverage-map';
import { JobCard } from '../../components/job-card';
import { LinkButton } from '../../components/link-button';
import { Loading } from '../../components/loading';
import { MarginNote } from '../../components/margin';
import { Page } from '../../components/page';
import { ProblemNotice } from '../../components/problem-notice';
import { formatBytes, formatCount, formatSepArcsec } from '../../components/quantities';
import { RelativeTime } from '../../components/relative-time';
import { Section } from '../../components/section';
import { Stamp } from '../../components/stamp';
import { TabPanel, Tabs } from '../../components/tabs';
import { useUrlChoice } from '../../components/use-url-choice';
import { ColumnList } from './column-list';
import { SetAsideTable } from './set-aside-table';
import { SourceTable } from './source-table';
import { useCatalogue, useCoverage } from './use-catalogues';

const TABS = ['sources', 'columns', 'set-aside'] as const;

/** One catalogue: description, coverage, rows, columns, set-aside rows. */
export function CataloguePage() {
  const group = useGroup();
  const label = useParams().label ?? '';
  const catalogue = useCatalogue(group.slug, label);
  if (catalogue.isPending) {
    return (
      <Page title={label}>
        <Loading rows={6} label="Loading the catalogue" />
      </Page>
    );
  }
  if (catalogue.isError) {
    return (
      <Page title={label}>
        <ProblemNotice problem={catalogue.error} retry={() => void catalogue.refetch()} />
      </Page>
    );
  }
  return <CatalogueView group={group.slug} catalogue={catalogue.data} />;
}

function CatalogueView({ group, catalogue }: { group: string; catalogue: CatalogueDetail }) {
  const client = useQueryClient();
  const [tab, setTab] = useUrlChoice('tab', TABS, 'sources');
  const busy = catalogue.state === 'importing' || !catalogue.registered;
  return (
    <Page
      title={catalogue.label}
      heading={
        <span className="flex items-center gap-3">
          <Stamp catalogue={catalogue} size={28} />
          {catalogue.label}
        </span>
      }
      lead={catalogue.title}
      actions={catalogue.state === 'ready' && <LinkButton to="../cross-match/new">Cross-match</LinkButton>}
      margin={<Provenance catalogue={catalogue} />}
    >
      {busy && (
        <JobCard
          group={group}
          jobId={catalogue.jobId}
          onFinished={() => void client.invalidateQueries({ queryKey: keys.catalogues(group) })}
        />
      )}
      {catalogue.state === 'ready' && (
        <>
          <Facts group={group} catalogue={catalogue} />
          <Tabs
            label="Parts of the catalogue"
            current={tab}
            onChange={setTab}
            tabs={[
              { id: 'sources', label: 'Sources', count: catalogue.sources },
              { id: 'columns', label: 'Columns', count: catalogue.columns.length },
              { id: 'set-aside', label: 'Set aside', count: catalogue.setAside },
            ]}
          />
          <TabPanel id="sources" current={tab}>
            <SourceTable group={group} catalogue={catalogue} />
          </TabPanel>
          <TabPanel id="columns" current={tab}>
            <ColumnList columns={catalogue.columns} />
          </TabPanel>
          <TabPanel id="set-aside" current={tab}>
            <SetAsideTable group={group} catalogue={catalogue} />
          </TabPanel>
        </>
      )}
    </Page>
  );
}

function Facts({ group, catalogue }: { group: string; catalogue: CatalogueDetail }) {
  const coverage = useCoverage(group, catalogue.label, catalogue.state === 'ready');
  return (
    <Section title="At a glance">
      <div className="grid gap-6 sm:grid-cols-[minmax(12rem,1fr)_minmax(16rem,1.4fr)]">
        <div className="grid content-start gap-4">
          {catalogue.description !== '' && (
            <p className="font-serif text-base whitespace-pre-wrap">{catalogue.description}</p>
          )}
          <dl className="grid grid-cols-[auto_1fr] gap-x-4 gap-y-1">
            <Fact name="sources">{formatCount(catalogue.sources)}</Fact>
            <Fact name="set aside">
              {formatCount(catalogue.setAside)} of {formatCount(catalogue.rowsRead)} rows
            </Fact>
            <Fact name="band">{catalogue.band === '' ? '—' : catalogue.band}</Fact>
            <Fact name="epoch">{catalogue.epochYear === null ? 'not stated' : `J${catalogue.epochYear.toFixed(1)}`}</Fact>
            <Fact name="frame">{catalogue.frame}</Fact>
            <Fact name="median error">
              {catalogue.medianErrArcsec === null
                ? 'not stated'
                : `${formatSepArcsec(catalogue.medianErrArcsec)} (1σ per axis)`}
            </Fact>
            {coverage.data !== undefined && (
              <Fact name="covered">about {coverage.data.areaDeg2.toPrecision(3)} deg²</Fact>
            )}
          </dl>
        </div>
        {coverage.isPending && <Loading rows={4} label="Loading the coverage" />}
        {coverage.isError && <ProblemNotice problem={coverage.error} />}
        {coverage.data !== undefined && (
          <CoverageMap
            cells={coverage.data.cells}
            cellSizeDeg={coverage.data.cellSizeDeg}
            label={`Sky coverage of ${catalogue.label}`}
          />
        )}
      </div>
    </Section>
  );
}

function Fact({ name, children }: { name: string; children: React.ReactNode }) {
  return (
    <>
      <dt className="text-muted">{name}</dt>
      <dd>{children}</dd>
    </>
  );
}

function Provenance({ catalogue }: { catalogue: CatalogueDetail }) {
  return (
    <>
      <MarginNote title="Where it comes from">
        <p>
          {catalogue.fileName}, {formatBytes(catalogue.fileSizeBytes)}, revision {catalogue.revision}, imported by{' '}
          {catalogue.importedBy} <RelativeTime at={catalogue.createdAt} />.
        </p>
        <p className="mt-1 font-mono text-xs break-all">sha256 {catalogue.fileSha256}</p>
      </MarginNote>
      <MarginNote title="Citation">
        {catalogue.citation === '' ? 'No citation has been given.' : catalogue.citation}
      </MarginNote>
      <MarginNote title="What the numbers mean">
        Errors are one sigma per axis, converted from what the file states. Sky coverage counts sources in HEALPix cells:
        a cell without sources is empty here, whether or not the instrument looked at it.
      </MarginNote>
    </>
  );
}
