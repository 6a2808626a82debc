import { useQueries, useQuery } from '@tanstack/react-query';
import {
  catalogueDetail,
  catalogueList,
  type CatalogueDetail,
  type CatalogueSummary,
} from '../../../shared/schemas/catalogue';
import { keys } from '../../api/query-keys';
import { groupPath, request } from '../../api/request';

/** The catalogues that can be cross-matched: imported completely. In order of arrival. */
export function useReadyCatalogues(group: string) {
  return useQuery({
    queryKey: keys.catalogues(group),
    queryFn: ({ signal }) => request({ path: groupPath(group, 'catalogues'), answer: catalogueList, signal }),
    select: ({ items }): CatalogueSummary[] => items.filter(({ state }) => state === 'ready'),
  });
}

/** The full description of some catalogues, as far as it has come in. */
export function useCatalogueDetails(group: string, labels: readonly string[]): CatalogueDetail[] {
  return useQueries({
    queries: labels.map((label) => ({
      queryKey: keys.catalogue(group, label),
      queryFn: ({ signal }: { signal: AbortSignal }) =>
        request({ path: groupPath(group, 'catalogues', label), answer: catalogueDetail, signal }),
    })),
    combine: (results) => results.flatMap(({ data }) => (data === undefined ? [] : [data])),
  });
}
