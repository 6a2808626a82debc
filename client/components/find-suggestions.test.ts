import { describe, expect, it } from 'vitest';
import type { FindAnswer } from '../../shared/schemas/find';
import { findSuggestions } from './find-suggestions';

const object = (number: number, name: string, alias: string | null, sepArcsec: number | null = null) => ({
  number,
  name,
  alias,
  sepArcsec,
  raDeg: 1,
  decDeg: 2,
  errArcsec: null,
  entries: 1,
  catalogues: [],
});

const answer = (parts: Partial<FindAnswer>): FindAnswer => ({
  q: 'x',
  read: 'name',
  position: null,
  exact: [],
  nearMisses: [],
  forwardedFrom: null,
  ...parts,
});

describe('findSuggestions', () => {
  it('offers exact answers first and calls near misses what they are', () => {
    const offered = findSuggestions(
      answer({
        exact: [object(4, 'LAN 4', 'Radio 9'), object(5, 'LAN 5', 'LAN 5')],
        nearMisses: [{ alias: 'Radio 8', number: 6, name: 'LAN 6', reason: 'one digit differs' }],
      }),
      8,
    );
    expect(offered).toEqual([
      { number: 4, text: 'Radio 9 = LAN 4', remark: 'no. 4' },
      { number: 5, text: 'LAN 5', remark: 'no. 5' },
      { number: 6, text: 'Radio 8 = LAN 6', remark: 'near miss: one digit differs' },
    ]);
  });

  it('tells the distance for a position, and stops at the given number', () => {
    const exact = [object(1, 'A', null, 0.5), object(2, 'B', null, 3)];
    expect(findSuggestions(answer({ read: 'position', exact }), 1)).toEqual([
      { number: 1, text: 'A', remark: '0.5000″' },
    ]);
  });
});
