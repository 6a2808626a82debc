/**
 * First level of the join: declination buckets with about equally many rows, each small enough for the processor's
 * cache. A row becomes a record (ra, dec, row number) in its bucket. Rows of B are copied into every bucket they are
 * within the radius of; rows of A never are: so each pair comes out of exactly one bucket.
 */
import { takeNumbers } from './join-memory';
import type { JoinRadius } from './join-radius';
import type { PositionColumns, PositionRange } from './positions';

/** Values of one record: ra (degrees), dec (degrees), row number. */
export const RECORD_SIZE = 3;

/** Rows of A and B together in a bucket: 32k records and their cells fit into a second-level cache. */
const ROWS_PER_BUCKET = 16_384;
/** Bin numbers are kept in 16 bits; the last value means "in no bin". */
const NO_BIN = 0xffff;
const MAX_BINS = 8_192;
/** Lower buckets would copy a large share of B. */
const MIN_HEIGHT_IN_REACHES = 8;

export interface JoinBuckets {
  readonly bucketCount: number;
  /** Records of bucket i are `start[i]` to `start[i + 1]`. */
  readonly aStart: Int32Array;
  readonly bStart: Int32Array;
  readonly aRecords: Float64Array;
  readonly bRecords: Float64Array;
}

/** Declination bins of equal height over the range of A, fine enough to build buckets of equal counts from. */
interface DecBins {
  readonly min: number;
  readonly perDeg: number;
  readonly count: number;
}

/** The bin of each row, and the rows in each bin. */
interface BinnedRows {
  readonly binOfRow: Uint16Array;
  readonly rowsInBin: Uint32Array;
}

/**
 * Sorts both catalogues into buckets. Rows of B that no row of A can be near are left out.
 * The records are borrowed from join-memory: give them back when done.
 */
export function bucketsByDeclination(
  a: PositionColumns,
  aRange: PositionRange,
  b: PositionColumns,
  radius: JoinRadius,
): JoinBuckets {
  const bins = decBins(aRange, a.decDeg.length + b.decDeg.length);
  // Whole bins are copied into neighbouring buckets; one bin more than the radius allows for rounding.
  const reach = Math.ceil(radius.paddedDeg * bins.perDeg) + 1;
  const aBinned = binRows(a.decDeg, bins, 0);
  const bBinned = binRows(b.decDeg, bins, radius.paddedDeg);
  const bucketOfBin = equalCountBuckets(aBinned.rowsInBin, bBinned.rowsInBin, MIN_HEIGHT_IN_REACHES * reach);
  const bucketCount = (bucketOfBin[bins.count - 1] ?? 0) + 1;
  const own = placeRows(a, aBinned, bucketOfBin, bucketCount, 0);
  const copied = placeRows(b, bBinned, bucketOfBin, bucketCount, reach);
  return {
    bucketCount,
    aStart: own.start,
    aRecords: own.records,
    bStart: copied.start,
    bRecords: copied.records,
  };
}

function decBins({ decMin, decMax }: PositionRange, rows: number): DecBins {
  const heightDeg = decMax - decMin;
  const count = heightDeg > 0 ? Math.min(MAX_BINS, rows) : 1;
  return { min: decMin, count, perDeg: heightDeg > 0 ? count / heightDeg : 0 };
}

/**
 * The bin of a row never falls when its declination grows: that is what makes the buckets safe.
 * Rows further than `haloDeg` outside the bins get NO_BIN.
 */
function binRows(decDeg: Float64Array, { min, perDeg, count }: DecBins, haloDeg: number): BinnedRows {
  const binOfRow = new Uint16Array(decDeg.length);
  const rowsInBin = new Uint32Array(count);
  const lowest = min - haloDeg;
  const highest = perDeg > 0 ? min + count / perDeg + haloDeg * (1 + 1e-9) + 1e-12 : min + haloDeg;
  const lastBin = count - 1;
  for (let row = 0; row < decDeg.length; row += 1) {
    const dec = decDeg[row] as number;
    if (dec < lowest || dec > highest) {
      binOfRow[row] = NO_BIN;
      continue;
    }
    const place = (dec - min) * perDeg;
    const bin = place < 0 ? 0 : place > lastBin ? lastBin : place | 0;
    binOfRow[row] = bin;
    rowsInBin[bin] = (rowsInBin[bin] as number) + 1;
  }
  return { binOfRow, rowsInBin };
}

function equalCountBuckets(aRows: Uint32Array, bRows: Uint32Array, minBins: number): Uint16Array {
  const bucketOfBin = new Uint16Array(aRows.length);
  let bucket = 0;
  let rows = 0;
  let height = 0;
  for (let bin = 0; bin < aRows.length; bin += 1) {
    const more = (aRows[bin] as number) + (bRows[bin] as number);
    if (height >= minBins && rows + more > ROWS_PER_BUCKET) {
      bucket += 1;
      rows = 0;
      height = 0;
    }
    bucketOfBin[bin] = bucket;
    rows += more;
    height += 1;
  }
  return bucketOfBin;
}

/** Writes each row into its bucket and into those of the bins up to `reach` beside its own. */
function placeRows(
  { raDeg, decDeg }: PositionColumns,
  { binOfRow, rowsInBin }: BinnedRows,
  bucketOfBin: Uint16Array,
  bucketCount: number,
  reach: number,
): { start: Int32Array; records: Float64Array } {
  const lastBin = rowsInBin.length - 1;
  const firstBucket = new Uint16Array(rowsInBin.length);
  const lastBucket = new Uint16Array(rowsInBin.length);
  const start = new Int32Array(bucketCount + 1);
  for (let bin = 0; bin <= lastBin; bin += 1) {
    const first = bucketOfBin[Math.max(0, bin - reach)] as number;
    const last = bucketOfBin[Math.min(lastBin, bin + reach)] as number;
    firstBucket[bin] = first;
    lastBucket[bin] = last;
    for (let bucket = first; bucket <= last; bucket += 1) {
      start[bucket + 1] = (start[bucket + 1] as number) + (rowsInBin[bin] as number);
    }
  }
  for (let bucket = 0; bucket < bucketCount; bucket += 1) {
    start[bucket + 1] = (start[bucket + 1] as number) + (start[bucket] as number);
  }

  const cursor = start.slice();
  const records = takeNumbers((start[bucketCount] as number) * RECORD_SIZE);
  for (let row = 0; row < decDeg.length; row += 1) {
    const bin = binOfRow[row] as number;
    if (bin === NO_BIN) continue;
    const last = lastBucket[bin] as number;
    for (let bucket = firstBucket[bin] as number; bucket <= last; bucket += 1) {
      const place = cursor[bucket] as number;
      cursor[bucket] = place + 1;
      const at = place * RECORD_SIZE;
      const ra = raDeg[row] as number;
      records[at] = ra === 360 ? 0 : ra;
      records[at + 1] = decDeg[row] as number;
      records[at + 2] = row;
    }
  }
  return { start, records };
}
