import { describe, expect, it } from 'vitest';
import { epochGaps, movedItem, radiusShares } from './radius-advice';

describe('radiusShares', () => {
  it('combines the errors in quadrature', () => {
    const [only] = radiusShares(
      [
        { label: 'A', medianErrArcsec: 0.3 },
        { label: 'B', medianErrArcsec: 0.4 },
      ],
      1,
    );
    expect(only?.sigmaArcsec).toBeCloseTo(0.5, 12);
    // Two sigma of a circular normal error hold 1 - exp(-2) = 86.47 % (Rayleigh distribution, closed form).
    expect(only?.share).toBeCloseTo(0.8647, 4);
  });

  it('says nothing about catalogues without stated errors', () => {
    const three = [
      { label: 'A', medianErrArcsec: 0.3 },
      { label: 'B', medianErrArcsec: null },
      { label: 'C', medianErrArcsec: 0.1 },
    ];
    expect(radiusShares(three, 1).map(({ a, b }) => [a, b])).toEqual([['A', 'C']]);
  });

  it('says nothing where both errors are zero', () => {
    const exact = [
      { label: 'A', medianErrArcsec: 0 },
      { label: 'B', medianErrArcsec: 0 },
    ];
    expect(radiusShares(exact, 1)).toEqual([]);
  });
});

describe('epochGaps', () => {
  it('names pairs more than a year apart, in either direction', () => {
    const gaps = epochGaps([
      { label: 'A', epochYear: 2016 },
      { label: 'B', epochYear: 2000 },
      { label: 'C', epochYear: 2017 },
      { label: 'D', epochYear: null },
    ]);
    expect(gaps.map(({ a, b, years }) => [a.label, b.label, years])).toEqual([
      ['A', 'B', 16],
      ['B', 'C', 17],
    ]);
  });
});

describe('movedItem', () => {
  it('swaps neighbours and stops at the ends', () => {
    expect(movedItem(['a', 'b', 'c'], 2, -1)).toEqual(['a', 'c', 'b']);
    expect(movedItem(['a', 'b', 'c'], 0, 1)).toEqual(['b', 'a', 'c']);
    expect(movedItem(['a', 'b'], 0, -1)).toEqual(['a', 'b']);
    expect(movedItem(['a', 'b'], 1, 1)).toEqual(['a', 'b']);
    expect(movedItem(['a', 'b'], 5, 1)).toEqual(['a', 'b']);
  });
});
