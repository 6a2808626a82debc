import type { CSSProperties } from 'react';
import { classNames } from './class-names';
import type { Column } from './table-column';

/** One row in sight of a DataTable. */
export function TableRow<Row>({
  row,
  index,
  columns,
  current,
  onClick,
  style,
}: {
  row: Row;
  /** Place in the whole list, from 0. */
  index: number;
  columns: readonly Column<Row>[];
  /** Marked as the one in question. */
  current: boolean;
  onClick?: (row: Row) => void;
  style: CSSProperties;
}) {
  return (
    <div
      role="row"
      aria-rowindex={index + 2}
      aria-current={current || undefined}
      onClick={onClick === undefined ? undefined : () => onClick(row)}
      style={style}
      className={classNames(
        'absolute top-0 left-0 grid w-full items-center border-b border-rule hover:bg-sunken',
        onClick !== undefined && 'cursor-pointer',
        current && 'bg-sunken shadow-[inset_3px_0_0_var(--accent)]',
      )}
    >
      {columns.map((column) => (
        <div
          key={column.id}
          role="cell"
          className={classNames('truncate px-2.5', column.numeric === true && 'text-right')}
        >
          {column.cell(row)}
        </div>
      ))}
    </div>
  );
}

/** Stands at the end while the next page is on its way. */
export function LoadingRow({ style, columns }: { style: CSSProperties; columns: number }) {
  return (
    <div role="row" style={style} className="absolute top-0 left-0 flex w-full items-center">
      <div role="cell" aria-colspan={columns} className="sticky left-0 px-2.5 text-muted">
        Loading more…
      </div>
    </div>
  );
}
