import { Link } from 'react-router-dom';
import type { CatalogueSummary } from '../../../shared/schemas/catalogue';
import { useGroup } from '../../api/use-group';
import { EmptyState } from '../../components/empty-state';
import { LinkButton } from '../../components/link-button';
import { Loading } from '../../components/loading';
import { MarginNote } from '../../components/margin';
import { Page } from '../../components/page';
import { ProblemNotice } from '../../components/problem-notice';
import { formatCount } from '../../components/quantities';
import { RelativeTime } from '../../components/relative-time';
import { Stamp } from '../../components/stamp';
import { StatusChip } from '../../components/status-chip';
import { useCatalogues } from './use-catalogues';

/** All catalogues of the group. */
export function CataloguesPage() {
  const group = useGroup();
  const catalogues = useCatalogues(group.slug);
  const add = group.can('contributor') && (
    <LinkButton kind="main" to="new">
      Add a catalogue
    </LinkButton>
  );
  const items = catalogues.data?.items ?? [];
  return (
    <Page
      title="Catalogues"
      lead="Lists of sources, as the group has imported them."
      actions={items.length > 0 && add}
      margin={
        <>
          <MarginNote title="Stamps">
            Each catalogue has a stamp, drawn from its order of arrival. The same stamp marks its sources in every
            chart and table.
          </MarginNote>
          <MarginNote title="Nothing is thrown away">
            A row that cannot be a source is set aside with its line and the reason. All columns are kept as written.
          </MarginNote>
        </>
      }
    >
      {catalogues.isPending && <Loading rows={4} label="Loading the catalogues" />}
      {catalogues.error !== null && <ProblemNotice problem={catalogues.error} retry={() => void catalogues.refetch()} />}
      {catalogues.isSuccess && items.length === 0 && (
        <EmptyState title="No catalogue yet" actions={add}>
          Bring a table of sources: CSV, TSV or text with one source to a line, plain or gzip. Idem looks at its
          columns, shows how it understands them, and imports it when you agree.
        </EmptyState>
      )}
      {items.length > 0 && <CatalogueTable items={items} />}
    </Page>
  );
}

function CatalogueTable({ items }: { items: readonly CatalogueSummary[] }) {
  return (
    <div className="relative overflow-x-auto" tabIndex={0} role="region" aria-label="Catalogues">
      <table className="w-full border-collapse text-sm">
        <thead>
          <tr className="border-b border-edge text-left text-xs text-muted">
            <th className="py-2 pr-4 font-medium">Catalogue</th>
            <th className="py-2 pr-4 font-medium">Band</th>
            <th className="py-2 pr-4 text-right font-medium">Epoch</th>
            <th className="py-2 pr-4 text-right font-medium">Sources</th>
            <th className="py-2 pr-4 text-right font-medium">Set aside</th>
            <th className="py-2 pr-4 font-medium">State</th>
            <th className="py-2 font-medium">Added</th>
          </tr>
        </thead>
        <tbody>
          {items.map((item) => (
            <tr key={item.label} className="border-b border-rule align-top">
              <td className="py-2 pr-4">
                <div className="flex min-w-48 items-start gap-2">
                  <Stamp catalogue={item} />
                  <div>
                    <Link to={item.label} className="font-medium text-link">
                      {item.label}
                    </Link>
                    <div className="text-muted">{item.title}</div>
                  </div>
                </div>
              </td>
              <td className="py-2 pr-4">{item.band}</td>
              <td className="py-2 pr-4 text-right">{item.epochYear?.toFixed(1) ?? '—'}</td>
              <td className="py-2 pr-4 text-right">{formatCount(item.sources)}</td>
              <td className="py-2 pr-4 text-right">
                {item.setAside === 0 ? (
                  '0'
                ) : (
                  <Link to={`${item.label}?tab=set-aside`} className="text-link">
                    {formatCount(item.setAside)}
                    <span className="sr-only"> rows set aside</span>
                  </Link>
                )}
              </td>
              <td className="py-2 pr-4">
                <RevisionState state={item.state} registered={item.registered} />
              </td>
              <td className="py-2 whitespace-nowrap text-muted">
                <RelativeTime at={item.createdAt} />
              </td>
            </tr>
          ))}
        </tbody>
      </table>
    </div>
  );
}

function RevisionState({ state, registered }: Pick<CatalogueSummary, 'state' | 'registered'>) {
  if (state === 'ready') {
    return registered ? <StatusChip tone="good">ready</StatusChip> : <StatusChip tone="accent">registering</StatusChip>;
  }
  return <StatusChip tone={state === 'importing' ? 'accent' : 'bad'}>{state}</StatusChip>;
}
