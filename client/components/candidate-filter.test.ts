import { describe, expect, it } from 'vitest';
import { candidateQuery } from '../../shared/schemas/run';
import {
  DESK_FILTER,
  deskAddress,
  filterOfSearch,
  isNarrowed,
  NO_FILTER,
  queryOfFilter,
  sepOf,
  withFilter,
  type CandidateFilter,
} from './candidate-filter';

const FULL: CandidateFilter = {
  verdict: 'unsure',
  kind: 'crowded',
  minSepArcsec: 0.5,
  maxSepArcsec: 2.25,
  pair: 'LAN-O,LAN-X',
  order: 'desc',
};

describe('a filter of candidates in the address', () => {
  it('comes back as it went in', () => {
    expect(filterOfSearch(withFilter(new URLSearchParams(), FULL, NO_FILTER), NO_FILTER)).toEqual(FULL);
  });

  it('leaves no trace where it equals the fallback', () => {
    expect(withFilter(new URLSearchParams(), NO_FILTER, NO_FILTER).toString()).toBe('');
    const desk = { ...NO_FILTER, verdict: 'undecided' as const };
    expect(withFilter(new URLSearchParams(), desk, desk).toString()).toBe('');
    expect(withFilter(new URLSearchParams(), NO_FILTER, desk).toString()).toBe('verdict=any');
  });

  it('keeps other parts of the address and takes its own old parts away', () => {
    const before = new URLSearchParams('tab=candidates&kind=clear&minSep=1&columns=seq');
    expect(withFilter(before, { ...NO_FILTER, kind: 'crowded' }, NO_FILTER).toString()).toBe(
      'tab=candidates&kind=crowded&columns=seq',
    );
  });

  it('counts what cannot be read as not given', () => {
    const search = new URLSearchParams('verdict=maybe&kind=dense&minSep=-1&maxSep=wide&order=up');
    expect(filterOfSearch(search, NO_FILTER)).toEqual(NO_FILTER);
  });

  it('keeps a least separation of zero', () => {
    expect(sepOf('0')).toBe(0);
    expect(sepOf(' ')).toBeNull();
    expect(sepOf('1e400')).toBeNull();
  });
});

describe('a filter as the API takes it', () => {
  it('keeps to the contract once empty parts are left out', () => {
    const sent = Object.fromEntries(
      Object.entries(queryOfFilter(FULL)).map(([name, value]) => [name, String(value)]),
    );
    expect(candidateQuery.parse(sent)).toMatchObject({
      sort: 'sep-desc',
      verdict: 'unsure',
      kind: 'crowded',
      minSepArcsec: 0.5,
      maxSepArcsec: 2.25,
      pair: 'LAN-O,LAN-X',
    });
    expect(queryOfFilter(NO_FILTER)).toMatchObject({ sort: 'sep', minSepArcsec: null, pair: null });
  });
});

describe('isNarrowed', () => {
  it('is about what is left out, not about the order', () => {
    expect(isNarrowed({ ...NO_FILTER, order: 'desc' }, NO_FILTER)).toBe(false);
    expect(isNarrowed({ ...NO_FILTER, minSepArcsec: 0 }, NO_FILTER)).toBe(true);
    expect(isNarrowed({ ...NO_FILTER, verdict: 'same' }, NO_FILTER)).toBe(true);
  });
});

describe('deskAddress', () => {
  it('goes on with what is undecided when all candidates were listed', () => {
    expect(deskAddress(3, NO_FILTER)).toBe('review/3');
    expect(deskAddress(3, { ...NO_FILTER, kind: 'crowded' }, 17)).toBe('review/3?kind=crowded&seq=17');
  });

  it('keeps a chosen verdict, which the desk reads back', () => {
    const address = deskAddress(3, FULL, 4);
    const search = new URLSearchParams(address.slice(address.indexOf('?')));
    expect(filterOfSearch(search, DESK_FILTER)).toEqual(FULL);
    expect(search.get('seq')).toBe('4');
  });
});
