import { Button } from './button';
import { CheckboxField } from './checkbox-field';
import { CopyButton } from './copy-button';
import type { DataTableProps } from './data-table';
import { Popover } from './popover';
import { formatCount, plural } from './quantities';
import type { Column } from './table-column';
import { tableTsv } from './table-tsv';

/** The line above a DataTable: how many rows, further controls, column choice, copying. */
export function TableTools<Row>({
  columns,
  rows,
  shown,
  total = null,
  hasMore = false,
  table,
  tools,
  label,
}: DataTableProps<Row> & { shown: Column<Row>[] }) {
  const count =
    total === null
      ? `${formatCount(rows.length)}${hasMore ? ' rows loaded, more below' : rows.length === 1 ? ' row' : ' rows'}`
      : hasMore
        ? `${plural(total, 'row', 'rows')}, ${formatCount(rows.length)} loaded`
        : plural(total, 'row', 'rows');
  return (
    <div className="screen-only flex flex-wrap items-center justify-between gap-2">
      <p role="status" className="text-muted">
        {count}
      </p>
      <div className="flex flex-wrap items-center gap-2">
        {tools}
        {table !== undefined && columns.length > 1 && (
          <Popover label="Columns" ariaLabel={`Columns of ${label}`} align="end" size="sm">
            {() => (
              <fieldset className="grid gap-2">
                <legend className="mb-2 font-medium">Columns shown</legend>
                {columns.map((column) => (
                  <CheckboxField
                    key={column.id}
                    label={column.unit === undefined ? column.header : `${column.header} (${column.unit})`}
                    checked={table.visible.includes(column.id)}
                    onChange={() => table.toggle(column.id)}
                  />
                ))}
                <Button size="sm" onClick={table.reset}>
                  As at first
                </Button>
              </fieldset>
            )}
          </Popover>
        )}
        <CopyButton
          label={`Copy ${plural(rows.length, 'row', 'rows')}`}
          text={() => tableTsv(shown, rows)}
          ariaLabel={`Copy ${plural(rows.length, 'row', 'rows')} of ${label} as tab-separated text`}
        />
      </div>
    </div>
  );
}
