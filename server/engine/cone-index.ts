/**
 * The spatial index of one revision: cones and nearest neighbours, kept as one block of bytes beside the catalogue.
 *
 * A kd-tree over longitude -180..180 and latitude finds what may be near; `separationArcsec` decides and orders.
 * Bytes: the tree as kdbush writes it, then both position columns, then a closing mark with the number of rows. The
 * tree comes first because kdbush reads it from offset 0 without copying.
 */
import { around } from 'geokdbush';
import KDBush from 'kdbush';
import { raHalfWidthDeg, separationArcsec, wrapRaDeg } from '../../shared/astro/sphere';
import { checkPositions, checkRadius, type PositionColumns } from './positions';

/** Small leaves suit small cones; kdbush also keeps the size in 16 bits, so it must stay far below 65536. */
const NODE_SIZE = 16;
/** The radius of the sphere on which geokdbush measures, km. */
const SPHERE_KM = 6371;
const KM_PER_ARCSEC = (SPHERE_KM * Math.PI) / (180 * 3600);
const HALF_TURN_ARCSEC = 180 * 3600;
/** Padding of what the trees look through, relative and in arcsec; the exact test follows. */
const RELATIVE_PAD = 1e-9;
const ABSOLUTE_PAD_ARCSEC = 1e-7;
const FORMAT = 0x1de30001;
const TRAILER_BYTES = 8;

/** Rows found, nearest first; equal separations by row number. */
export interface ConeRows {
  readonly rows: Uint32Array;
  readonly sepArcsec: Float64Array;
}

export interface ConeIndex {
  readonly rowCount: number;
  readonly positions: PositionColumns;
  /** The whole index as bytes, for `loadConeIndex`. */
  readonly bytes: Uint8Array;
  /** All rows within a radius (arcsec, above 0, at most 648000) of a position. Throws RangeError. */
  cone(raDeg: number, decDeg: number, radiusArcsec: number): ConeRows;
  /** The `count` nearest rows, optionally no further than `maxArcsec`. Throws RangeError. */
  nearest(raDeg: number, decDeg: number, count: number, maxArcsec?: number): ConeRows;
}

/** The bytes are not an index of this version, or were cut short. Build the index anew. */
export class UnreadableConeIndex extends Error {
  override readonly name = 'UnreadableConeIndex';
}

/** Builds the index of position columns. Throws RangeError for positions off the sky, NaN included. */
export function buildConeIndex(positions: PositionColumns): ConeIndex {
  const { raDeg, decDeg } = positions;
  checkPositions('positions', positions);
  const rowCount = raDeg.length;
  const tree = new KDBush(rowCount, NODE_SIZE);
  for (let row = 0; row < rowCount; row += 1) {
    tree.add(longitude(raDeg[row] ?? NaN), decDeg[row] ?? NaN);
  }
  tree.finish();
  const treeBytes = new Uint8Array(tree.data);
  const bytes = new Uint8Array(treeBytes.length + rowCount * 16 + TRAILER_BYTES);
  bytes.set(treeBytes);
  bytes.set(
    new Uint8Array(positions.raDeg.buffer, positions.raDeg.byteOffset, rowCount * 8),
    treeBytes.length,
  );
  bytes.set(
    new Uint8Array(positions.decDeg.buffer, positions.decDeg.byteOffset, rowCount * 8),
    treeBytes.length + rowCount * 8,
  );
  new Uint32Array(bytes.buffer, bytes.length - TRAILER_BYTES).set([FORMAT, rowCount]);
  return indexOver(bytes);
}

/** Takes an index up from its bytes, without copying when they begin an ArrayBuffer. Throws UnreadableConeIndex. */
export function loadConeIndex(bytes: Uint8Array): ConeIndex {
  const own = bytes.byteOffset === 0 && bytes.buffer instanceof ArrayBuffer ? bytes : bytes.slice();
  if (own.length < TRAILER_BYTES || own.length % 8 !== 0)
    throw new UnreadableConeIndex(`${own.length} bytes`);
  const [format, rowCount = 0] = new Uint32Array(own.buffer, own.length - TRAILER_BYTES, 2);
  if (format !== FORMAT) throw new UnreadableConeIndex('the closing mark is missing');
  if (own.length !== treeLength(rowCount) + rowCount * 16 + TRAILER_BYTES) {
    throw new UnreadableConeIndex(`${own.length} bytes do not hold ${rowCount} rows`);
  }
  return indexOver(own);
}

/** Bytes of a tree: 8 of head, row numbers of 2 or 4 bytes filled up to 8, two coordinates. */
function treeLength(rowCount: number): number {
  const idBytes = rowCount * (rowCount < 65_536 ? 2 : 4);
  return 8 + Math.ceil(idBytes / 8) * 8 + rowCount * 16;
}

