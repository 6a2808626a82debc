import { setAsidePage, type CatalogueDetail } from '../../../shared/schemas/catalogue';
import type { SetAsideRow } from '../../../shared/schemas/mapping';
import { usePaged } from '../../api/paged';
import { keys } from '../../api/query-keys';
import { groupPath } from '../../api/request';
import { DataTable, type Column } from '../../components/data-table';
import { EmptyState } from '../../components/empty-state';
import { DownloadLink } from '../../components/link-button';
import { useTableState } from '../../components/use-table-state';

const COLUMNS: Column<SetAsideRow>[] = [
  { id: 'line', header: 'Line', cell: (row) => row.line, numeric: true, widthPx: 80 },
  { id: 'column', header: 'Column', cell: (row) => row.column ?? 'the row', widthPx: 130 },
  { id: 'reason', header: 'Reason', cell: (row) => row.message, widthPx: 420 },
  { id: 'code', header: 'Code', cell: (row) => row.code, widthPx: 170 },
  { id: 'raw', header: 'As written', cell: (row) => row.raw, widthPx: 560 },
];

/** Rows that could not be read as sources. */
export function SetAsideTable({ group, catalogue }: { group: string; catalogue: CatalogueDetail }) {
  const table = useTableState({ columns: COLUMNS, sort: { id: 'line', order: 'asc' }, prefix: 'aside-' });
  const list = usePaged({
    queryKey: [...keys.catalogue(group, catalogue.label), 'set-aside'],
    path: groupPath(group, 'catalogues', catalogue.label, 'set-aside'),
    answer: setAsidePage,
    enabled: catalogue.setAside > 0,
  });
  if (catalogue.setAside === 0) {
    return <EmptyState title="No row was set aside">Every row of the file became a source.</EmptyState>;
  }
  return (
    <div className="grid gap-3">
      <div className="flex justify-end">
        <DownloadLink href={groupPath(group, 'catalogues', catalogue.label, 'set-aside.csv')} size="sm">
          Download all as CSV
        </DownloadLink>
      </div>
      <DataTable<SetAsideRow>
        label={`Rows of ${catalogue.label} that were set aside`}
        columns={COLUMNS}
        rowKey={(row) => row.line}
        table={table}
        {...list}
      />
    </div>
  );
}
