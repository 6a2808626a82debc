import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { separationArcsec } from '../../shared/astro/sphere';
import { coneJoin, coneJoinChunks, coneSelfJoin, JoinStopped } from './cone-join';
import { TooManyPairs, type PairColumns } from './pair-columns';
import type { PositionColumns } from './positions';
import { emptyColumns, SAMPLE_BANDS, samplePair, type SampleSky } from './sample-skies';

/** Pairs as sorted 'a-b' texts: duplicates stay visible. */
function names({ a, b }: PairColumns): string[] {
  return Array.from(a, (row, pair) => `${row}-${b[pair]}`).sort();
}

/** Every row against every row by the canonical formula; declination only to save time. */
function bruteForce(a: PositionColumns, b: PositionColumns, radiusArcsec: number): string[] {
  const found: string[] = [];
  const reachDeg = (radiusArcsec / 3600) * 1.001 + 1e-9;
  for (let one = 0; one < a.raDeg.length; one += 1) {
    const ra = a.raDeg[one] ?? NaN;
    const dec = a.decDeg[one] ?? NaN;
    for (let two = 0; two < b.raDeg.length; two += 1) {
      const otherDec = b.decDeg[two] ?? NaN;
      if (Math.abs(otherDec - dec) > reachDeg) continue;
      if (separationArcsec(ra, dec, b.raDeg[two] ?? NaN, otherDec) <= radiusArcsec)
        found.push(`${one}-${two}`);
    }
  }
  return found.sort();
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
      const { a, b } = samplePair(sky, 1500, Math.min(radius * 2, 20), SEED + radius);
      const pairs = coneJoin(a, b, radius);
      expect(names(pairs)).toEqual(bruteForce(a, b, radius));
      expect(pairs.a.length).toBeGreaterThan(0);
    },
  );

  it.each(SKIES)('%s, many rows: several buckets', (sky) => {
    const { a, b } = samplePair(sky, 20_000, 3, SEED);
    expect(names(coneJoin(a, b, 2))).toEqual(bruteForce(a, b, 2));
  });

  it('catalogues of very different sizes and places', () => {
    const { a } = samplePair('dense', 12, 1, SEED);
    const { b } = samplePair('uniform', 50_000, 1, SEED + 1);
    const { b: field } = samplePair('dense', 3000, 1, SEED + 2);
    for (const other of [b, field]) {
      expect(names(coneJoin(a, other, 600))).toEqual(bruteForce(a, other, 600));
      expect(names(coneJoin(other, a, 600))).toEqual(bruteForce(other, a, 600));
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
        expect(names(coneJoin(a, b, arcsec))).toEqual(bruteForce(a, b, arcsec));
      }),
      { numRuns: 400 },
    );
  });
});

describe('coneJoin at the edges of the sky', () => {
  it('finds a pair across RA 0 once', () => {
    const pairs = coneJoin(columns([359.9999, 10]), columns([0.0001, 10], [359.9998, 10]), 2);
    expect(names(pairs)).toEqual(['0-0', '0-1']);
  });

  it('finds a pair across a pole once', () => {
    const pairs = coneJoin(columns([10, 89.9999]), columns([190, 89.9999], [77, 90]), 1);
    expect(names(pairs)).toEqual(['0-0', '0-1']);
  });

  it('takes RA 360 for RA 0', () => {
    const pairs = coneJoin(columns([360, -5]), columns([0, -5], [360, -5]), 0.001);
    expect(names(pairs)).toEqual(['0-0', '0-1']);
    expect([...pairs.sepArcsec]).toEqual([0, 0]);
  });

  it('gives separations of the canonical formula', () => {
    for (const sky of SKIES) {
      const { a, b } = samplePair(sky, 4000, 4, 11);
      const { a: rowsA, b: rowsB, sepArcsec } = coneJoin(a, b, 5);
      rowsA.forEach((row, pair) => {
        const other = rowsB[pair] ?? NaN;
        const exact = separationArcsec(
          a.raDeg[row] ?? NaN,
          a.decDeg[row] ?? NaN,
          b.raDeg[other] ?? NaN,
          b.decDeg[other] ?? NaN,
        );
        expect(Math.abs((sepArcsec[pair] ?? NaN) - exact)).toBeLessThan(1e-9);
        expect(sepArcsec[pair]).toBeLessThanOrEqual(5);
      });
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
    const a = { raDeg: new Float64Array(700).fill(123.4), decDeg: new Float64Array(700).fill(-56.7) };
    expect(coneJoin(a, a, 0.0001).a).toHaveLength(490_000);
    expect(() => coneJoin(a, a, 0.0001, { maxPairs: 489_999 })).toThrow(TooManyPairs);
    expect(coneJoin(a, a, 0.0001, { maxPairs: 490_000 }).a).toHaveLength(490_000);
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
      expect((error as TooManyPairs).count).toBeLessThan(60_000);
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

  it('stop when asked to', () => {
    let looks = 0;
    const shouldStop = () => ++looks === 2;
    expect(() => coneJoin(a, b, 2, { shouldStop })).toThrow(JoinStopped);
    expect(looks).toBe(2);
  });

  it('give the same pairs in chunks', () => {
    const parts = [...coneJoinChunks(a, b, 2)].flatMap(({ pairs }) => names(pairs));
    expect(parts.sort()).toEqual(names(coneJoin(a, b, 2)));
  });
});

describe('coneSelfJoin', () => {
  it('gives each pair once and no row with itself', () => {
    const { b } = samplePair('dense', 2000, 2, 9);
    const expected = bruteForce(b, b, 60).filter((name) => {
      const [one = 0, two = 0] = name.split('-').map(Number);
      return one < two;
    });
    expect(names(coneSelfJoin(b, 60))).toEqual(expected);
    expect(expected.length).toBeGreaterThan(100);
  });
});
