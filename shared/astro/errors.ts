/**
 * Positional errors. Inside, an error is a covariance in arcsec²: xx east², yy north², xy.
 * Methods handbook, section 4.
 */
import { cosDeg, midpoint, tangentOffset, type SkyPosition } from './sphere';
import { DEG_PER_RAD, RAD_PER_DEG } from './units';

/** What a stated circular error radius holds: one sigma per axis, or that share of all errors. */
export type RadiusMeaning = 'sigma' | 'r50' | 'r68' | 'r90' | 'r95' | 'r99';

export interface Covariance {
  xx: number;
  yy: number;
  xy: number;
}

/** One-sigma error ellipse, arcsec; paDeg of the major axis east of north, 0..180, null for a circle. */
export interface ErrorEllipse {
  majArcsec: number;
  minArcsec: number;
  paDeg: number | null;
}

/** 68.27 %, not 68 %: the share within one sigma of a one-dimensional normal error, to four digits. */
const SHARES = { r50: 0.5, r68: 0.6827, r90: 0.9, r95: 0.95, r99: 0.99 } as const;

/** Radius (arcsec) that holds a share 0 <= share < 1 of circular errors of `sigmaArcsec` per axis (Rayleigh). */
export function radiusOfShareArcsec(share: number, sigmaArcsec: number): number {
  return sigmaArcsec * Math.sqrt(-2 * Math.log1p(-share));
}

/** Share of circular errors of `sigmaArcsec` per axis that lie within a radius (arcsec). */
export function shareWithinRadius(radiusArcsec: number, sigmaArcsec: number): number {
  return -Math.expm1(-0.5 * (radiusArcsec / sigmaArcsec) ** 2);
}

/** One sigma per axis (arcsec) of a radius (arcsec) that holds a share of circular errors. */
export function sigmaOfShareArcsec(radiusArcsec: number, share: number): number {
  return radiusArcsec / Math.sqrt(-2 * Math.log1p(-share));
}

/** One sigma per axis (arcsec) of a stated radius (arcsec), by what the radius means. */
export function sigmaFromRadiusArcsec(radiusArcsec: number, meaning: RadiusMeaning): number {
  return meaning === 'sigma' ? radiusArcsec : sigmaOfShareArcsec(radiusArcsec, SHARES[meaning]);
}

/** Error in RA given in seconds of time, as arcsec on the sky (times 15 cos dec). */
export function raErrorArcsec(sigmaRaSeconds: number, decDeg: number): number {
  return sigmaRaSeconds * 15 * cosDeg(decDeg);
}

/** Covariance of a circular error, one sigma per axis in arcsec. */
export function covarianceOfCircle(sigmaArcsec: number): Covariance {
  const variance = sigmaArcsec * sigmaArcsec;
  return { xx: variance, yy: variance, xy: 0 };
}

/** Covariance of a one-sigma ellipse: semi-axes in arcsec, position angle of the major axis east of north. */
export function covarianceOfEllipse(majArcsec: number, minArcsec: number, paDeg: number): Covariance {
  const sin = Math.sin(paDeg * RAD_PER_DEG);
  const cos = Math.cos(paDeg * RAD_PER_DEG);
  const maj2 = majArcsec * majArcsec;
  const min2 = minArcsec * minArcsec;
  return {
    xx: maj2 * sin * sin + min2 * cos * cos,
    yy: maj2 * cos * cos + min2 * sin * sin,
    xy: (maj2 - min2) * sin * cos,
  };
}

/** Covariance of errors along RA (times cos dec) and Dec in arcsec with their correlation -1..1. */
export function covarianceOfAxes(raArcsec: number, decArcsec: number, correlation: number): Covariance {
  return { xx: raArcsec * raArcsec, yy: decArcsec * decArcsec, xy: correlation * raArcsec * decArcsec };
}

/** One-sigma ellipse of a covariance (eigenvalues of a symmetric 2 x 2 matrix). */
export function ellipseOfCovariance({ xx, yy, xy }: Covariance): ErrorEllipse {
  const mean = (xx + yy) / 2;
  const halfDifference = (yy - xx) / 2;
  const spread = Math.hypot(halfDifference, xy);
  const large = mean + spread;
  // det / large instead of mean - spread: the small axis of a thin ellipse keeps its digits.
  const small = large > 0 ? (xx * yy - xy * xy) / large : 0;
  const majArcsec = Math.sqrt(large);
  const minArcsec = Math.sqrt(Math.max(small, 0));
  if (spread <= 1e-14 * mean) return { majArcsec, minArcsec, paDeg: null };
  const paDeg = (Math.atan2(xy, halfDifference) / 2) * DEG_PER_RAD;
  return { majArcsec, minArcsec, paDeg: paDeg < 0 ? paDeg + 180 : paDeg + 0 };
}

/** Sum of covariances: the error of a difference of independent positions. */
export function sumCovariance(a: Covariance, b: Covariance): Covariance {
  return { xx: a.xx + b.xx, yy: a.yy + b.yy, xy: a.xy + b.xy };
}

/** Covariance with its errors multiplied by `scale` and a circular floor (arcsec) added in quadrature. */
export function scaledCovariance(given: Covariance, scale: number, floorArcsec: number): Covariance {
  const factor = scale * scale;
  const floor = floorArcsec * floorArcsec;
  return { xx: factor * given.xx + floor, yy: factor * given.yy + floor, xy: factor * given.xy };
}

/**
 * Normalised separation sqrt(d' C^-1 d) of an offset (arcsec east, north) under a covariance.
 * NaN when the covariance is singular: without an error there is no normalised separation.
 */
export function normalisedSeparation(eastArcsec: number, northArcsec: number, c: Covariance): number {
  const determinant = c.xx * c.yy - c.xy * c.xy;
  if (!(determinant > 0)) return NaN;
  const quadratic =
    c.yy * eastArcsec * eastArcsec - 2 * c.xy * eastArcsec * northArcsec + c.xx * northArcsec * northArcsec;
  return Math.sqrt(Math.max(quadratic, 0) / determinant);
}

/**
 * Normalised separation of two positions with their covariances: the offset is taken in the tangent plane
 * at their midpoint. Null for positions 90 deg or more apart.
 */
export function normalisedSeparationBetween(
  a: SkyPosition,
  covarianceA: Covariance,
  b: SkyPosition,
  covarianceB: Covariance,
): number | null {
  const centre = midpoint(a, b);
  if (!centre) return null;
  const fromA = tangentOffset(a, centre);
  const fromB = tangentOffset(b, centre);
  if (!fromA || !fromB) return null;
  return normalisedSeparation(
    fromB.xiArcsec - fromA.xiArcsec,
    fromB.etaArcsec - fromA.etaArcsec,
    sumCovariance(covarianceA, covarianceB),
  );
}

/** Share of true pairs whose normalised separation is larger than x: exp(-x² / 2). */
export function shareBeyond(normalised: number): number {
  return Math.exp(-0.5 * normalised * normalised);
}
