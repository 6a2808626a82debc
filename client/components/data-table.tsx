import { useEffect, useRef, type CSSProperties, type ReactNode, type RefObject } from 'react';
import { useVirtualizer } from '@tanstack/react-virtual';
import { Loading } from './loading';
import { ProblemNotice } from './problem-notice';
import { columnGrid, visibleColumns, type Column } from './table-column';
import { TableHead } from './table-head';
import { LoadingRow, TableRow } from './table-row';
import { TableTools } from './table-tools';
import type { TableState } from './use-table-state';

export type { Column } from './table-column';

const ROW_PX = 36;
/** Rows before the end of what is loaded at which the next page is asked for. */
const AHEAD_ROWS = 30;

export interface DataTableProps<Row> {
  /** Name of the table for screen readers and of the scrolling region. */
  label: string;
  columns: readonly Column<Row>[];
  rows: readonly Row[];
  rowKey: (row: Row) => string | number;
  /** Rows in the whole list; null or left out when not counted. */
  total?: number | null;
  hasMore?: boolean;
  loadMore?: () => void;
  isLoading?: boolean;
  isLoadingMore?: boolean;
  problem?: unknown;
  retry?: () => void;
  /** Shown in place of the table when there is no row; say why, and whether a filter is the reason. */
  empty?: ReactNode;
  /** Sort and column choice, from useTableState. */
  table?: TableState;
  /** Key of the row that is marked and kept in sight. */
  currentKey?: string | number | null;
  /** For the mouse only: a link or button in a cell must do the same for keyboards. */
  onRowClick?: (row: Row) => void;
  /** Greatest height of the scrolling part, any CSS length. */
  height?: string;
  rowHeightPx?: number;
  /** Further controls in the line above the table. */
  tools?: ReactNode;
}

/** A table of any length: only the rows in sight are in the page, further pages load while scrolling. */
export function DataTable<Row>(props: DataTableProps<Row>) {
  const { columns, rows, table, problem, retry, isLoading = false } = props;
  const shown = visibleColumns(columns, table?.visible ?? null);
  if (isLoading && rows.length === 0) return <Loading label={`Loading ${props.label}`} rows={6} />;
  const failed = problem !== null && problem !== undefined;
  if (failed && rows.length === 0) return <ProblemNotice problem={problem} retry={retry} />;
  if (rows.length === 0) return <>{props.empty ?? <p className="text-muted">No rows.</p>}</>;
  return (
    <div className="grid min-w-0 grid-cols-[minmax(0,1fr)] gap-2">
      <TableTools {...props} shown={shown} />
      <TableBody {...props} shown={shown} />
      {failed && <ProblemNotice problem={problem} retry={retry} />}
    </div>
  );
}

function TableBody<Row>({
  label,
  shown,
  rows,
  rowKey,
  total,
  hasMore = false,
  loadMore,
  isLoadingMore = false,
  problem = null,
  table,
  currentKey = null,
  onRowClick,
  height = 'min(70dvh, 44rem)',
  rowHeightPx = ROW_PX,
}: DataTableProps<Row> & { shown: Column<Row>[] }) {
  const region = useRef<HTMLDivElement>(null);
  const currentIndex = currentKey === null ? -1 : rows.findIndex((row) => rowKey(row) === currentKey);
  const virtual = useVirtualRows({
    region,
    count: rows.length + (hasMore ? 1 : 0),
    rowHeightPx,
    currentIndex,
  });
  const items = virtual.getVirtualItems();
  const lastIndex = items.at(-1)?.index ?? 0;
  // After a failure the next page waits for a press on 'Try again'.
  const wantsMore = hasMore && !isLoadingMore && problem === null && lastIndex >= rows.length - AHEAD_ROWS;
  useEffect(() => {
    if (wantsMore) loadMore?.();
  }, [wantsMore, loadMore, rows.length]);

  const grid = columnGrid(shown);
  // The head is a row as well; -1 says that the number is not known.
  const rowCount = total === null || total === undefined ? (hasMore ? -1 : rows.length + 1) : total + 1;
  return (
    <div
      ref={region}
      role="region"
      aria-label={`${label}, scrolls`}
      tabIndex={0}
      className="relative overflow-auto border border-rule bg-raised -outline-offset-2"
      style={{ maxHeight: height }}
    >
      <div role="table" aria-label={label} aria-rowcount={rowCount} aria-colcount={shown.length}>
        <TableHead columns={shown} table={table} style={{ ...grid, height: rowHeightPx }} />
        <div
          role="rowgroup"
          className="relative"
          style={{ height: virtual.getTotalSize(), minWidth: grid.minWidth }}
        >
          {items.map((item) => {
            const row = rows[item.index];
            const place: CSSProperties = {
              ...grid,
              height: rowHeightPx,
              transform: `translateY(${item.start}px)`,
            };
            if (row === undefined) return <LoadingRow key="loading" style={place} columns={shown.length} />;
            const key = rowKey(row);
            return (
              <TableRow
                key={key}
                row={row}
                index={item.index}
                columns={shown}
                current={key === currentKey}
                onClick={onRowClick}
                style={place}
              />
            );
          })}
        </div>
      </div>
    </div>
  );
}

/** Which rows are in sight; brings the marked row into sight when it changes. */
function useVirtualRows(plan: {
  region: RefObject<HTMLDivElement | null>;
  count: number;
  rowHeightPx: number;
  currentIndex: number;
}) {
  const { region, count, rowHeightPx, currentIndex } = plan;
  const virtual = useVirtualizer({
    count,
    getScrollElement: () => region.current,
    estimateSize: () => rowHeightPx,
    overscan: 12,
    scrollPaddingStart: rowHeightPx,
  });
  useEffect(() => {
    if (currentIndex >= 0) virtual.scrollToIndex(currentIndex, { align: 'auto' });
  }, [currentIndex, virtual]);
  return virtual;
}
