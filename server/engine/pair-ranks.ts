/** What a list of pairs says about each pair: how its partner ranks on either side, and its position angle. */
import { positionAngleDeg } from '../../shared/astro/sphere';
import type { PairColumns } from './pair-columns';
import type { PositionColumns } from './positions';

/** Columns parallel to the pairs. */
export interface PairRanks {
  /** Rank of B among the partners of A: 1 is the nearest. Equal separations rank by row number. */
  readonly rankOfB: Uint32Array;
  /** Rank of A among the partners of B. */
  readonly rankOfA: Uint32Array;
  /** Number of partners of A, and of B, within the list. */
  readonly partnersOfA: Uint32Array;
  readonly partnersOfB: Uint32Array;
  /** 1 where either is the other's nearest. */
  readonly mutualBest: Uint8Array;
}

/**
 * Ranks of the pairs of two catalogues with `rowsA` and `rowsB` rows.
 * Throws RangeError for columns of unequal length or a row number beyond its catalogue.
 */
export function rankPairs({ a, b, sepArcsec }: PairColumns, rowsA: number, rowsB: number): PairRanks {
  if (a.length !== b.length || a.length !== sepArcsec.length) {
    throw new RangeError(
      `pairs: a has ${a.length} rows, b has ${b.length}, sepArcsec has ${sepArcsec.length}`,
    );
  }
  const sideA = rankOneSide('a', a, b, sepArcsec, rowsA);
  const sideB = rankOneSide('b', b, a, sepArcsec, rowsB);
  const mutualBest = new Uint8Array(a.length);
  for (let pair = 0; pair < a.length; pair += 1) {
    if (sideA.rank[pair] === 1 && sideB.rank[pair] === 1) mutualBest[pair] = 1;
  }
  return {
    rankOfB: sideA.rank,
    rankOfA: sideB.rank,
    partnersOfA: sideA.partners,
    partnersOfB: sideB.partners,
    mutualBest,
  };
}

/** Groups the pairs by the row on one side (counting sort), sorts each group by separation, then partner. */
function rankOneSide(
  name: string,
  own: Uint32Array,
  partner: Uint32Array,
  sepArcsec: Float64Array,
  rows: number,
): { rank: Uint32Array; partners: Uint32Array } {
  const start = new Uint32Array(rows + 1);
  for (let pair = 0; pair < own.length; pair += 1) {
    const row = own[pair] as number;
    if (row >= rows) throw new RangeError(`pairs.${name}[${pair}] must be below ${rows}, not ${row}`);
    start[row + 1] = (start[row + 1] as number) + 1;
  }
  for (let row = 0; row < rows; row += 1)
    start[row + 1] = (start[row + 1] as number) + (start[row] as number);

  const grouped = new Uint32Array(own.length);
  const cursor = start.slice(0, rows);
  for (let pair = 0; pair < own.length; pair += 1) {
    const row = own[pair] as number;
    grouped[cursor[row] as number] = pair;
    cursor[row] = (cursor[row] as number) + 1;
  }

  const nearer = (one: number, two: number): number =>
    (sepArcsec[one] as number) - (sepArcsec[two] as number) ||
    (partner[one] as number) - (partner[two] as number);
  const rank = new Uint32Array(own.length);
  const partners = new Uint32Array(own.length);
  for (let row = 0; row < rows; row += 1) {
    const from = start[row] as number;
    const to = start[row + 1] as number;
    if (to - from > 1) grouped.subarray(from, to).sort(nearer);
    for (let place = from; place < to; place += 1) {
      const pair = grouped[place] as number;
      rank[pair] = place - from + 1;
      partners[pair] = to - from;
    }
  }
  return { rank, partners };
}

/** Position angle from A to B of each pair, degrees east of north; NaN where it is not defined. */
export function pairPositionAnglesDeg(
  { a, b }: PairColumns,
  from: PositionColumns,
  to: PositionColumns,
): Float64Array {
  const angles = new Float64Array(a.length);
  for (let pair = 0; pair < a.length; pair += 1) {
    const one = a[pair] as number;
    const two = b[pair] as number;
    const angle = positionAngleDeg(
      from.raDeg[one] ?? NaN,
      from.decDeg[one] ?? NaN,
      to.raDeg[two] ?? NaN,
      to.decDeg[two] ?? NaN,
    );
    angles[pair] = angle ?? NaN;
  }
  return angles;
}
