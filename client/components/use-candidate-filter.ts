import { useSearchParams } from 'react-router-dom';
import { filterOfSearch, withFilter, type CandidateFilter } from './candidate-filter';

/** The candidate filter of the address, and the way to change parts of it; `drop` names parameters that a change ends. */
export function useCandidateFilter(
  fallback: CandidateFilter,
  drop: readonly string[] = [],
): [CandidateFilter, (change: Partial<CandidateFilter>) => void] {
  const [search, setSearch] = useSearchParams();
  const change = (parts: Partial<CandidateFilter>) => {
    setSearch(
      (before) => {
        const after = withFilter(before, { ...filterOfSearch(before, fallback), ...parts }, fallback);
        for (const name of drop) after.delete(name);
        return after;
      },
      { replace: true, preventScrollReset: true },
    );
  };
  return [filterOfSearch(search, fallback), change];
}