function indexOver(bytes: Uint8Array): ConeIndex {
  const { buffer } = bytes;
  const [, rowCount = 0] = new Uint32Array(buffer, bytes.length - TRAILER_BYTES, 2);
  const columnsAt = treeLength(rowCount);
  const positions = {
    raDeg: new Float64Array(buffer, columnsAt, rowCount),
    decDeg: new Float64Array(buffer, columnsAt + rowCount * 8, rowCount),
  };
  // An empty tree must not be asked: kdbush takes "last item -1" for 4294967295.
  const tree = rowCount > 0 ? KDBush.from(buffer) : null;

  const cone = (raDeg: number, decDeg: number, radiusArcsec: number): ConeRows => {
    const centre = checkCentre(raDeg, decDeg);
    checkRadius(radiusArcsec, HALF_TURN_ARCSEC);
    if (!tree) return sortedRows([], positions, centre, radiusArcsec);
    const found: number[] = [];
    for (const [west, south, east, north] of boxesOfCone(centre.raDeg, decDeg, radiusArcsec)) {
      for (const row of tree.range(west, south, east, north)) found.push(row);
    }
    return sortedRows(found, positions, centre, radiusArcsec);
  };

  const nearest = (raDeg: number, decDeg: number, count: number, maxArcsec = HALF_TURN_ARCSEC): ConeRows => {
    const centre = checkCentre(raDeg, decDeg);
    checkRadius(maxArcsec, HALF_TURN_ARCSEC);
    if (!Number.isInteger(count) || count < 1)
      throw new RangeError(`count must be a positive integer, not ${count}`);
    if (!tree) return sortedRows([], positions, centre, maxArcsec);
    const reachKm = Math.min(padded(maxArcsec), HALF_TURN_ARCSEC) * KM_PER_ARCSEC;
    const candidates = around(tree, longitude(centre.raDeg), decDeg, count, reachKm);
    const first = sortedRows(candidates, positions, centre, maxArcsec);
    if (first.rows.length < count) return first;
    // geokdbush leaves open which of several equally far rows come last: look once more at all of that distance.
    const farthest = first.sepArcsec[count - 1] ?? 0;
    const all = cone(centre.raDeg, decDeg, Math.min(padded(farthest), maxArcsec));
    return { rows: all.rows.slice(0, count), sepArcsec: all.sepArcsec.slice(0, count) };
  };

  return { rowCount, positions, bytes, cone, nearest };
}

function checkCentre(raDeg: number, decDeg: number): { raDeg: number; decDeg: number } {
  if (!Number.isFinite(raDeg)) throw new RangeError(`raDeg must be finite, not ${raDeg}`);
  if (!(Math.abs(decDeg) <= 90)) throw new RangeError(`decDeg must be -90..90, not ${decDeg}`);
  return { raDeg: wrapRaDeg(raDeg), decDeg };
}

/** Right ascension as -180..180: the only longitudes geokdbush understands. */
function longitude(raDeg: number): number {
  return raDeg >= 180 ? raDeg - 360 : raDeg;
}

function padded(arcsec: number): number {
  return arcsec * (1 + RELATIVE_PAD) + ABSOLUTE_PAD_ARCSEC;
}

type Box = readonly [west: number, south: number, east: number, north: number];

/** The boxes that hold a cone: one, two where it crosses longitude 180, or the whole cap where it holds a pole. */
function boxesOfCone(raDeg: number, decDeg: number, radiusArcsec: number): Box[] {
  const reachArcsec = padded(radiusArcsec);
  const south = decDeg - reachArcsec / 3600;
  const north = decDeg + reachArcsec / 3600;
  const half = padded(raHalfWidthDeg(reachArcsec, decDeg) * 3600) / 3600;
  // Close to 90 deg the half width is too steep a function of declination for any pad.
  if (half > 89) return [[-180, south, 180, north]];
  const west = longitude(raDeg) - half;
  const east = longitude(raDeg) + half;
  if (west < -180)
    return [
      [-180, south, east, north],
      [west + 360, south, 180, north],
    ];
  if (east > 180)
    return [
      [west, south, 180, north],
      [-180, south, east - 360, north],
    ];
  return [[west, south, east, north]];
}

function sortedRows(
  candidates: readonly number[],
  { raDeg, decDeg }: PositionColumns,
  centre: { raDeg: number; decDeg: number },
  radiusArcsec: number,
): ConeRows {
  const hits: { row: number; sep: number }[] = [];
  for (const row of candidates) {
    const sep = separationArcsec(centre.raDeg, centre.decDeg, raDeg[row] ?? NaN, decDeg[row] ?? NaN);
    if (sep <= radiusArcsec) hits.push({ row, sep });
  }
  hits.sort((one, two) => one.sep - two.sep || one.row - two.row);
  return {
    rows: Uint32Array.from(hits, (hit) => hit.row),
    sepArcsec: Float64Array.from(hits, (hit) => hit.sep),
  };
}
