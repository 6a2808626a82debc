/**
 * Geometry on the celestial sphere. Positions come as (raDeg, decDeg), separations leave in arcsec.
 * Methods handbook, sections 1 and 11. All functions are pure; NaN in gives NaN (or null) out.
 */
import { ARCSEC_PER_RAD, DEG_PER_RAD, RAD_PER_ARCSEC, RAD_PER_DEG } from './units';

/** A place on the sky, degrees. */
export interface SkyPosition {
  raDeg: number;
  decDeg: number;
}

/** An offset in the tangent plane, arcsec: xi grows to the east, eta to the north. */
export interface TangentOffset {
  xiArcsec: number;
  etaArcsec: number;
}

export type Vector3 = readonly [x: number, y: number, z: number];

/** sin² of half an angle of 170 deg: beyond it asin(sqrt h) loses digits and the atan2 form takes over. */
const HAVERSINE_OF_170_DEG = Math.sin((170 / 2) * RAD_PER_DEG) ** 2;

/** Right ascension brought to 0 <= raDeg < 360. */
export function wrapRaDeg(raDeg: number): number {
  const rest = raDeg % 360;
  const positive = rest < 0 ? rest + 360 : rest;
  // A tiny negative rest plus 360 rounds to 360 itself; the second term turns -0 into 0.
  return positive >= 360 ? 0 : positive + 0;
}

/**
 * ra2 - ra1 in degrees, brought to -180..180.
 * The larger value is moved by 360 *before* the subtraction: near RA 0 that keeps the difference exact.
 */
export function raDifferenceDeg(ra1Deg: number, ra2Deg: number): number {
  const plain = ra2Deg - ra1Deg;
  if (plain > 180 && plain <= 360) return ra2Deg - 360 - ra1Deg;
  if (plain < -180 && plain >= -360) return ra2Deg - (ra1Deg - 360);
  return plain > 360 || plain < -360 ? plain - 360 * Math.round(plain / 360) : plain;
}

/**
 * Cosine of an angle in degrees, exact to the last digits near 90 deg, where cos(deg * pi / 180) is not:
 * the complement 90 - |deg| is formed in degrees, without rounding.
 */
export function cosDeg(deg: number): number {
  const size = Math.abs(deg);
  return size > 45 && size < 135 ? Math.sin((90 - size) * RAD_PER_DEG) : Math.cos(deg * RAD_PER_DEG);
}

/** Sine of an angle in degrees. */
export function sinDeg(deg: number): number {
  return Math.sin(deg * RAD_PER_DEG);
}

/** sin²(angle / 2) of an angle in degrees. */
function haversineDeg(deg: number): number {
  const s = Math.sin((deg / 2) * RAD_PER_DEG);
  return s * s;
}

/**
 * Angular separation of two positions, arcsec, 0..648000.
 * Haversine of coordinate differences; towards 180 deg the form atan2(|a x b|, a . b).
 * Error below 1e-9 arcsec everywhere. Source: spherical trigonometry (methods handbook, section 1).
 */
export function separationArcsec(ra1Deg: number, dec1Deg: number, ra2Deg: number, dec2Deg: number): number {
  const dRaDeg = raDifferenceDeg(ra1Deg, ra2Deg);
  const h = haversineDeg(dec2Deg - dec1Deg) + cosDeg(dec1Deg) * cosDeg(dec2Deg) * haversineDeg(dRaDeg);
  if (h <= HAVERSINE_OF_170_DEG) return 2 * Math.asin(Math.sqrt(h)) * ARCSEC_PER_RAD;
  // The southern position first: the result is then bit for bit the same in both directions.
  return dec1Deg <= dec2Deg
    ? wideSeparationArcsec(dec1Deg, dec2Deg, Math.abs(dRaDeg))
    : wideSeparationArcsec(dec2Deg, dec1Deg, Math.abs(dRaDeg));
}

function wideSeparationArcsec(dec1Deg: number, dec2Deg: number, dRaDeg: number): number {
  const a = unitVector(0, dec1Deg);
  const b = unitVector(dRaDeg, dec2Deg);
  const cross = Math.hypot(a[1] * b[2] - a[2] * b[1], a[2] * b[0] - a[0] * b[2], a[0] * b[1] - a[1] * b[0]);
  return Math.atan2(cross, a[0] * b[0] + a[1] * b[1] + a[2] * b[2]) * ARCSEC_PER_RAD;
}

/**
 * Position angle from the first position to the second, degrees east of north, 0 <= angle < 360.
 * Null where it is not defined: zero separation, or the first position at a pole.
 * The northward term is sin(dec2 - dec1) + 2 sin dec1 cos dec2 sin²(dRA / 2): no cancellation at small separations.
 */
export function positionAngleDeg(
  ra1Deg: number,
  dec1Deg: number,
  ra2Deg: number,
  dec2Deg: number,
): number | null {
  if (Math.abs(dec1Deg) === 90) return null;
  const dRaDeg = raDifferenceDeg(ra1Deg, ra2Deg);
  const east = cosDeg(dec2Deg) * Math.sin(dRaDeg * RAD_PER_DEG);
  const north = sinDeg(dec2Deg - dec1Deg) + 2 * sinDeg(dec1Deg) * cosDeg(dec2Deg) * haversineDeg(dRaDeg);
  if (east === 0 && north === 0) return null;
  return wrapRaDeg(Math.atan2(east, north) * DEG_PER_RAD);
}

