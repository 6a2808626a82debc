/**
 * Separation histograms, and the pairs that chance alone would give, measured in shifted control fields.
 * Methods handbook, section 5.
 */
import { offsetPosition } from '../../shared/astro/sphere';
import { coneJoinChunks, type JoinLimits } from './cone-join';
import type { PositionColumns } from './positions';

export const CONTROL_DIRECTIONS = 8;

/**
 * Counts of separations (arcsec) per bin. Bin i is edges[i] <= separation < edges[i + 1]; the last one is closed on
 * both sides. What lies outside all bins is not counted. Throws RangeError when the edges do not ascend.
 */
export function separationHistogram(sepArcsec: Float64Array, edges: ArrayLike<number>): Float64Array {
  checkEdges(edges);
  const counts = new Float64Array(edges.length - 1);
  addToHistogram(counts, sepArcsec, edges);
  return counts;
}

/** `bins` equally wide bins from 0 to a radius (arcsec). */
export function equalEdges(radiusArcsec: number, bins: number): Float64Array {
  if (!Number.isInteger(bins) || bins < 1)
    throw new RangeError(`bins must be a positive integer, not ${bins}`);
  return Float64Array.from({ length: bins + 1 }, (_, edge) => (radiusArcsec * edge) / bins);
}

export interface ControlOptions extends JoinLimits {
  /** How far A is moved, arcsec; further than the radius, so that true pairs are out of reach. */
  shiftArcsec: number;
  /** Called after each direction; true ends the measurement and gives null. */
  shouldStop?: () => boolean;
}

export interface ControlPairs {
  /** Chance pairs per bin: the mean over the directions. */
  readonly meanPerBin: Float64Array;
  /** All chance pairs within the radius, by direction. */
  readonly pairsPerDirection: readonly number[];
}

/**
 * Chance pairs per bin: A is moved by `shiftArcsec` in 8 directions (position angles 0, 45, … 315 deg) and joined
 * with B again; the counts are averaged. Where A's moved field leaves B's coverage the chance is underestimated:
 * keep the shift small against the field. Null when `shouldStop` said so; throws RangeError, TooManyPairs.
 */
export function controlPairsPerBin(
  a: PositionColumns,
  b: PositionColumns,
  radiusArcsec: number,
  edges: ArrayLike<number>,
  { shiftArcsec, shouldStop, ...limits }: ControlOptions,
): ControlPairs | null {
  checkEdges(edges);
  if (!(shiftArcsec > radiusArcsec && shiftArcsec < 180 * 3600)) {
    throw new RangeError(`shiftArcsec must be above the radius of ${radiusArcsec}, not ${shiftArcsec}`);
  }
  const counts = new Float64Array(edges.length - 1);
  const pairsPerDirection: number[] = [];
  for (let direction = 0; direction < CONTROL_DIRECTIONS; direction += 1) {
    const moved = shifted(a, shiftArcsec, (360 / CONTROL_DIRECTIONS) * direction);
    let pairs = 0;
    for (const chunk of coneJoinChunks(moved, b, radiusArcsec, limits)) {
      addToHistogram(counts, chunk.pairs.sepArcsec, edges);
      pairs += chunk.pairs.a.length;
    }
    pairsPerDirection.push(pairs);
    if (shouldStop?.()) return null;
  }
  return { meanPerBin: counts.map((count) => count / CONTROL_DIRECTIONS), pairsPerDirection };
}

export interface ControlSummary {
  /** Mean number of chance pairs, its Poisson error, and the scatter (standard deviation) between the directions. */
  readonly expectedFalse: number;
  readonly poissonError: number;
  readonly scatter: number;
  /** Real pairs less the expected false ones. May be negative: it is an estimate. */
  readonly truePairs: number;
  /** Share of the pairs that is expected to be chance; null without pairs. */
  readonly falseShare: number | null;
}

/** What control fields say about the pairs of the real field. Throws RangeError without control fields. */
export function summariseControls(
  pairsInShiftedFields: readonly number[],
  pairsInRealField: number,
): ControlSummary {
  const fields = pairsInShiftedFields.length;
  if (fields === 0) throw new RangeError('pairsInShiftedFields must not be empty');
  const total = pairsInShiftedFields.reduce((sum, pairs) => sum + pairs, 0);
  const expectedFalse = total / fields;
  const squares = pairsInShiftedFields.reduce((sum, pairs) => sum + (pairs - expectedFalse) ** 2, 0);
  return {
    expectedFalse,
    poissonError: Math.sqrt(total) / fields,
    scatter: fields > 1 ? Math.sqrt(squares / (fields - 1)) : 0,
    truePairs: pairsInRealField - expectedFalse,
    falseShare: pairsInRealField > 0 ? expectedFalse / pairsInRealField : null,
  };
}

function shifted({ raDeg, decDeg }: PositionColumns, shiftArcsec: number, paDeg: number): PositionColumns {
  const moved = { raDeg: new Float64Array(raDeg.length), decDeg: new Float64Array(raDeg.length) };
  for (let row = 0; row < raDeg.length; row += 1) {
    const place = offsetPosition(
      { raDeg: raDeg[row] ?? NaN, decDeg: decDeg[row] ?? NaN },
      shiftArcsec,
      paDeg,
    );
    moved.raDeg[row] = place.raDeg;
    moved.decDeg[row] = place.decDeg;
  }
  return moved;
}

function checkEdges(edges: ArrayLike<number>): void {
  if (edges.length < 2) throw new RangeError(`edges must hold at least two values, not ${edges.length}`);
  for (let edge = 1; edge < edges.length; edge += 1) {
    if (!((edges[edge] ?? NaN) > (edges[edge - 1] ?? NaN))) {
      throw new RangeError(`edges[${edge}] must be above edges[${edge - 1}], not ${edges[edge]}`);
    }
  }
}

function addToHistogram(counts: Float64Array, sepArcsec: Float64Array, edges: ArrayLike<number>): void {
  const lowest = edges[0] as number;
  const highest = edges[edges.length - 1] as number;
  for (const sep of sepArcsec) {
    if (!(sep >= lowest && sep <= highest)) continue;
    let below = 0;
    let above = counts.length;
    while (above - below > 1) {
      const middle = (below + above) >> 1;
      if (sep >= (edges[middle] as number)) below = middle;
      else above = middle;
    }
    counts[below] = (counts[below] as number) + 1;
  }
}
