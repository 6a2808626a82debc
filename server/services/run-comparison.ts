import { setImmediate as nextTurn } from 'node:timers/promises';
import { tangentOffset } from '../../shared/astro/sphere';
import type { PairStatistics } from '../../shared/schemas/run';
import { coneJoinChunks } from '../engine/cone-join';
import { controlPairsPerBin, equalEdges, separationHistogram } from '../engine/histogram';
import { concatPairs, TooManyPairs, type PairColumns } from '../engine/pair-columns';
import { pairPositionAnglesDeg, rankPairs, type PairRanks } from '../engine/pair-ranks';
import { refuse } from '../errors';
import type { RevisionPositions } from './revision-index';

const HISTOGRAM_BINS = 40;
/** Control fields lie this far off, arcsec, or three radii where that is further. */
const CONTROL_SHIFT_ARCSEC = 180;
const CONTROL_SHIFT_RADII = 3;

/** One catalogue of a comparison. */
export interface ComparedSide {
  label: string;
  revisionId: number;
  positions: RevisionPositions;
}

/** All pairs of two catalogues within a radius, with what they say about each other. */
export interface Comparison {
  a: ComparedSide;
  b: ComparedSide;
  pairs: PairColumns;
  ranks: PairRanks;
  paDeg: Float64Array;
}

/** Joins two catalogues; `report` hears how many rows of A are done. Refuses 'too-many-pairs'. */
export async function compare(
  a: ComparedSide,
  b: ComparedSide,
  radiusArcsec: number,
  maxPairs: number,
  report: (doneRows: number) => Promise<void>,
): Promise<Comparison> {
  const parts: PairColumns[] = [];
  try {
    for (const { pairs, doneRows } of coneJoinChunks(a.positions, b.positions, radiusArcsec, { maxPairs })) {
      parts.push(pairs);
      await report(doneRows);
      // Signs of life and other jobs of this process need their turn between two chunks.
      await nextTurn();
    }
  } catch (error) {
    if (!(error instanceof TooManyPairs)) throw error;
    refuse(
      'too-many-pairs',
      `${a.label} and ${b.label} have more than ${maxPairs} pairs within ${radiusArcsec} arcsec.`,
    );
  }
  const pairs = concatPairs(parts);
  return {
    a,
    b,
    pairs,
    ranks: rankPairs(pairs, a.positions.rowCount, b.positions.rowCount),
    paDeg: pairPositionAnglesDeg(pairs, a.positions, b.positions),
  };
}

/** What a comparison found, in numbers; chance pairs are measured in control fields (methods handbook, section 5). */
export function pairStatisticsOf({ a, b, pairs, ranks }: Comparison, radiusArcsec: number): PairStatistics {
  const edges = equalEdges(radiusArcsec, HISTOGRAM_BINS);
  const shiftArcsec = Math.max(CONTROL_SHIFT_ARCSEC, CONTROL_SHIFT_RADII * radiusArcsec);
  const controls = controlPairsPerBin(a.positions, b.positions, radiusArcsec, edges, { shiftArcsec });
  const chance = [...(controls?.meanPerBin ?? [])];
  const best = mutualBestPairs(ranks);
  const offsets = offsetsOf(a, b, pairs, best);
  let crowded = 0;
  for (let i = 0; i < pairs.a.length; i += 1) {
    if ((ranks.partnersOfA[i] ?? 0) > 1 || (ranks.partnersOfB[i] ?? 0) > 1) crowded += 1;
  }
  return {
    a: a.label,
    b: b.label,
    candidates: pairs.a.length,
    mutualBest: best.length,
    crowded,
    sourcesAWithCandidate: countDistinct(pairs.a, a.positions.rowCount),
    sourcesBWithCandidate: countDistinct(pairs.b, b.positions.rowCount),
    medianSepArcsec: median(Float64Array.from(best, (i) => pairs.sepArcsec[i] ?? NaN)),
    medianOffsetEastArcsec: median(offsets.east),
    medianOffsetNorthArcsec: median(offsets.north),
    chancePairs: chance.reduce((sum, pairsInBin) => sum + pairsInBin, 0),
    histogram: { edgesArcsec: [...edges], counts: [...separationHistogram(pairs.sepArcsec, edges)], chance },
  };
}

function countDistinct(rows: Uint32Array, rowCount: number): number {
  const seen = new Uint8Array(rowCount);
  for (const row of rows) seen[row] = 1;
  return seen.reduce((sum, isSeen) => sum + isSeen, 0);
}

function mutualBestPairs({ mutualBest }: PairRanks): Uint32Array {
  const best = new Uint32Array(mutualBest.reduce((sum, isBest) => sum + isBest, 0));
  let at = 0;
  mutualBest.forEach((isBest, i) => {
    if (isBest === 1) best[at++] = i;
  });
  return best;
}

/** Tangent-plane offsets of B from A, arcsec, of the chosen pairs (methods handbook, section 1). */
function offsetsOf(
  a: ComparedSide,
  b: ComparedSide,
  pairs: PairColumns,
  chosen: Uint32Array,
): { east: Float64Array; north: Float64Array } {
  const east = new Float64Array(chosen.length);
  const north = new Float64Array(chosen.length);
  chosen.forEach((pair, i) => {
    const offset = tangentOffset(placeOf(b, pairs.b[pair] ?? 0), placeOf(a, pairs.a[pair] ?? 0));
    // Pairs are at most a degree apart, where the tangent plane always has an answer.
    east[i] = offset?.xiArcsec ?? NaN;
    north[i] = offset?.etaArcsec ?? NaN;
  });
  return { east, north };
}

function placeOf({ positions }: ComparedSide, row: number) {
  return { raDeg: positions.raDeg[row] ?? NaN, decDeg: positions.decDeg[row] ?? NaN };
}

/** The median of values (their array is sorted in place); null without values. */
function median(values: Float64Array): number | null {
  if (values.length === 0) return null;
  values.sort();
  const middle = values.length >> 1;
  const upper = values[middle] ?? NaN;
  return values.length % 2 === 1 ? upper : ((values[middle - 1] ?? NaN) + upper) / 2;
}
