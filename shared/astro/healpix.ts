/**
 * Equal-area sky cells in HEALPix nested numbering: Gorski et al. 2005, ApJ 622, 759.
 * Written from the geometry of that paper: twelve faces, each a square with axes x (to the north-east)
 * and y (to the north-west), halved `order` times; the bits of the two indices are interleaved.
 */
import { cosDeg, sinDeg, wrapRaDeg, type SkyPosition } from './sphere';
import { DEG_PER_RAD } from './units';

/** Up to this order a cell number fits into 32 bits. Order 14 cells are 13 arcsec wide. */
export const MAX_HEALPIX_ORDER = 14;
/** Up to this order a cell number fits into 64 bits; cells are 0.4 milliarcsec wide. */
const MAX_WIDE_ORDER = 29;

/** Distance of a face's southern corner from the north pole along its edges, in face sides. */
const RING_OF_FACE = [2, 2, 2, 2, 3, 3, 3, 3, 4, 4, 4, 4] as const;
/** RA of a face's middle in units of 45 deg. */
const LONGITUDE_OF_FACE = [1, 3, 5, 7, 0, 2, 4, 6, 1, 3, 5, 7] as const;

function checkOrder(order: number, max: number): void {
  if (!Number.isInteger(order) || order < 0 || order > max) {
    throw new RangeError(`order must be an integer 0..${max}, not ${order}`);
  }
}

/** Puts zeros between the 16 lowest bits of a number. */
function spreadBits(value: number): number {
  let v = value;
  v = (v | (v << 8)) & 0x00ff00ff;
  v = (v | (v << 4)) & 0x0f0f0f0f;
  v = (v | (v << 2)) & 0x33333333;
  return (v | (v << 1)) & 0x55555555;
}

/** The inverse of `spreadBits`: every other bit of a number. */
function gatherBits(value: number): number {
  let v = value & 0x55555555;
  v = (v | (v >>> 1)) & 0x33333333;
  v = (v | (v >>> 2)) & 0x0f0f0f0f;
  v = (v | (v >>> 4)) & 0x00ff00ff;
  return (v | (v >>> 8)) & 0x0000ffff;
}

/** A cell as the face it lies in and its indices within. */
interface FaceCell {
  side: number;
  face: number;
  x: number;
  y: number;
}

/**
 * Nested number of the cell that holds a position. `order` 0..14, degrees in, 0 <= number < 12 * 4^order.
 * Throws RangeError for an order outside 0..14 and for a position that is not finite.
 */
export function healpixCell(order: number, raDeg: number, decDeg: number): number {
  checkOrder(order, MAX_HEALPIX_ORDER);
  const { side, face, x, y } = faceCellOfPosition(order, raDeg, decDeg);
  // >>> 0 because the second term may use bit 31; face * side² does not fit into 32 signed bits.
  return face * side * side + ((spreadBits(x) | (spreadBits(y) << 1)) >>> 0);
}

/** The same for orders 0..29, whose numbers need more digits than a number has. */
export function wideHealpixCell(order: number, raDeg: number, decDeg: number): bigint {
  checkOrder(order, MAX_WIDE_ORDER);
  const { side, face, x, y } = faceCellOfPosition(order, raDeg, decDeg);
  let cell = BigInt(face);
  for (let half = side / 2; half >= 1; half /= 2) {
    const xBit = Math.floor(x / half) % 2;
    const yBit = Math.floor(y / half) % 2;
    cell = cell * 4n + BigInt(xBit + 2 * yBit);
  }
  return cell;
}

function faceCellOfPosition(order: number, raDeg: number, decDeg: number): FaceCell {
  if (!Number.isFinite(raDeg) || !(Math.abs(decDeg) <= 90)) {
    throw new RangeError(`position must be finite with |dec| <= 90, not (${raDeg}, ${decDeg})`);
  }
  const side = 2 ** order;
  const z = sinDeg(decDeg);
  const quadrants = wrapRaDeg(raDeg) / 90;
  return Math.abs(z) <= 2 / 3 ? equatorialCell(side, quadrants, z) : polarCell(side, quadrants, z, decDeg);
}

