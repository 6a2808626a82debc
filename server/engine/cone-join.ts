/**
 * All pairs of two catalogues with a separation of at most a radius: exact at both poles and across RA 0/360,
 * each pair once. Layout: declination buckets, local grids, contiguous scans (see join-buckets, join-grid, join-scan).
 */
import { bucketsByDeclination, RECORD_SIZE, type JoinBuckets } from './join-buckets';
import { createJoinGrid, fillJoinGrid, type JoinGrid } from './join-grid';
import { giveBackNumbers } from './join-memory';
import { joinRadius, type JoinRadius } from './join-radius';
import { scanRows } from './join-scan';
import { concatPairs, createPairBuffer, takePairs, TooManyPairs, type PairColumns } from './pair-columns';
import { checkPositions, checkRadius, type PositionColumns, type PositionRange } from './positions';

/** 1 degree: the largest radius of a join. The radius formulas of join-radius.ts rely on it. */
export const MAX_JOIN_RADIUS_ARCSEC = 3600;
export const DEFAULT_MAX_PAIRS = 50_000_000;

/** Rows of A between two looks at progress, cancelling and the number of pairs. */
const ROWS_PER_CHUNK = 8_192;
/** The same where rows have very many partners; one row more may overshoot it. */
const PAIRS_PER_CHUNK = 1_000_000;

export interface JoinLimits {
  /** More pairs than this throw TooManyPairs. */
  maxPairs?: number;
}

export interface JoinOptions extends JoinLimits {
  /** Called now and then with the rows of A that are done. */
  onProgress?: (doneRows: number, totalRows: number) => void;
  /** Asked now and then; true ends the join with JoinStopped. */
  shouldStop?: () => boolean;
}

/** The caller's `shouldStop` said so. */
export class JoinStopped extends Error {
  override readonly name = 'JoinStopped';
}

/** Pairs found since the chunk before, and the rows of A that are done. */
export interface JoinChunk {
  pairs: PairColumns;
  doneRows: number;
  totalRows: number;
}

/**
 * All pairs with separation <= radiusArcsec (above 0, at most 3600). Their order is not specified, but is the same
 * for the same input. Throws RangeError for positions off the sky (NaN included) or a radius out of range,
 * TooManyPairs, JoinStopped.
 */
export function coneJoin(
  a: PositionColumns,
  b: PositionColumns,
  radiusArcsec: number,
  options: JoinOptions = {},
): PairColumns {
  const parts: PairColumns[] = [];
  let reported = 0;
  for (const chunk of coneJoinChunks(a, b, radiusArcsec, options)) {
    if (chunk.pairs.a.length > 0) parts.push(chunk.pairs);
    options.onProgress?.(chunk.doneRows, chunk.totalRows);
    reported = chunk.doneRows;
    if (options.shouldStop?.())
      throw new JoinStopped(`stopped after ${chunk.doneRows} of ${chunk.totalRows} rows`);
  }
  // The last rows may lie where B has none.
  if (reported < a.raDeg.length) options.onProgress?.(a.raDeg.length, a.raDeg.length);
  return concatPairs(parts);
}

/**
 * The pairs of a catalogue with itself, each once with a < b, no row with itself.
 * The limit counts both directions and the rows themselves.
 */
export function coneSelfJoin(
  rows: PositionColumns,
  radiusArcsec: number,
  options: JoinOptions = {},
): PairColumns {
  const { a, b, sepArcsec } = coneJoin(rows, rows, radiusArcsec, options);
  const kept = createPairBuffer(a.length);
  for (let pair = 0; pair < a.length; pair += 1) {
    if ((a[pair] as number) >= (b[pair] as number)) continue;
    kept.a[kept.length] = a[pair] as number;
    kept.b[kept.length] = b[pair] as number;
    kept.sepArcsec[kept.length] = sepArcsec[pair] as number;
    kept.length += 1;
  }
  return takePairs(kept);
}

/** `coneJoin` in chunks, for callers that stream the pairs or have other things to do in between. */
export function* coneJoinChunks(
  a: PositionColumns,
  b: PositionColumns,
  radiusArcsec: number,
  { maxPairs = DEFAULT_MAX_PAIRS }: JoinLimits = {},
): Generator<JoinChunk, void, undefined> {
  const aRange = checkPositions('a', a);
  const bRange = checkPositions('b', b);
  checkRadius(radiusArcsec, MAX_JOIN_RADIUS_ARCSEC);
  const totalRows = a.raDeg.length;
  if (totalRows === 0 || b.raDeg.length === 0) return;

  const radius = joinRadius(radiusArcsec);
  const buckets = bucketsByDeclination(a, aRange, b, radius);
  try {
    yield* joinBuckets(buckets, bRange, radius, totalRows, maxPairs);
  } finally {
    giveBackNumbers(buckets.a.records);
    giveBackNumbers(buckets.b.records);
  }
}

function* joinBuckets(
  buckets: JoinBuckets,
  bRange: PositionRange,
  radius: JoinRadius,
  totalRows: number,
  maxPairs: number,
): Generator<JoinChunk, void, undefined> {
  // The records hold 0 for an RA of 360.
  const grid = createJoinGrid(bRange.raMax === 360 ? 0 : bRange.raMin, bRange.raMax);
  const buffer = createPairBuffer(ROWS_PER_CHUNK * 2);
  let found = 0;
  for (let bucket = 0; bucket < buckets.bucketCount; bucket += 1) {
    const aFrom = buckets.a.start[bucket] as number;
    const aTo = buckets.a.end[bucket] as number;
    if (!prepareGrid(grid, buckets, bucket, radius)) continue;
    for (let from = aFrom; from < aTo;) {
      const to = Math.min(from + ROWS_PER_CHUNK, aTo);
      from = scanRows(
        buckets.a.records,
        from,
        to,
        grid,
        radius,
        buffer,
        Math.min(PAIRS_PER_CHUNK, maxPairs - found + 1),
      );
      found += buffer.length;
      if (found > maxPairs) throw new TooManyPairs(found, maxPairs);
      yield { pairs: takePairs(buffer), doneRows: from, totalRows };
    }
  }
}

/** False when the bucket can't hold a pair. */
function prepareGrid(grid: JoinGrid, { a, b }: JoinBuckets, bucket: number, radius: JoinRadius): boolean {
  const aFrom = a.start[bucket] as number;
  const aTo = a.end[bucket] as number;
  const bFrom = b.start[bucket] as number;
  const bTo = b.end[bucket] as number;
  if (aFrom === aTo || bFrom === bTo) return false;
  let min = Infinity;
  let max = -Infinity;
  for (let at = aFrom * RECORD_SIZE + 1; at < aTo * RECORD_SIZE; at += RECORD_SIZE) {
    const dec = a.records[at] as number;
    if (dec < min) min = dec;
    if (dec > max) max = dec;
  }
  fillJoinGrid(grid, b.records, bFrom, bTo, min, max, radius);
  return true;
}
