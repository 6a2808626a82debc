import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { separationArcsec } from '../../shared/astro/sphere';
import { coneJoin, coneJoinChunks, coneSelfJoin, JoinStopped } from './cone-join';
import { TooManyPairs, type PairColumns } from './pair-columns';
import type { PositionColumns } from './positions';
import { emptyColumns, SAMPLE_BANDS, samplePair, type SampleSky } from './sample-skies';

/** A pair of row numbers as one number; rows stay below 2^26 here. */
const pairNumber = (a: number, b: number): number => a * 2 ** 26 + b;

/** Pairs as ascending numbers: duplicates stay visible. */
function pairNumbers({ a, b }: PairColumns): Float64Array {
  return Float64Array.from(a, (row, pair) => pairNumber(row, b[pair] ?? NaN)).sort();
}

/** Every row against every row in its declination band, by the canonical formula. No RA logic that could be wrong. */
function bruteForce(a: PositionColumns, b: PositionColumns, radiusArcsec: number): Float64Array {
  const found: number[] = [];
  const reachDeg = (radiusArcsec / 3600) * 1.001 + 1e-9;
  const byDec = Array.from(b.decDeg, (dec, row) => ({ row, ra: b.raDeg[row] ?? NaN, dec })).sort(
    (one, two) => one.dec - two.dec,
  );
  a.decDeg.forEach((dec, row) => {
    const ra = a.raDeg[row] ?? NaN;
    for (let at = firstFrom(byDec, dec - reachDeg); at < byDec.length; at += 1) {
      const other = byDec[at];
      if (!other || other.dec > dec + reachDeg) break;
      if (separationArcsec(ra, dec, other.ra, other.dec) <= radiusArcsec)
        found.push(pairNumber(row, other.row));
    }
  });
  return Float64Array.from(found).sort();
}

function firstFrom(byDec: readonly { dec: number }[], dec: number): number {
  let [low, high] = [0, byDec.length];
  while (low < high) {
    const middle = (low + high) >> 1;
    if ((byDec[middle]?.dec ?? NaN) < dec) low = middle + 1;
    else high = middle;
  }
  return low;
}

/** The same pairs, each once. Says the first difference rather than printing a million numbers. */
function expectSamePairs(found: PairColumns | Float64Array, expected: Float64Array): void {
  const numbers = found instanceof Float64Array ? found : pairNumbers(found);
  const firstDifference = numbers.findIndex((number, place) => number !== expected[place]);
  expect({ count: numbers.length, firstDifference }).toEqual({ count: expected.length, firstDifference: -1 });
}

function columns(...places: [raDeg: number, decDeg: number][]): PositionColumns {
  return {
    raDeg: Float64Array.from(places, ([ra]) => ra),
    decDeg: Float64Array.from(places, ([, dec]) => dec),
  };
}

const SKIES = Object.keys(SAMPLE_BANDS) as SampleSky[];
const SEED = Math.floor(Math.random() * 2 ** 31);

