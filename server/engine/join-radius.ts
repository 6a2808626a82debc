/**
 * The radius of a join in the forms the join needs, and the fast form of the separation.
 *
 * One canonical formula decides every pair: `separationArcsec` of shared/astro/sphere.ts. Filters before it are
 * padded, so they may let a pair through but never lose one. Most pairs are not near the radius; for them a series
 * that agrees with the canonical formula to 1e-15 of the separation is enough and several times faster.
 */
import { cosDeg, raHalfWidthDeg } from '../../shared/astro/sphere';
import { ARCSEC_PER_RAD, RAD_PER_ARCSEC, RAD_PER_DEG } from '../../shared/astro/units';

/** Padding of filters: relative, and absolute for the rounding of coordinates themselves (ulp of 360 deg is 6e-14). */
const RELATIVE_PAD = 1e-9;
const ABSOLUTE_PAD_DEG = 1e-12;

/** Largest coordinate difference for which the series of `smallHaversine` are exact to double precision. */
export const SERIES_LIMIT_DEG = 2;

export interface JoinRadius {
  readonly arcsec: number;
  /** The padded radius, degrees. */
  readonly paddedDeg: number;
  /** Haversines below this are within the radius, above `outsideHaversine` beyond it; between, the formula decides. */
  readonly insideHaversine: number;
  readonly outsideHaversine: number;
}

export function joinRadius(radiusArcsec: number): JoinRadius {
  const haversine = Math.sin((radiusArcsec / 2) * RAD_PER_ARCSEC) ** 2;
  return {
    arcsec: radiusArcsec,
    paddedDeg: (radiusArcsec / 3600) * (1 + RELATIVE_PAD) + ABSOLUTE_PAD_DEG,
    insideHaversine: haversine * (1 - 4 * RELATIVE_PAD),
    outsideHaversine: haversine * (1 + 4 * RELATIVE_PAD),
  };
}

/** Padded half width in RA (degrees) of the cone around a declination; 180 means every RA. */
export function paddedHalfWidthDeg(radius: JoinRadius, decDeg: number): number {
  const half = raHalfWidthDeg(radius.paddedDeg * 3600, decDeg);
  // Close to 90 deg asin is so steep that a relative pad means nothing: take everything.
  return half > 89 ? 180 : half * (1 + RELATIVE_PAD) + ABSOLUTE_PAD_DEG;
}

/**
 * Haversine of the separation from differences of at most SERIES_LIMIT_DEG and the middle declination, degrees:
 * cos d1 cos d2 = cos² mid - sin²(dDec / 2), so that one cosine does for two.
 */
export function smallHaversine(dRaDeg: number, dDecDeg: number, midDecDeg: number): number {
  const sinHalfDec = smallSine(dDecDeg * (RAD_PER_DEG / 2));
  const sinHalfRa = smallSine(dRaDeg * (RAD_PER_DEG / 2));
  const cosMid = cosDeg(midDecDeg);
  const havDec = sinHalfDec * sinHalfDec;
  return havDec + (cosMid * cosMid - havDec) * (sinHalfRa * sinHalfRa);
}

/** Taylor series of the sine; the first term left out is below 1e-17 of the value for angles up to 1 deg. */
function smallSine(x: number): number {
  const x2 = x * x;
  return x * (1 - (x2 / 6) * (1 - (x2 / 20) * (1 - x2 / 42)));
}

/** Separation (arcsec) of a haversine below that of 1 deg: series of 2 asin(sqrt h), exact to double precision. */
export function separationOfSmallHaversine(h: number): number {
  return 2 * ARCSEC_PER_RAD * Math.sqrt(h) * (1 + h * (1 / 6 + h * (3 / 40 + h * (15 / 336))));
}
