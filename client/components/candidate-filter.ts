import { VERDICT_VALUES, type VerdictValue } from '../../shared/words';

export const VERDICT_FILTERS = ['any', 'undecided', ...VERDICT_VALUES] as const;
export type VerdictFilter = 'any' | 'undecided' | VerdictValue;
export const KIND_FILTERS = ['any', 'clear', 'crowded'] as const;
export type KindFilter = (typeof KIND_FILTERS)[number];

/** Which candidates of a run are meant, and in which order. */
export interface CandidateFilter {
  verdict: VerdictFilter;
  kind: KindFilter;
  minSepArcsec: number | null;
  maxSepArcsec: number | null;
  /** 'A,B': labels of two catalogues; null for all pairs of catalogues. */
  pair: string | null;
  order: 'asc' | 'desc';
}

/** Every candidate in the order of separation. */
export const NO_FILTER: CandidateFilter = {
  verdict: 'any',
  kind: 'any',
  minSepArcsec: null,
  maxSepArcsec: null,
  pair: null,
  order: 'asc',
};

/** What the desk shows when its address says nothing: what nobody has decided yet. */
export const DESK_FILTER: CandidateFilter = { ...NO_FILTER, verdict: 'undecided' };

/** Names in the address. 'order' is the one that tables use as well. */
export const FILTER_PARAMS = ['verdict', 'kind', 'minSep', 'maxSep', 'pair', 'order'] as const;

/** The filter in an address; what is missing or cannot be read counts as the fallback. */
export function filterOfSearch(search: URLSearchParams, fallback: CandidateFilter): CandidateFilter {
  const verdict = search.get('verdict');
  const kind = search.get('kind');
  const order = search.get('order');
  return {
    verdict: VERDICT_FILTERS.find((one) => one === verdict) ?? fallback.verdict,
    kind: KIND_FILTERS.find((one) => one === kind) ?? fallback.kind,
    minSepArcsec: sepOf(search.get('minSep')) ?? fallback.minSepArcsec,
    maxSepArcsec: sepOf(search.get('maxSep')) ?? fallback.maxSepArcsec,
    pair: search.get('pair') ?? fallback.pair,
    order: order === 'asc' || order === 'desc' ? order : fallback.order,
  };
}

/** A typed separation in arcsec; null for what is empty, negative or no number. */
export function sepOf(text: string | null): number | null {
  if (text === null || text.trim() === '') return null;
  const value = Number(text);
  return Number.isFinite(value) && value >= 0 ? value : null;
}

/** An address with the filter in it; other parts stay, and what equals the fallback leaves no trace. */
export function withFilter(
  search: URLSearchParams,
  filter: CandidateFilter,
  fallback: CandidateFilter,
): URLSearchParams {
  const after = new URLSearchParams(search);
  const values: Record<(typeof FILTER_PARAMS)[number], string | number | null> = {
    verdict: filter.verdict === fallback.verdict ? null : filter.verdict,
    kind: filter.kind === fallback.kind ? null : filter.kind,
    minSep: filter.minSepArcsec,
    maxSep: filter.maxSepArcsec,
    pair: filter.pair,
    order: filter.order === fallback.order ? null : filter.order,
  };
  for (const name of FILTER_PARAMS) {
    const value = values[name];
    if (value === null || value === '') after.delete(name);
    else after.set(name, String(value));
  }
  return after;
}

/** The filter as the API takes it. */
export function queryOfFilter(filter: CandidateFilter): Record<string, string | number | null> {
  return {
    sort: filter.order === 'asc' ? 'sep' : 'sep-desc',
    verdict: filter.verdict,
    kind: filter.kind,
    minSepArcsec: filter.minSepArcsec,
    maxSepArcsec: filter.maxSepArcsec,
    pair: filter.pair,
  };
}

/** True when the filter leaves something out that the fallback shows; the order leaves nothing out. */
export function isNarrowed(filter: CandidateFilter, fallback: CandidateFilter): boolean {
  return (
    filter.verdict !== fallback.verdict ||
    filter.kind !== fallback.kind ||
    filter.minSepArcsec !== fallback.minSepArcsec ||
    filter.maxSepArcsec !== fallback.maxSepArcsec ||
    filter.pair !== fallback.pair
  );
}

/**
 * The place, below the group, of the desk of a run with this filter, at a candidate or (null) at the first one.
 * 'any' verdict becomes 'undecided': who opens one of all candidates goes on with those that wait.
 */
export function deskAddress(run: number, filter: CandidateFilter, seq: number | null = null): string {
  const wanted = filter.verdict === 'any' ? { ...filter, verdict: DESK_FILTER.verdict } : filter;
  const search = withFilter(new URLSearchParams(), wanted, DESK_FILTER);
  if (seq !== null) search.set('seq', String(seq));
  const text = search.toString();
  return `review/${run}${text === '' ? '' : `?${text}`}`;
}
