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

/** Rows of A and B together in a bucket: 16k records and their cells fit into a second-level cache. */
const ROWS_PER_BUCKET = 16_384;
/** Bin numbers are kept in 16 bits; the last value means "in no bin". */
const NO_BIN = 0xffff;
const MAX_BINS = 16_384;
/** Lower buckets would copy a large share of B. */
const MIN_HEIGHT_IN_RADII = 8;

export interface JoinBuckets {
  readonly bucketCount: number;
  readonly a: BucketRecords;
  readonly b: BucketRecords;
}

/** Records of bucket i are `start[i]` to `end[i]`. */
export interface BucketRecords {
  readonly start: Int32Array;
  readonly end: Int32Array;
  readonly records: Float64Array;
}

/** Declination bins of equal height over the range of A, fine enough to build buckets of equal counts from. */
interface DecBins {
  readonly min: number;
  readonly max: number;
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
  const aBinned = binRows(a.decDeg, bins, 0);
  const bBinned = binRows(b.decDeg, bins, radius.paddedDeg);
  const minBins = Math.ceil(MIN_HEIGHT_IN_RADII * radius.paddedDeg * bins.perDeg);
  const bucketOfBin = equalCountBuckets(aBinned.rowsInBin, bBinned.rowsInBin, minBins);
  return {
    bucketCount: (bucketOfBin[bins.count - 1] ?? 0) + 1,
    a: placeRows(a, aBinned, bins, bucketOfBin, 0),
    b: placeRows(b, bBinned, bins, bucketOfBin, radius.paddedDeg),
  };
}

function decBins({ decMin, decMax }: PositionRange, rows: number): DecBins {
  const heightDeg = decMax - decMin;
  const count = heightDeg > 0 ? Math.min(MAX_BINS, rows) : 1;
  return { min: decMin, max: decMax, count, perDeg: heightDeg > 0 ? count / heightDeg : 0 };
}

/** The bin of a declination never falls when the declination grows: that is what makes the buckets safe. */
function binOf(dec: number, min: number, perDeg: number, lastBin: number): number {
  const place = (dec - min) * perDeg;
  return place < 0 ? 0 : place > lastBin ? lastBin : place | 0;
}

/** Bins of all rows; rows further than `haloDeg` outside the bins get NO_BIN. */
function binRows(decDeg: Float64Array, { min, max, perDeg, count }: DecBins, haloDeg: number): BinnedRows {
  const binOfRow = new Uint16Array(decDeg.length);
  const rowsInBin = new Uint32Array(count);
  const lowest = min - haloDeg;
  const highest = max + haloDeg;
  const lastBin = count - 1;
  for (let row = 0; row < decDeg.length; row += 1) {
    const dec = decDeg[row] as number;
    const bin = dec < lowest || dec > highest ? NO_BIN : binOf(dec, min, perDeg, lastBin);
    binOfRow[row] = bin;
    if (bin !== NO_BIN) rowsInBin[bin] = (rowsInBin[bin] as number) + 1;
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

/** Writes each row into every bucket that its declination +- `haloDeg` touches. */
function placeRows(
  { raDeg, decDeg }: PositionColumns,
  { binOfRow, rowsInBin }: BinnedRows,
  { min, perDeg, count }: DecBins,
  bucketOfBin: Uint16Array,
  haloDeg: number,
): BucketRecords {
  const lastBin = count - 1;
  // One bin more than the halo needs, for rounding.
  const reach = haloDeg > 0 ? Math.ceil(haloDeg * perDeg) + 1 : 0;
  const { start, atEdge } = bucketsInReach(rowsInBin, bucketOfBin, reach);
  const end = start.slice();
  const records = takeNumbers((start[start.length - 1] as number) * RECORD_SIZE);
  for (let row = 0; row < decDeg.length; row += 1) {
    const bin = binOfRow[row] as number;
    if (bin === NO_BIN) continue;
    const dec = decDeg[row] as number;
    let bucket = bucketOfBin[bin] as number;
    let last = bucket;
    if (atEdge[bin] === 1) {
      bucket = bucketOfBin[binOf(dec - haloDeg, min, perDeg, lastBin)] as number;
      last = bucketOfBin[binOf(dec + haloDeg, min, perDeg, lastBin)] as number;
    }
    for (; bucket <= last; bucket += 1) {
      const place = end[bucket] as number;
      end[bucket] = place + 1;
      const at = place * RECORD_SIZE;
      const ra = raDeg[row] as number;
      records[at] = ra === 360 ? 0 : ra;
      records[at + 1] = dec;
      records[at + 2] = row;
    }
  }
  return { start, end, records };
}

/**
 * Where the records of each bucket begin when every row within `reach` bins of a bucket may be copied into it: room
 * enough, since fewer are. Marks the bins from which more than one bucket is in reach.
 */
function bucketsInReach(
  rowsInBin: Uint32Array,
  bucketOfBin: Uint16Array,
  reach: number,
): { start: Int32Array; atEdge: Uint8Array } {
  const lastBin = rowsInBin.length - 1;
  const start = new Int32Array((bucketOfBin[lastBin] as number) + 2);
  const atEdge = new Uint8Array(rowsInBin.length);
  for (let bin = 0; bin <= lastBin; bin += 1) {
    const first = bucketOfBin[Math.max(0, bin - reach)] as number;
    const last = bucketOfBin[Math.min(lastBin, bin + reach)] as number;
    atEdge[bin] = first === last ? 0 : 1;
    for (let bucket = first; bucket <= last; bucket += 1) {
      start[bucket + 1] = (start[bucket + 1] as number) + (rowsInBin[bin] as number);
    }
  }
  for (let bucket = 1; bucket < start.length; bucket += 1) {
    start[bucket] = (start[bucket] as number) + (start[bucket - 1] as number);
  }
  return { start, atEdge };
}
