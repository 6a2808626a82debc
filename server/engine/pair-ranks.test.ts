import { describe, expect, it } from 'vitest';
import { coneJoin } from './cone-join';
import { pairPositionAnglesDeg, rankPairs } from './pair-ranks';
import type { PairColumns } from './pair-columns';
import { samplePair } from './sample-skies';

function pairs(...rows: [a: number, b: number, sepArcsec: number][]): PairColumns {
  return {
    a: Uint32Array.from(rows, ([a]) => a),
    b: Uint32Array.from(rows, ([, b]) => b),
    sepArcsec: Float64Array.from(rows, ([, , sep]) => sep),
  };
}

describe('rankPairs', () => {
  it('ranks partners by separation on either side', () => {
    const ranks = rankPairs(pairs([0, 0, 2], [0, 1, 1], [1, 0, 0.5], [1, 2, 3]), 2, 3);
    expect([...ranks.rankOfB]).toEqual([2, 1, 1, 2]);
    expect([...ranks.rankOfA]).toEqual([2, 1, 1, 1]);
    expect([...ranks.partnersOfA]).toEqual([2, 2, 2, 2]);
    expect([...ranks.partnersOfB]).toEqual([2, 1, 2, 1]);
    expect([...ranks.mutualBest]).toEqual([0, 1, 1, 0]);
  });

  it('ranks equal separations by row number, whatever the order of the pairs', () => {
    const one = rankPairs(pairs([0, 5, 1], [0, 3, 1], [0, 4, 1]), 1, 6);
    expect([...one.rankOfB]).toEqual([3, 1, 2]);
    const other = rankPairs(pairs([0, 3, 1], [0, 4, 1], [0, 5, 1]), 1, 6);
    expect([...other.rankOfB]).toEqual([1, 2, 3]);
  });

  it('agrees with sorting every group by hand', () => {
    const { a, b } = samplePair('dense', 400, 5, 77);
    const found = coneJoin(a, b, 120);
    const ranks = rankPairs(found, 400, 400);
    const all = Array.from(found.a, (row, pair) => ({
      pair,
      row,
      other: found.b[pair] ?? 0,
      sep: found.sepArcsec[pair] ?? 0,
    }));
    for (const { pair, row, other, sep } of all) {
      const ofA = all.filter((each) => each.row === row);
      const nearer = ofA.filter((each) => each.sep < sep || (each.sep === sep && each.other < other));
      expect(ranks.rankOfB[pair]).toBe(nearer.length + 1);
      expect(ranks.partnersOfA[pair]).toBe(ofA.length);
    }
    expect(all.length).toBeGreaterThan(200);
  });

  it('a row is in at most one mutual pair', () => {
    const { a, b } = samplePair('north pole', 1500, 5, 78);
    const found = coneJoin(a, b, 300);
    const { mutualBest } = rankPairs(found, 1500, 1500);
    const mutualRows = Array.from(found.a).filter((_row, pair) => mutualBest[pair] === 1);
    expect(new Set(mutualRows).size).toBe(mutualRows.length);
    expect(mutualRows.length).toBeGreaterThan(300);
  });

  it('takes an empty list', () => {
    expect(rankPairs(pairs(), 0, 0).mutualBest).toHaveLength(0);
  });

  it('refuses rows that the catalogues do not have', () => {
    expect(() => rankPairs(pairs([2, 0, 1]), 2, 1)).toThrow(
      new RangeError('pairs.a[0] must be below 2, not 2'),
    );
    expect(() => rankPairs(pairs([0, 1, 1]), 1, 1)).toThrow(
      new RangeError('pairs.b[0] must be below 1, not 1'),
    );
  });
});

describe('pairPositionAnglesDeg', () => {
  it('gives NaN where there is no angle', () => {
    const from = { raDeg: Float64Array.of(10, 10, 5), decDeg: Float64Array.of(0, 0, 90) };
    const to = { raDeg: Float64Array.of(10, 10), decDeg: Float64Array.of(0, -1) };
    const angles = pairPositionAnglesDeg(pairs([0, 0, 0], [1, 1, 3600], [2, 1, 1]), from, to);
    expect([...angles]).toEqual([NaN, 180, NaN]);
  });
});
