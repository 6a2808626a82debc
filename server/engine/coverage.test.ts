import { describe, expect, it } from 'vitest';
import { healpixCell } from '../../shared/astro/healpix';
import { coarserCoverage, coverageOf } from './coverage';
import { emptyColumns, samplePair } from './sample-skies';

describe('coverageOf', () => {
  const { a } = samplePair('uniform', 4000, 1, 41);

  it('counts each source in its cell', () => {
    const { cells, counts, order } = coverageOf(a, 4);
    expect(order).toBe(4);
    const expected = new Map<number, number>();
    a.raDeg.forEach((ra, row) => {
      const cell = healpixCell(4, ra, a.decDeg[row] ?? NaN);
      expected.set(cell, (expected.get(cell) ?? 0) + 1);
    });
    expect([...cells]).toEqual([...expected.keys()].sort((one, two) => one - two));
    expect([...counts]).toEqual([...cells].map((cell) => expected.get(cell)));
    expect(counts.reduce((sum, count) => sum + count, 0)).toBe(4000);
  });

  it('one order coarser is the same as counted there', () => {
    expect(coarserCoverage(coverageOf(a, 6))).toEqual(coverageOf(a, 5));
    expect(() => coarserCoverage(coverageOf(a, 0))).toThrow(RangeError);
  });

  it('holds nothing for an empty catalogue and refuses impossible input', () => {
    expect(coverageOf(emptyColumns(0), 3).cells).toHaveLength(0);
    expect(() => coverageOf(a, 15)).toThrow(RangeError);
    expect(() => coverageOf({ raDeg: Float64Array.of(NaN), decDeg: Float64Array.of(0) }, 3)).toThrow(
      RangeError,
    );
  });
});
