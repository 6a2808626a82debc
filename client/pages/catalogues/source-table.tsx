import { useMemo } from 'react';
import { Link, useSearchParams } from 'react-router-dom';
import { sourcePage, type CatalogueDetail, type Source } from '../../../shared/schemas/catalogue';
import { usePaged } from '../../api/paged';
import { keys } from '../../api/query-keys';
import { groupPath } from '../../api/request';
import { Coordinates } from '../../components/coordinates';
import { DataTable, type Column } from '../../components/data-table';
import { TextField } from '../../components/text-field';
import { useTableState } from '../../components/use-table-state';

/** So many original columns are shown before a person chooses others. */
const SHOWN_COLUMNS = 6;

function columnsOf(group: string, catalogue: CatalogueDetail): Column<Source>[] {
  const plainRole = (role: string) => role === 'right ascension' || role === 'declination' || role === 'position';
  const own = catalogue.columns.map((column, i): Column<Source> => ({
    id: `c${column.index}`,
    header: column.name === '' ? `column ${column.index + 1}` : column.name,
    cell: (row) => row.cells[column.index] ?? '',
    numeric: column.kind === 'number',
    sortable: true,
    hidden: i >= SHOWN_COLUMNS || plainRole(column.role),
    widthPx: 140,
  }));
  return [
    { id: 'row', header: 'Row', cell: (row) => row.rowNo, numeric: true, sortable: true, widthPx: 80 },
    { id: 'designation', header: 'Name', cell: (row) => row.designation, sortable: true, widthPx: 200 },
    {
      id: 'object',
      header: 'Object',
      cell: (row) =>
        row.objectNumber === null ? (
          '—'
        ) : (
          <Link to={`/g/${group}/objects/${row.objectNumber}`} className="text-link">
            #{row.objectNumber}
          </Link>
        ),
      text: (row) => String(row.objectNumber ?? ''),
      widthPx: 100,
    },
    {
      id: 'ra',
      header: 'Position',
      cell: (row) => <Coordinates raDeg={row.raDeg} decDeg={row.decDeg} errArcsec={row.errMajArcsec} />,
      text: (row) => `${row.raDeg} ${row.decDeg}`,
      sortable: true,
      widthPx: 260,
    },
    {
      id: 'error',
      header: 'Error',
      unit: '″',
      cell: (row) => row.errMajArcsec?.toFixed(3) ?? '—',
      numeric: true,
      sortable: true,
      widthPx: 90,
    },
    ...own,
  ];
}

/** All rows of the catalogue, sorted and filtered by the server. */
export function SourceTable({ group, catalogue }: { group: string; catalogue: CatalogueDetail }) {
  const columns = useMemo(() => columnsOf(group, catalogue), [group, catalogue]);
  const table = useTableState({ columns, sort: { id: 'row', order: 'asc' } });
  const [search, setSearch] = useSearchParams();
  const text = search.get('text') ?? '';
  const list = usePaged({
    queryKey: [...keys.catalogue(group, catalogue.label), 'sources'],
    path: groupPath(group, 'catalogues', catalogue.label, 'sources'),
    query: { sort: table.sort.id, order: table.sort.order, text },
    answer: sourcePage,
  });
  const filter = (value: string) =>
    setSearch(
      (now) => {
        const next = new URLSearchParams(now);
        if (value === '') next.delete('text');
        else next.set('text', value);
        return next;
      },
      { replace: true },
    );
  return (
    <div className="grid gap-3">
      <div className="max-w-md">
        <TextField
          label="Rows that contain"
          type="search"
          value={text}
          onChange={(event) => filter(event.target.value)}
          placeholder="part of a name or of any cell"
        />
      </div>
      <DataTable<Source>
        label={`Sources of ${catalogue.label}`}
        columns={columns}
        rowKey={(row) => row.rowNo}
        table={table}
        empty={text === '' ? undefined : <>No row contains “{text}”.</>}
        {...list}
      />
    </div>
  );
}
