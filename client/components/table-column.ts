import type { ReactNode } from 'react';

/** One column of a DataTable. */
export interface Column<Row> {
  /** Stands in the URL (sort, chosen columns): short, stable, without commas. */
  id: string;
  header: string;
  unit?: string;
  /** What the head means, shown on hover. */
  explain?: string;
  cell: (row: Row) => ReactNode;
  /** Text for copying; without it, a `cell` that is text or a number is taken. */
  text?: (row: Row) => string;
  /** Set to the right. */
  numeric?: boolean;
  sortable?: boolean;
  /** Least width; wider tables share the rest in proportion. */
  widthPx?: number;
  /** Not shown until chosen. */
  hidden?: boolean;
}

export interface TableSort {
  id: string;
  order: 'asc' | 'desc';
}

const DEFAULT_WIDTH_PX = 120;

/** The grid that head and rows share. */
export function columnGrid<Row>(columns: readonly Column<Row>[]): {
  gridTemplateColumns: string;
  minWidth: number;
} {
  const widths = columns.map((column) => column.widthPx ?? DEFAULT_WIDTH_PX);
  return {
    gridTemplateColumns: widths.map((width) => `minmax(${width}px, ${width}fr)`).join(' '),
    minWidth: widths.reduce((sum, width) => sum + width, 0),
  };
}

/** Columns to show: those named, in the table's own order; all that are not hidden when nothing was chosen. */
export function visibleColumns<Row>(
  columns: readonly Column<Row>[],
  chosen: readonly string[] | null,
): Column<Row>[] {
  const shown = columns.filter((column) =>
    chosen === null ? column.hidden !== true : chosen.includes(column.id),
  );
  return shown.length > 0 ? shown : columns.slice(0, 1);
}

/** The sort after a press on a column's head: the same column turns round, another one begins rising. */
export function nextSort(current: TableSort, id: string): TableSort {
  return { id, order: current.id === id && current.order === 'asc' ? 'desc' : 'asc' };
}
