import { describe, expect, it } from 'vitest';
import { separationArcsec } from '../../shared/astro/sphere';
import { buildConeIndex, loadConeIndex, UnreadableConeIndex, type ConeRows } from './cone-index';
import type { PositionColumns } from './positions';
import { emptyColumns, SAMPLE_BANDS, samplePair, seededRandom, type SampleSky } from './sample-skies';

const SEED = Math.floor(Math.random() * 2 ** 31);
const SKIES = Object.keys(SAMPLE_BANDS) as SampleSky[];

/** All rows, nearest first, by the canonical formula alone. */
function byDistance(rows: PositionColumns, raDeg: number, decDeg: number): { row: number; sep: number }[] {
  return Array.from(rows.raDeg, (ra, row) => ({
    row,
    sep: separationArcsec(raDeg, decDeg, ra, rows.decDeg[row] ?? NaN),
  })).sort((one, two) => one.sep - two.sep || one.row - two.row);
}

function expectRows(found: ConeRows, expected: readonly { row: number; sep: number }[]): void {
  expect([...found.rows]).toEqual(expected.map(({ row }) => row));
  expect([...found.sepArcsec]).toEqual(expected.map(({ sep }) => sep));
}

/** Places worth asking about: rows of the sky, poles, RA 0 and 180, and anywhere. */
function questions(rows: PositionColumns, random: () => number): [number, number][] {
  const own = Array.from({ length: 12 }, (): [number, number] => {
    const row = Math.floor(random() * rows.raDeg.length);
    return [rows.raDeg[row] ?? NaN, rows.decDeg[row] ?? NaN];
  });
  const anywhere = Array.from({ length: 6 }, (): [number, number] => [360 * random(), 180 * random() - 90]);
  return [
    ...own,
    ...anywhere,
    [0, 90],
    [123, -90],
    [0, 0],
    [180, 10],
    [179.9999, -30],
    [359.9999, -5],
    [360, 89.9],
  ];
}

describe(`cone index against every row (seed ${SEED})`, () => {
  const random = seededRandom(SEED);

  it.each(SKIES)('cones on the sky "%s"', (sky) => {
    const { b } = samplePair(sky, 1200, 10, SEED);
    const index = buildConeIndex(b);
    for (const [ra, dec] of questions(b, random)) {
      const all = byDistance(b, ra, dec);
      for (const radius of [0.001, 2, 60, 3600, 40_000, 330_000, 648_000]) {
        expectRows(
          index.cone(ra, dec, radius),
          all.filter(({ sep }) => sep <= radius),
        );
      }
    }
  });

  it.each(SKIES)('nearest rows on the sky "%s"', (sky) => {
    const { b } = samplePair(sky, 1200, 10, SEED + 1);
    const index = buildConeIndex(b);
    for (const [ra, dec] of questions(b, random)) {
      const all = byDistance(b, ra, dec);
      for (const count of [1, 5, 40]) expectRows(index.nearest(ra, dec, count), all.slice(0, count));
      const within = all.filter(({ sep }) => sep <= 300);
      expectRows(index.nearest(ra, dec, 10, 300), within.slice(0, 10));
    }
  });
});

describe('cone index', () => {
  it('orders equal separations by row number and cuts there', () => {
    const rows = { raDeg: new Float64Array(500).fill(200), decDeg: new Float64Array(500).fill(-10) };
    const index = buildConeIndex(rows);
    expect([...index.nearest(200, -10.001, 3).rows]).toEqual([0, 1, 2]);
    expect(index.cone(200, -10, 0.001).rows).toHaveLength(500);
  });

  it('counts a row at exactly the radius in', () => {
    const index = buildConeIndex({ raDeg: Float64Array.of(20.0005), decDeg: Float64Array.of(30.0003) });
    const sep = separationArcsec(20, 30, 20.0005, 30.0003);
    expect(index.cone(20, 30, sep).rows).toHaveLength(1);
    expect(index.cone(20, 30, sep * (1 - 1e-14)).rows).toHaveLength(0);
  });

  it('takes any RA for the centre', () => {
    const index = buildConeIndex({ raDeg: Float64Array.of(359.9999), decDeg: Float64Array.of(0) });
    for (const ra of [-0.0001, 359.9999, 719.9999, 0.0002]) expect(index.cone(ra, 0, 2).rows).toHaveLength(1);
  });

  it('an empty index finds nothing', () => {
    const index = loadConeIndex(buildConeIndex(emptyColumns(0)).bytes);
    expect(index.cone(10, 10, 3600).rows).toHaveLength(0);
    expect(index.nearest(10, 10, 3).rows).toHaveLength(0);
  });

  it.each([1, 3, 20, 70_000])('is the same after saving and loading, %d rows', (rowCount) => {
    const { b } = samplePair('uniform', rowCount, 1, 4);
    const built = buildConeIndex(b);
    // As read from a file: somewhere within a larger buffer.
    const inLarger = new Uint8Array(built.bytes.length + 40).subarray(5, 5 + built.bytes.length);
    inLarger.set(built.bytes);
    for (const loaded of [loadConeIndex(built.bytes.slice()), loadConeIndex(inLarger)]) {
      expect(loaded.rowCount).toBe(rowCount);
      expect(loaded.positions.raDeg.every((ra, row) => ra === b.raDeg[row])).toBe(true);
      expect(loaded.positions.decDeg.every((dec, row) => dec === b.decDeg[row])).toBe(true);
      expect(loaded.nearest(11, 22, 5)).toEqual(built.nearest(11, 22, 5));
      expect(loaded.cone(11, 22, 20_000)).toEqual(built.cone(11, 22, 20_000));
    }
  });

  it('refuses bytes that are no index, or were cut short', () => {
    const { bytes } = buildConeIndex(samplePair('uniform', 100, 1, 4).b);
    const changed = bytes.slice();
    changed[changed.length - 1] = 77;
    for (const bad of [
      new Uint8Array(0),
      new Uint8Array(64),
      bytes.subarray(8),
      bytes.slice(0, -8),
      changed,
    ]) {
      expect(() => loadConeIndex(bad)).toThrow(UnreadableConeIndex);
    }
  });

  it('refuses what is not on the sky and questions that make no sense', () => {
    const bad = { raDeg: Float64Array.of(1, NaN), decDeg: Float64Array.of(1, 2) };
    expect(() => buildConeIndex(bad)).toThrow(new RangeError('positions.raDeg[1] must be 0..360, not NaN'));
    const index = buildConeIndex(samplePair('uniform', 10, 1, 4).b);
    expect(() => index.cone(NaN, 0, 1)).toThrow(RangeError);
    expect(() => index.cone(0, 91, 1)).toThrow(RangeError);
    expect(() => index.cone(0, 0, 0)).toThrow(RangeError);
    expect(() => index.cone(0, 0, NaN)).toThrow(RangeError);
    expect(() => index.nearest(0, 0, 0)).toThrow(RangeError);
    expect(() => index.nearest(0, 0, 1.5)).toThrow(RangeError);
  });
});