function equatorialCell(side: number, quadrants: number, z: number): FaceCell {
  const along = side * (0.5 + quadrants);
  const across = side * z * 0.75;
  const falling = Math.max(0, Math.floor(along - across));
  const rising = Math.max(0, Math.floor(along + across));
  const fallingFace = Math.floor(falling / side);
  const risingFace = Math.floor(rising / side);
  let face = (fallingFace & 3) + 4;
  if (fallingFace < risingFace) face = fallingFace & 3;
  if (fallingFace > risingFace) face = (risingFace & 3) + 8;
  return { side, face, x: rising - risingFace * side, y: side - (falling - fallingFace * side) - 1 };
}

function polarCell(side: number, quadrants: number, z: number, decDeg: number): FaceCell {
  const quadrant = Math.min(3, Math.floor(quadrants));
  const part = quadrants - quadrant;
  // sqrt(3 (1 - |z|)) with cos² / (1 + |z|) for 1 - |z|, which near the pole would have no digits left.
  const reach = side * cosDeg(decDeg) * Math.sqrt(3 / (1 + Math.abs(z)));
  const east = Math.min(side - 1, Math.floor(part * reach));
  const west = Math.min(side - 1, Math.floor((1 - part) * reach));
  if (z < 0) return { side, face: quadrant + 8, x: east, y: west };
  return { side, face: quadrant, x: side - west - 1, y: side - east - 1 };
}

function faceCellOfNumber(order: number, cell: number): FaceCell {
  checkOrder(order, MAX_HEALPIX_ORDER);
  const side = 2 ** order;
  const perFace = side * side;
  if (!Number.isInteger(cell) || cell < 0 || cell >= 12 * perFace) {
    throw new RangeError(`cell must be an integer 0..${12 * perFace - 1} at order ${order}, not ${cell}`);
  }
  const face = Math.floor(cell / perFace);
  const inFace = cell - face * perFace;
  return { side, face, x: gatherBits(inFace), y: gatherBits(inFace >>> 1) };
}

/** Place of a point of a face, 0 <= x, y <= 1. */
function placeInFace(face: number, x: number, y: number): SkyPosition {
  const ring = (RING_OF_FACE[face] ?? NaN) - x - y;
  // In the polar caps rings shrink with their distance from the pole; in between they all have full length.
  const scale = Math.max(0, Math.min(1, ring, 4 - ring));
  const cap = (scale * scale) / 3;
  const z = ring < 1 ? 1 - cap : ring > 3 ? cap - 1 : (2 - ring) * (2 / 3);
  const sinTheta = ring < 1 || ring > 3 ? Math.sqrt(cap * (2 - cap)) : Math.sqrt((1 - z) * (1 + z));
  const eighths = (LONGITUDE_OF_FACE[face] ?? NaN) + (scale > 1e-12 ? (x - y) / scale : 0);
  return { raDeg: wrapRaDeg(eighths * 45), decDeg: Math.atan2(z, sinTheta) * DEG_PER_RAD };
}

/** Centre of a nested cell, degrees. Throws RangeError for an impossible order or number. */
export function healpixCentre(order: number, cell: number): SkyPosition {
  const { side, face, x, y } = faceCellOfNumber(order, cell);
  return placeInFace(face, (x + 0.5) / side, (y + 0.5) / side);
}

/** The four corners of a nested cell (north, west, south, east), degrees, for drawing its outline. */
export function healpixCorners(order: number, cell: number): SkyPosition[] {
  const { side, face, x, y } = faceCellOfNumber(order, cell);
  const corners = [
    [x + 1, y + 1],
    [x, y + 1],
    [x, y],
    [x + 1, y],
  ] as const;
  return corners.map(([cx, cy]) => placeInFace(face, cx / side, cy / side));
}

/** Area of a cell in square degrees; all cells of an order have the same. */
export function healpixCellAreaDeg2(order: number): number {
  checkOrder(order, MAX_WIDE_ORDER);
  return (4 * Math.PI * DEG_PER_RAD * DEG_PER_RAD) / (12 * 4 ** order);
}
