import type { CSSProperties } from 'react';
import { classNames } from './class-names';
import type { Column } from './table-column';
import type { TableState } from './use-table-state';

/** The head of a DataTable: stays in sight; sortable columns are buttons. */
export function TableHead<Row>({
  columns,
  table,
  style,
}: {
  columns: readonly Column<Row>[];
  table?: TableState;
  style: CSSProperties;
}) {
  return (
    <div role="rowgroup" className="sticky top-0 z-10" style={{ minWidth: style.minWidth }}>
      <div
        role="row"
        aria-rowindex={1}
        style={style}
        className="grid items-center border-b border-edge bg-raised"
      >
        {columns.map((column) => (
          <HeadCell key={column.id} column={column} table={table} />
        ))}
      </div>
    </div>
  );
}

function HeadCell<Row>({ column, table }: { column: Column<Row>; table?: TableState }) {
  const order = table?.sort.id === column.id ? table.sort.order : null;
  const sortable = column.sortable === true && table !== undefined;
  const text = (
    <span className="truncate">
      <span className="font-bold">{column.header}</span>
      {column.unit !== undefined && <span className="text-muted"> {column.unit}</span>}
    </span>
  );
  return (
    <div
      role="columnheader"
      aria-sort={
        !sortable ? undefined : order === 'asc' ? 'ascending' : order === 'desc' ? 'descending' : 'none'
      }
      title={column.explain}
      className="flex h-full min-w-0 items-stretch text-xs"
    >
      {sortable ? (
        <button
          type="button"
          onClick={() => table.setSort(column.id)}
          className={classNames(
            'flex w-full min-w-0 items-center gap-1 px-2.5 -outline-offset-2 hover:bg-sunken',
            column.numeric === true && 'justify-end',
          )}
        >
          {text}
          <span aria-hidden="true" className={order === null ? 'text-edge' : 'text-accent'}>
            {order === 'desc' ? '▼' : order === 'asc' ? '▲' : '▵'}
          </span>
        </button>
      ) : (
        <span
          className={classNames(
            'flex w-full min-w-0 items-center px-2.5',
            column.numeric === true && 'justify-end',
          )}
        >
          {text}
        </span>
      )}
    </div>
  );
}