/** Unit vector of a position: x to RA 0, y to RA 90 deg, z to the north pole. */
export function unitVector(raDeg: number, decDeg: number): Vector3 {
  const cosDec = cosDeg(decDeg);
  const ra = raDeg * RAD_PER_DEG;
  return [cosDec * Math.cos(ra), cosDec * Math.sin(ra), sinDeg(decDeg)];
}

/** Position of a vector of any length; null for the zero vector. At a pole RA is 0. */
export function positionOfVector(vector: Vector3): SkyPosition | null {
  const [x, y, z] = vector;
  const inPlane = Math.hypot(x, y);
  if (inPlane === 0 && z === 0) return null;
  const raDeg = inPlane === 0 ? 0 : wrapRaDeg(Math.atan2(y, x) * DEG_PER_RAD);
  return { raDeg, decDeg: Math.atan2(z, inPlane) * DEG_PER_RAD };
}

/** Middle of the shorter great-circle arc between two positions; null for opposite points. */
export function midpoint(a: SkyPosition, b: SkyPosition): SkyPosition | null {
  const va = unitVector(a.raDeg, a.decDeg);
  const vb = unitVector(b.raDeg, b.decDeg);
  const sum: Vector3 = [va[0] + vb[0], va[1] + vb[1], va[2] + vb[2]];
  return Math.hypot(...sum) < 1e-12 ? null : positionOfVector(sum);
}

/** The position at a distance (arcsec) and position angle (degrees east of north) from another one. */
export function offsetPosition(from: SkyPosition, distanceArcsec: number, paDeg: number): SkyPosition {
  const distance = distanceArcsec * RAD_PER_ARCSEC;
  const pa = paDeg * RAD_PER_DEG;
  const sinDistance = Math.sin(distance);
  return fromLocalFrame(from, sinDistance * Math.sin(pa), sinDistance * Math.cos(pa), Math.cos(distance));
}

/** The direction that is `east`, `north` and `forward` (outward) as seen from a position. */
function fromLocalFrame(origin: SkyPosition, east: number, north: number, forward: number): SkyPosition {
  const sinDec = sinDeg(origin.decDeg);
  const cosDec = cosDeg(origin.decDeg);
  const outward = forward * cosDec - north * sinDec;
  const polar = forward * sinDec + north * cosDec;
  const inPlane = Math.hypot(east, outward);
  const dRaDeg = inPlane === 0 ? 0 : Math.atan2(east, outward) * DEG_PER_RAD;
  return { raDeg: wrapRaDeg(origin.raDeg + dRaDeg), decDeg: Math.atan2(polar, inPlane) * DEG_PER_RAD };
}

/**
 * Gnomonic (tangent-plane) offset of a position from a field centre, arcsec; null 90 deg or more away.
 * Source: Calabretta & Greisen 2002, A&A 395, 1077, section 5.1.3, written without cancelling terms.
 */
export function tangentOffset(position: SkyPosition, centre: SkyPosition): TangentOffset | null {
  const dRaDeg = raDifferenceDeg(centre.raDeg, position.raDeg);
  const dDecDeg = position.decDeg - centre.decDeg;
  const cosDec = cosDeg(position.decDeg);
  const twiceHav = 2 * haversineDeg(dRaDeg);
  const depth = Math.cos(dDecDeg * RAD_PER_DEG) - cosDec * cosDeg(centre.decDeg) * twiceHav;
  if (!(depth > 1e-12)) return null;
  const east = cosDec * Math.sin(dRaDeg * RAD_PER_DEG);
  const north = sinDeg(dDecDeg) + cosDec * sinDeg(centre.decDeg) * twiceHav;
  return { xiArcsec: (east / depth) * ARCSEC_PER_RAD, etaArcsec: (north / depth) * ARCSEC_PER_RAD };
}

/** The position at a gnomonic offset (arcsec) from a field centre: the inverse of `tangentOffset`. */
export function positionAtTangentOffset(offset: TangentOffset, centre: SkyPosition): SkyPosition {
  return fromLocalFrame(centre, offset.xiArcsec * RAD_PER_ARCSEC, offset.etaArcsec * RAD_PER_ARCSEC, 1);
}

/**
 * Half width in RA (degrees) of a cone of a radius (arcsec) around a declination: asin(sin r / cos dec),
 * and 180 (everything) where the cone holds a pole. Source: Gray, Nieto-Santisteban & Szalay 2006.
 */
export function raHalfWidthDeg(radiusArcsec: number, decDeg: number): number {
  const radiusDeg = radiusArcsec / 3600;
  if (Math.abs(decDeg) + radiusDeg >= 90) return 180;
  const sine = Math.sin(radiusArcsec * RAD_PER_ARCSEC) / cosDeg(decDeg);
  return sine >= 1 ? 180 : Math.asin(sine) * DEG_PER_RAD;
}
