import { describe, expect, it } from 'vitest';
import { onwardFrom, seqOfSearch, withSeq } from './queue-place';

describe('the candidate in the address', () => {
  it.each([
    ['seq=12', 12],
    ['', null],
    ['seq=', null],
    ['seq=0', null],
    ['seq=-3', null],
    ['seq=1.5', null],
    ['seq=first', null],
  ] as const)('"%s" names %s', (search, seq) => {
    expect(seqOfSearch(new URLSearchParams(search))).toBe(seq);
  });

  it('changes without touching the filter', () => {
    const search = new URLSearchParams('kind=crowded&seq=4');
    expect(withSeq(search, 9).toString()).toBe('kind=crowded&seq=9');
    expect(withSeq(search, null).toString()).toBe('kind=crowded');
    expect(search.get('seq')).toBe('4');
  });
});

describe('onwardFrom', () => {
  it('goes on in the queue', () => {
    expect(onwardFrom(8, 'undecided')).toEqual({ kind: 'candidate', seq: 8 });
    expect(onwardFrom(8, 'unsure')).toEqual({ kind: 'candidate', seq: 8 });
  });

  it('comes back to skipped undecided ones at the end, and stays in other queues', () => {
    expect(onwardFrom(null, 'undecided')).toEqual({ kind: 'first' });
    expect(onwardFrom(null, 'any')).toEqual({ kind: 'stay' });
    expect(onwardFrom(null, 'unsure')).toEqual({ kind: 'stay' });
  });
});
