import { useMemo } from 'react';
import { keepPreviousData, useInfiniteQuery, type QueryKey } from '@tanstack/react-query';
import type { z } from 'zod';
import { request, type QueryValue } from './request';

/** What `pageOf(item)` of the shared schemas describes. */
type PageSchema<Row> = z.ZodType<{ items: Row[]; next: string | null; total: number | null }>;

export interface Paged<Row> {
  rows: Row[];
  /** Rows in the whole list under the same filter; null when the server does not count. */
  total: number | null;
  hasMore: boolean;
  loadMore: () => void;
  isLoading: boolean;
  isLoadingMore: boolean;
  problem: Error | null;
  retry: () => void;
}

/**
 * A keyset-paged list, in the shape that DataTable takes. While a changed filter or sort is loading, the rows
 * before it stay in sight.
 */
export function usePaged<Row>(plan: {
  queryKey: QueryKey;
  path: string;
  query?: Readonly<Record<string, QueryValue>>;
  answer: PageSchema<Row>;
  limit?: number;
  enabled?: boolean;
}): Paged<Row> {
  const { path, query = {}, answer, limit = 200 } = plan;
  const list = useInfiniteQuery({
    queryKey: [...plan.queryKey, 'paged', query, limit],
    enabled: plan.enabled ?? true,
    initialPageParam: null as string | null,
    queryFn: ({ pageParam, signal }) =>
      request({ path, query: { ...query, limit, after: pageParam }, answer, signal }),
    getNextPageParam: (last) => last.next,
    placeholderData: keepPreviousData,
  });
  const pages = list.data?.pages;
  const rows = useMemo(() => pages?.flatMap((page) => page.items) ?? [], [pages]);
  return {
    rows,
    total: pages?.[0]?.total ?? null,
    hasMore: list.hasNextPage,
    loadMore: () => {
      if (list.hasNextPage && !list.isFetching) void list.fetchNextPage();
    },
    isLoading: list.isPending,
    isLoadingMore: list.isFetchingNextPage,
    problem: list.error,
    retry: () => void (list.isFetchNextPageError ? list.fetchNextPage() : list.refetch()),
  };
}
