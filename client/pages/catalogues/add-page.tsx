import { useState } from 'react';
import { useNavigate, useSearchParams } from 'react-router-dom';
import type { UploadedFile } from '../../../shared/schemas/file';
import type { ColumnMapping, TextDialect } from '../../../shared/schemas/mapping';
import { useGroup } from '../../api/use-group';
import { Button } from '../../components/button';
import { Loading } from '../../components/loading';
import { MarginNote } from '../../components/margin';
import { Page } from '../../components/page';
import { ProblemNotice } from '../../components/problem-notice';
import { formatBytes, formatCount } from '../../components/quantities';
import { Section } from '../../components/section';
import { useDebounced } from '../../components/use-debounced';
import { DescribeForm } from './describe-form';
import { DialectForm } from './dialect-form';
import { FileStep } from './file-step';
import { MappingForm } from './mapping-form';
import { PreviewTable } from './preview-table';
import { useInspection, usePreview } from './use-catalogues';

const PREVIEW_DELAY_MS = 300;

/** Adding a catalogue: file, columns with a live preview, description. The uploaded file stands in the URL. */
export function AddCataloguePage() {
  const group = useGroup();
  const [search, setSearch] = useSearchParams();
  const fileId = search.get('file');
  const [dialect, setDialect] = useState<Partial<TextDialect>>({});
  const inspection = useInspection(group.slug, fileId, dialect);
  const take = (file: UploadedFile | null) => {
    setDialect({});
    setSearch(file === null ? {} : { file: file.fileId }, { replace: file !== null });
  };
  return (
    <Page
      title="Add a catalogue"
      lead="From a table of sources: one source to a line."
      margin={<AddMargin />}
    >
      {!group.can('contributor') ? (
        <p>Your role, {group.role}, may look at catalogues but not add any. Ask an owner of the group.</p>
      ) : fileId === null ? (
        <FileStep group={group.slug} onUploaded={take} />
      ) : (
        <>
          {inspection.isPending && <Loading rows={5} label="Looking at the file" />}
          {inspection.isError && (
            <div className="grid gap-3">
              <ProblemNotice problem={inspection.error} retry={() => void inspection.refetch()} />
              <div>
                <Button onClick={() => take(null)}>Choose another file</Button>
              </div>
            </div>
          )}
          {inspection.data !== undefined && (
            <Steps
              // A new reading of the file begins with its own suggestion.
              key={JSON.stringify(inspection.data.inspection.dialect)}
              group={group.slug}
              file={inspection.data}
              onDialect={(change) => setDialect({ ...dialect, ...change })}
              onOther={() => take(null)}
            />
          )}
        </>
      )}
    </Page>
  );
}

function Steps({
  group,
  file,
  onDialect,
  onOther,
}: {
  group: string;
  file: UploadedFile;
  onDialect: (change: Partial<TextDialect>) => void;
  onOther: () => void;
}) {
  const navigate = useNavigate();
  const { inspection } = file;
  const [mapping, setMapping] = useState<ColumnMapping | null>(inspection.suggestedMapping);
  const settled = useDebounced(mapping, PREVIEW_DELAY_MS);
  const preview = usePreview(group, file.fileId, inspection.dialect, settled);
  return (
    <div className="grid gap-8">
      <Section
        title="1 · File"
        actions={
          <Button size="sm" onClick={onOther}>
            Choose another file
          </Button>
        }
      >
        <p className="mb-3">
          {file.name}, {formatBytes(file.sizeBytes)}, {inspection.columns.length} columns,{' '}
          {inspection.wholeFileSeen
            ? `${formatCount(inspection.rowsSeen)} rows`
            : `the first ${formatCount(inspection.rowsSeen)} rows were looked at`}
          .
        </p>
        <DialectForm inspection={inspection} onChange={onDialect} />
      </Section>
      <Section title="2 · Columns">
        <MappingForm columns={inspection.columns} mapping={mapping} onChange={setMapping} />
      </Section>
      <Section title="3 · Checks">
        {mapping === null ? (
          <p>Choose the columns of the position; then the first rows appear here as they will be understood.</p>
        ) : (
          <PreviewTable
            preview={preview.data ?? null}
            problem={preview.error}
            retry={() => void preview.refetch()}
            stale={preview.isFetching || settled !== mapping}
          />
        )}
      </Section>
      <Section title="4 · Description">
        <DescribeForm
          group={group}
          file={file}
          mapping={mapping}
          onAccepted={(label) => void navigate(`/g/${group}/catalogues/${label}`)}
        />
      </Section>
    </div>
  );
}

function AddMargin() {
  return (
    <>
      <MarginNote title="What is understood">
        CSV, TSV, semicolons, bars or blanks; plain or gzip; UTF-8 or Latin-1. Positions in degrees, hours or
        sexagesimal, in two columns or one.
      </MarginNote>
      <MarginNote title="Errors">
        Papers state errors in many ways: one sigma per axis, or the radius that holds 50, 68, 90, 95 or 99 % of the
        true positions. Choose what yours says; Idem keeps one sigma per axis. The beam of an instrument is not its
        positional error.
      </MarginNote>
      <MarginNote title="Rows that do not fit">
        A row without a readable position, or with a key that was there before, is set aside with line and reason. The
        rest goes in.
      </MarginNote>
    </>
  );
}