describe(`coneJoin against every row with every row (seed ${SEED})`, () => {
  const radii = [0.0001, 0.3, 2, 30, 600, 3600];
  it.each(SKIES.flatMap((sky) => radii.map((radius) => [sky, radius] as const)))(
    '%s, %d arcsec',
    (sky, radius) => {
      const { a, b } = samplePair(sky, radius >= 600 ? 300 : 1500, Math.min(radius * 2, 20), SEED + radius);
      const pairs = coneJoin(a, b, radius);
      expectSamePairs(pairs, bruteForce(a, b, radius));
      expect(pairs.a.length).toBeGreaterThan(0);
    },
  );

  it.each(SKIES)('%s, many rows: several buckets', (sky) => {
    const { a, b } = samplePair(sky, 20_000, 3, SEED);
    expectSamePairs(coneJoin(a, b, 2), bruteForce(a, b, 2));
  });

  it('catalogues of very different sizes and places', () => {
    const { a } = samplePair('dense', 12, 1, SEED);
    const { b } = samplePair('uniform', 40_000, 1, SEED + 1);
    const { b: field } = samplePair('dense', 3000, 1, SEED + 2);
    for (const other of [b, field]) {
      expectSamePairs(coneJoin(a, other, 600), bruteForce(a, other, 600));
      expectSamePairs(coneJoin(other, a, 600), bruteForce(other, a, 600));
    }
  });

  it('any few positions, any radius, poles and RA 0 and 360 among them', () => {
    const ra = fc.oneof(
      fc.constantFrom(0, 360, 180, 359.9999, 0.0001),
      fc.double({ min: 0, max: 360, noNaN: true }),
    );
    const dec = fc.oneof(
      fc.constantFrom(-90, 90, 0, 89.9999, -89.9999, 89.5),
      fc.double({ min: -90, max: 90, noNaN: true }),
    );
    const sky = fc.array(fc.tuple(ra, dec), { maxLength: 25 });
    const radius = fc.oneof(fc.constantFrom(1, 3600), fc.double({ min: 1e-4, max: 3600, noNaN: true }));
    fc.assert(
      fc.property(sky, sky, radius, (one, two, arcsec) => {
        const [a, b] = [columns(...one), columns(...two)];
        expectSamePairs(coneJoin(a, b, arcsec), bruteForce(a, b, arcsec));
      }),
      { numRuns: 400 },
    );
  });
});

describe('coneJoin at the edges of the sky', () => {
  it('finds a pair across RA 0 once', () => {
    const pairs = coneJoin(columns([359.9999, 10]), columns([0.0001, 10], [359.9998, 10]), 2);
    expect([...pairNumbers(pairs)]).toEqual([0, 1]);
  });

  it('finds a pair across a pole once', () => {
    const pairs = coneJoin(columns([10, 89.9999]), columns([190, 89.9999], [77, 90]), 1);
    expect([...pairNumbers(pairs)]).toEqual([0, 1]);
  });

  it('takes RA 360 for RA 0', () => {
    const pairs = coneJoin(columns([360, -5]), columns([0, -5], [360, -5]), 0.001);
    expect([...pairNumbers(pairs)]).toEqual([0, 1]);
    expect([...pairs.sepArcsec]).toEqual([0, 0]);
  });

  it('gives separations of the canonical formula', () => {
    for (const sky of SKIES) {
      const { a, b } = samplePair(sky, 1000, 4, 11);
      const { a: rowsA, b: rowsB, sepArcsec } = coneJoin(a, b, 5);
      let worst = 0;
      rowsA.forEach((row, pair) => {
        const other = rowsB[pair] ?? NaN;
        const exact = separationArcsec(
          a.raDeg[row] ?? NaN,
          a.decDeg[row] ?? NaN,
          b.raDeg[other] ?? NaN,
          b.decDeg[other] ?? NaN,
        );
        worst = Math.max(worst, Math.abs((sepArcsec[pair] ?? NaN) - exact));
      });
      expect(rowsA.length).toBeGreaterThan(400);
      expect(worst).toBeLessThan(1e-10);
      expect(Math.max(...sepArcsec)).toBeLessThanOrEqual(5);
    }
  });

  it('a pair at exactly the radius is within it', () => {
    const radius = separationArcsec(20, 30, 20.0005, 30.0003);
    const [a, b] = [columns([20, 30]), columns([20.0005, 30.0003])];
    expect(coneJoin(a, b, radius).a).toHaveLength(1);
    expect(coneJoin(a, b, radius * (1 - 1e-14)).a).toHaveLength(0);
  });
});

