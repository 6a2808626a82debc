/** Made-up skies with known properties, for tests and measurements. Always the same for the same seed. */
import { offsetPosition } from '../../shared/astro/sphere';
import type { PositionColumns } from './positions';

export interface SamplePair {
  readonly a: PositionColumns;
  readonly b: PositionColumns;
}

/** Numbers 0 <= x < 1 from a seed (mulberry32: a public-domain mixer of 32 bits). */
export function seededRandom(seed: number): () => number {
  let state = seed | 0;
  return () => {
    state = (state + 0x6d2b79f5) | 0;
    let mixed = Math.imul(state ^ (state >>> 15), 1 | state);
    mixed = (mixed + Math.imul(mixed ^ (mixed >>> 7), 61 | mixed)) ^ mixed;
    return ((mixed ^ (mixed >>> 14)) >>> 0) / 4294967296;
  };
}

/** A place drawn evenly from a declination band, and from an RA range that may cross 0. */
interface Band {
  decFrom: number;
  decTo: number;
  raFrom: number;
  raWidth: number;
}

export const SAMPLE_BANDS = {
  uniform: [{ decFrom: -90, decTo: 90, raFrom: 0, raWidth: 360 }],
  dense: [{ decFrom: -31, decTo: -30, raFrom: 150, raWidth: 1.2 }],
  'north pole': [{ decFrom: 89.5, decTo: 90, raFrom: 0, raWidth: 360 }],
  'south pole': [{ decFrom: -90, decTo: -89.5, raFrom: 0, raWidth: 360 }],
  'RA 0 strip': [{ decFrom: -60, decTo: 60, raFrom: 359.95, raWidth: 0.1 }],
  'clumps in an empty sky': [
    { decFrom: 20, decTo: 20.1, raFrom: 40, raWidth: 0.1 },
    { decFrom: -90, decTo: 90, raFrom: 0, raWidth: 360 },
    { decFrom: -89.999, decTo: -89.97, raFrom: 300, raWidth: 90 },
  ],
} satisfies Record<string, Band[]>;
export type SampleSky = keyof typeof SAMPLE_BANDS;

/**
 * Two catalogues of `rows` rows: 60 % of B are rows of A moved by up to `jitterArcsec` in any direction, some by
 * nothing at all; the rest are places of their own. Row numbers are unrelated.
 */
export function samplePair(sky: SampleSky, rows: number, jitterArcsec: number, seed: number): SamplePair {
  const random = seededRandom(seed);
  const bands: readonly Band[] = SAMPLE_BANDS[sky];
  const a = emptyColumns(rows);
  const b = emptyColumns(rows);
  for (let row = 0; row < rows; row += 1) setRow(a, row, placeIn(bands, random));
  for (let row = 0; row < rows; row += 1) {
    // A stride without common factor with the number of rows visits each row once.
    const partner = (row * 7919 + 13) % rows;
    const from = { raDeg: a.raDeg[partner] ?? NaN, decDeg: a.decDeg[partner] ?? NaN };
    const distance = random() < 0.05 ? 0 : jitterArcsec * random();
    const isCopy = random() < 0.6;
    setRow(b, row, isCopy ? offsetPosition(from, distance, 360 * random()) : placeIn(bands, random));
  }
  return { a, b };
}

export function emptyColumns(rows: number): PositionColumns {
  return { raDeg: new Float64Array(rows), decDeg: new Float64Array(rows) };
}

function setRow(
  { raDeg, decDeg }: PositionColumns,
  row: number,
  place: { raDeg: number; decDeg: number },
): void {
  raDeg[row] = place.raDeg;
  decDeg[row] = place.decDeg;
}

function placeIn(bands: readonly Band[], random: () => number): { raDeg: number; decDeg: number } {
  const band = bands[Math.floor(random() * bands.length)];
  if (!band) throw new RangeError('a sky needs at least one band');
  const sinFrom = Math.sin((band.decFrom * Math.PI) / 180);
  const sinTo = Math.sin((band.decTo * Math.PI) / 180);
  const decDeg = (Math.asin(sinFrom + (sinTo - sinFrom) * random()) * 180) / Math.PI;
  return { raDeg: (band.raFrom + band.raWidth * random()) % 360, decDeg };
}
