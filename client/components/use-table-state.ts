import { useSearchParams } from 'react-router-dom';
import { nextSort, visibleColumns, type Column, type TableSort } from './table-column';

export interface TableState {
  sort: TableSort;
  /** A press on a column's head. */
  setSort: (id: string) => void;
  /** Ids of the shown columns. */
  visible: readonly string[];
  toggle: (id: string) => void;
  /** Back to the columns shown at first. */
  reset: () => void;
}

/**
 * Sort and column choice of a table, kept in the URL as `sort`, `order` and `columns` (with `prefix` when a page
 * has several tables). What equals the default leaves no trace there.
 */
export function useTableState<Row>(plan: {
  columns: readonly Column<Row>[];
  /** The sort at first. */
  sort: TableSort;
  prefix?: string;
}): TableState {
  const [search, setSearch] = useSearchParams();
  const name = (part: string) => `${plan.prefix ?? ''}${part}`;
  const sort = sortOf(search, name, plan.columns) ?? plan.sort;
  const chosen = search.get(name('columns'))?.split(',') ?? null;
  const visible = visibleColumns(plan.columns, chosen).map((column) => column.id);

  const change = (parts: Readonly<Record<string, string | null>>) => {
    setSearch(
      (before) => {
        const after = new URLSearchParams(before);
        for (const [part, value] of Object.entries(parts)) {
          if (value === null) after.delete(name(part));
          else after.set(name(part), value);
        }
        return after;
      },
      { replace: true, preventScrollReset: true },
    );
  };
  return {
    sort,
    visible,
    setSort: (id) => {
      const next = nextSort(sort, id);
      const isDefault = plan.sort.id === next.id && plan.sort.order === next.order;
      change(isDefault ? { sort: null, order: null } : { sort: next.id, order: next.order });
    },
    toggle: (id) => {
      const wanted = plan.columns
        .map((column) => column.id)
        .filter((one) => (one === id ? !visible.includes(id) : visible.includes(one)));
      if (wanted.length > 0) change({ columns: wanted.join(',') });
    },
    reset: () => change({ columns: null }),
  };
}

function sortOf<Row>(
  search: URLSearchParams,
  name: (part: string) => string,
  columns: readonly Column<Row>[],
): TableSort | null {
  const id = search.get(name('sort'));
  if (id === null || !columns.some((column) => column.id === id && column.sortable === true)) return null;
  return { id, order: search.get(name('order')) === 'desc' ? 'desc' : 'asc' };
}
