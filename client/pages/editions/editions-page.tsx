import { useSearchParams } from 'react-router-dom';
import type { ExportOptions, ExportRecipe } from '../../../shared/schemas/export';
import { groupPath, urlOf } from '../../api/request';
import { useGroup } from '../../api/use-group';
import { CopyButton } from '../../components/copy-button';
import { EmptyState } from '../../components/empty-state';
import { DownloadLink, LinkButton } from '../../components/link-button';
import { Loading } from '../../components/loading';
import { MarginNote } from '../../components/margin';
import { Page } from '../../components/page';
import { ProblemNotice } from '../../components/problem-notice';
import { plural } from '../../components/quantities';
import { Section } from '../../components/section';
import { useDebounced } from '../../components/use-debounced';
import { RecipeForm } from './recipe-form';
import { recipeOfUrl } from './recipe-url';
import { useExportOptions, useExportPreview } from './use-exports';

const PREVIEW_DELAY_MS = 300;

/** The merged table: choose its columns, look at the first rows, download it. The choice stands in the URL. */
export function EditionsPage() {
  const group = useGroup();
  const options = useExportOptions(group.slug);
  return (
    <Page
      title="Merged table"
      lead="One row per object, with the columns you choose of every catalogue."
      margin={
        <>
          <MarginNote title="What a row is">
            An object as the group holds it now: the sources joined by “same” verdicts, or a single source. Several sources
            of one catalogue in one object share a cell, separated by “; ”.
          </MarginNote>
          <MarginNote title="Spreadsheets">
            Numbers stay numbers. A text cell that a spreadsheet would run as a formula begins with an apostrophe.
          </MarginNote>
          <MarginNote title="Caution">
            The table shows the registry of this moment. Close positions are evidence, not proof; the grade column says how
            sure the people or the rule behind a row were.
          </MarginNote>
        </>
      }
    >
      {options.isPending && <Loading rows={6} label="Loading the columns" />}
      {options.isError && <ProblemNotice problem={options.error} retry={() => void options.refetch()} />}
      {options.data !== undefined &&
        (options.data.objects === 0 ? (
          <EmptyState
            title="No object yet, so no table"
            actions={group.can('contributor') && <LinkButton to="../catalogues/new">Add a catalogue</LinkButton>}
          >
            Every source of an imported catalogue becomes an object; cross-matching and verdicts join them.
          </EmptyState>
        ) : (
          <Builder group={group.slug} options={options.data} />
        ))}
    </Page>
  );
}

function Builder({ group, options }: { group: string; options: ExportOptions }) {
  const [search, setSearch] = useSearchParams();
  const recipe = recipeOfUrl(search.get('recipe'), options);
  const settled = useDebounced(JSON.stringify(recipe), PREVIEW_DELAY_MS);
  const preview = useExportPreview(group, JSON.parse(settled) as ExportRecipe);
  const href = urlOf(groupPath(group, 'exports', 'merged-table.csv'), { recipe: JSON.stringify(recipe) });
  return (
    <div className="grid gap-8">
      <Section title="Columns">
        <RecipeForm
          options={options}
          recipe={recipe}
          onChange={(next) => setSearch({ recipe: JSON.stringify(next) }, { replace: true })}
        />
      </Section>
      <Section
        title="First rows"
        actions={
          <span className="flex flex-wrap items-center gap-3">
            {preview.data !== undefined && (
              <span className="text-muted">
                {plural(preview.data.rows, 'row', 'rows')}, {plural(preview.data.header.length, 'column', 'columns')}
              </span>
            )}
            <DownloadLink kind="main" href={href}>
              Download CSV
            </DownloadLink>
          </span>
        }
      >
        {preview.isPending && <Loading rows={5} label="Making the first rows" />}
        {preview.isError && <ProblemNotice problem={preview.error} retry={() => void preview.refetch()} />}
        {preview.data !== undefined &&
          (preview.data.rows === 0 ? (
            <EmptyState title="No object fits">Ask for fewer entries or fewer catalogues.</EmptyState>
          ) : (
            <PreviewRows header={preview.data.header} sample={preview.data.sample} />
          ))}
      </Section>
    </div>
  );
}

function PreviewRows({ header, sample }: { header: readonly string[]; sample: readonly (readonly string[])[] }) {
  const tsv = [header, ...sample].map((row) => row.join('\t')).join('\n');
  return (
    <div className="grid gap-2">
      <div className="relative overflow-x-auto" tabIndex={0} role="region" aria-label="First rows of the merged table">
        <table className="border-collapse text-xs">
          <thead>
            <tr className="border-b border-edge text-left text-muted">
              {header.map((name, i) => (
                <th key={i} className="py-1.5 pr-4 font-medium whitespace-nowrap">
                  {name}
                </th>
              ))}
            </tr>
          </thead>
          <tbody>
            {sample.map((row, r) => (
              <tr key={r} className="border-b border-rule">
                {row.map((cell, i) => (
                  <td key={i} className="max-w-80 truncate py-1 pr-4 whitespace-nowrap">
                    {cell}
                  </td>
                ))}
              </tr>
            ))}
          </tbody>
        </table>
      </div>
      <div>
        <CopyButton text={tsv} label="Copy these rows" />
      </div>
    </div>
  );
}
