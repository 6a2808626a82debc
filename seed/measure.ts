import { gunzipSync } from 'node:zlib';
import type { ScenarioFile, TruthRow } from './generate';
import type { Band } from './scenario';

/**
 * Counts pairs, completeness and purity of the scenario without any of the product's code: its own reading of the four
 * files, and a plain scan in declination order. What the product finds is compared with these numbers.
 */
export interface PairCounts {
  radiusArcsec: number;
  pairs: number;
  mutualNearest: number;
  mutualTrue: number;
  truePairs: number;
  completeness: number;
  purity: number;
}

export interface MeasuredRow {
  key: string;
  raRad: number;
  decRad: number;
}

const ARCSEC = Math.PI / 180 / 3600;
const RADIANS = Math.PI / 180;

/** The rows of a file that can be sources: key and position, read with nothing but string operations. */
export function readRows(file: ScenarioFile): MeasuredRow[] {
  const text = (file.name.endsWith('.gz') ? gunzipSync(file.bytes) : file.bytes).toString('utf8');
  const delimiter = { optical: ',', nir: ';', radio: '\t', xray: ',' }[file.band];
  const [, ...lines] = text.split('\n').filter((line) => line !== '' && !line.startsWith('#'));
  const rows: MeasuredRow[] = [];
  const keys = new Set<string>();
  for (const line of lines) {
    const cells = line.split(delimiter);
    const [raDeg, decDeg] = positionOf(file.band, cells);
    const key = cells[0] ?? '';
    const usable = raDeg >= 0 && raDeg <= 360 && decDeg >= -90 && decDeg <= 90 && !keys.has(key);
    if (!usable) continue;
    keys.add(key);
    rows.push({ key, raRad: raDeg * RADIANS, decRad: decDeg * RADIANS });
  }
  return rows.sort((a, b) => a.decRad - b.decRad);
}

function positionOf(band: Band, cells: readonly string[]): [number, number] {
  if (band === 'optical') return [cellNumber(cells[2]), cellNumber(cells[3])];
  const numbers = (band === 'xray' ? (cells[2] ?? '') : `${cells[1]} ${cells[2]}`).match(/[-+]?[\d.]+/g) ?? [];
  if (numbers.length !== 6) return [Number.NaN, Number.NaN];
  const [h, m, s, d, dm, ds] = numbers.map(Number) as [number, number, number, number, number, number];
  const sign = (numbers[3] ?? '').startsWith('-') ? -1 : 1;
  return [15 * (h + m / 60 + s / 3600), sign * (Math.abs(d) + dm / 60 + ds / 3600)];
}

const cellNumber = (cell: string | undefined) => (cell === undefined || cell === '' ? Number.NaN : Number(cell));

interface Pair {
  a: number;
  b: number;
  sepArcsec: number;
}

/** All pairs within a radius: a window in declination, every candidate in it checked by the haversine. */
function pairsWithin(a: readonly MeasuredRow[], b: readonly MeasuredRow[], radiusArcsec: number): Pair[] {
  const reach = radiusArcsec * ARCSEC * 1.000001;
  const pairs: Pair[] = [];
  let low = 0;
  a.forEach((left, i) => {
    while (low < b.length && (b[low]?.decRad ?? 0) < left.decRad - reach) low += 1;
    for (let k = low; k < b.length; k += 1) {
      const right = b[k];
      if (right === undefined || right.decRad > left.decRad + reach) break;
      const h =
        Math.sin((left.decRad - right.decRad) / 2) ** 2 +
        Math.cos(left.decRad) * Math.cos(right.decRad) * Math.sin((left.raRad - right.raRad) / 2) ** 2;
      const sepArcsec = (2 * Math.asin(Math.sqrt(h))) / ARCSEC;
      if (sepArcsec <= radiusArcsec) pairs.push({ a: i, b: k, sepArcsec });
    }
  });
  return pairs;
}

function nearestOf(pairs: readonly Pair[], side: 'a' | 'b'): Map<number, Pair> {
  const nearest = new Map<number, Pair>();
  for (const pair of pairs) {
    const known = nearest.get(pair[side]);
    if (known === undefined || pair.sepArcsec < known.sepArcsec) nearest.set(pair[side], pair);
  }
  return nearest;
}

/** Counts at one radius against the truth; a pair is true when both rows are light of the same thing. */
export function countPairs(
  left: ScenarioFile,
  right: ScenarioFile,
  truth: readonly TruthRow[],
  radiusArcsec: number,
): PairCounts {
  const a = readRows(left);
  const b = readRows(right);
  const pairs = pairsWithin(a, b, radiusArcsec);
  const nearestA = nearestOf(pairs, 'a');
  const nearestB = nearestOf(pairs, 'b');
  const mutual = pairs.filter((pair) => nearestA.get(pair.a) === pair && nearestB.get(pair.b) === pair);
  const truePairs = new Set<string>();
  for (const row of truth) {
    for (const one of row.keys[left.band]) for (const two of row.keys[right.band]) truePairs.add(`${one}\t${two}`);
  }
  const mutualTrue = mutual.filter((pair) => truePairs.has(`${a[pair.a]?.key}\t${b[pair.b]?.key}`)).length;
  return {
    radiusArcsec,
    pairs: pairs.length,
    mutualNearest: mutual.length,
    mutualTrue,
    truePairs: truePairs.size,
    completeness: mutualTrue / truePairs.size,
    purity: mutual.length === 0 ? 1 : mutualTrue / mutual.length,
  };
}