describe('coneJoin with unusual input', () => {
  it('empty catalogues give no pairs', () => {
    const some = columns([1, 2]);
    expect(coneJoin(emptyColumns(0), some, 1).a).toHaveLength(0);
    expect(coneJoin(some, emptyColumns(0), 1).a).toHaveLength(0);
  });

  it('many rows at one place all pair, up to the limit', () => {
    const a = { raDeg: new Float64Array(300).fill(123.4), decDeg: new Float64Array(300).fill(-56.7) };
    expect(coneJoin(a, a, 0.0001).a).toHaveLength(90_000);
    expect(() => coneJoin(a, a, 0.0001, { maxPairs: 89_999 })).toThrow(TooManyPairs);
    expect(coneJoin(a, a, 0.0001, { maxPairs: 90_000 }).a).toHaveLength(90_000);
  });

  it('stops early on a hopeless join instead of filling the memory', () => {
    const a = { raDeg: new Float64Array(60_000).fill(9), decDeg: new Float64Array(60_000).fill(9) };
    expect(() => coneJoin(a, a, 1, { maxPairs: 500_000 })).toThrow(TooManyPairs);
  });

  it('says how many pairs it had reached', () => {
    const a = { raDeg: new Float64Array(30_000).fill(1), decDeg: new Float64Array(30_000).fill(1) };
    const b = columns([1, 1], [1, 1]);
    try {
      coneJoin(a, b, 1, { maxPairs: 20_000 });
      expect.unreachable();
    } catch (error) {
      expect(error).toBeInstanceOf(TooManyPairs);
      expect(error).toMatchObject({ maxPairs: 20_000 });
      expect((error as TooManyPairs).count).toBeGreaterThan(20_000);
      expect((error as TooManyPairs).count).toBeLessThan(20_100);
    }
  });

  it.each([
    [columns([NaN, 0]), 'b.raDeg[0] must be 0..360, not NaN'],
    [columns([0, 0], [0, NaN]), 'b.decDeg[1] must be -90..90, not NaN'],
    [columns([-0.1, 0]), 'b.raDeg[0] must be 0..360, not -0.1'],
    [columns([0, 90.1]), 'b.decDeg[0] must be -90..90, not 90.1'],
    [{ raDeg: new Float64Array(2), decDeg: new Float64Array(1) }, 'b: raDeg has 2 rows, decDeg has 1'],
  ])('refuses what is not on the sky (%#)', (b, message) => {
    expect(() => coneJoin(columns([0, 0]), b, 1)).toThrow(new RangeError(message));
  });

  it.each([0, -1, NaN, 3600.1, Infinity])('refuses a radius of %d', (radius) => {
    expect(() => coneJoin(columns([0, 0]), columns([0, 0]), radius)).toThrow(RangeError);
  });
});

describe('long joins', () => {
  const { a, b } = samplePair('uniform', 60_000, 1, 5);

  it('report progress up to the last row', () => {
    const seen: number[] = [];
    coneJoin(a, b, 2, { onProgress: (done, total) => seen.push(done / total) });
    expect(seen.length).toBeGreaterThan(3);
    expect(seen).toEqual([...seen].sort((one, two) => one - two));
    expect(seen.at(-1)).toBe(1);
  });

  it('report the last row also where the other catalogue has nothing', () => {
    const seen: number[] = [];
    coneJoin(columns([10, -20], [10, 80]), columns([10, -20]), 1, { onProgress: (done) => seen.push(done) });
    expect(seen.at(-1)).toBe(2);
  });

  it('stop when asked to', () => {
    let looks = 0;
    const shouldStop = () => ++looks === 2;
    expect(() => coneJoin(a, b, 2, { shouldStop })).toThrow(JoinStopped);
    expect(looks).toBe(2);
  });

  it('give the same pairs in chunks', () => {
    const chunks = [...coneJoinChunks(a, b, 2)];
    expect(chunks.length).toBeGreaterThan(3);
    const numbers = Float64Array.from(chunks.flatMap(({ pairs }) => [...pairNumbers(pairs)])).sort();
    expectSamePairs(numbers, pairNumbers(coneJoin(a, b, 2)));
  });
});

describe('coneSelfJoin', () => {
  it('gives each pair once and no row with itself', () => {
    const { b } = samplePair('dense', 2000, 2, 9);
    const each = bruteForce(b, b, 60).filter((number) => Math.floor(number / 2 ** 26) < number % 2 ** 26);
    expectSamePairs(coneSelfJoin(b, 60), each);
    expect(each.length).toBeGreaterThan(100);
  });
});
