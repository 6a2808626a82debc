import { covarianceOfEllipse, sumCovariance, type Covariance } from '../../../shared/astro/errors';
import { RAD_PER_DEG } from '../../../shared/astro/units';
import type { Candidate } from '../../../shared/schemas/run';

type SideError = Pick<Candidate['a'], 'errMajArcsec' | 'errMinArcsec' | 'errPaDeg'>;

/**
 * One-sigma error (arcsec) of a separation along the line between the two sources: both error ellipses added, cut in
 * the direction of the position angle (degrees east of north). Without a position angle the larger axis counts.
 * Null when a side states no error. Good where the separation is large against the error; below, it only gives the
 * scale. Source: propagation of errors to first order.
 */
export function separationErrorArcsec(a: SideError, b: SideError, paDeg: number | null): number | null {
  const [one, other] = [covarianceOf(a), covarianceOf(b)];
  if (one === null || other === null) return null;
  const { xx, yy, xy } = sumCovariance(one, other);
  if (paDeg === null) return Math.sqrt((xx + yy) / 2 + Math.hypot((xx - yy) / 2, xy));
  const east = Math.sin(paDeg * RAD_PER_DEG);
  const north = Math.cos(paDeg * RAD_PER_DEG);
  return Math.sqrt(Math.max(0, xx * east * east + 2 * xy * east * north + yy * north * north));
}

function covarianceOf({ errMajArcsec, errMinArcsec, errPaDeg }: SideError): Covariance | null {
  if (errMajArcsec === null || !(errMajArcsec > 0)) return null;
  return covarianceOfEllipse(errMajArcsec, errMinArcsec ?? errMajArcsec, errPaDeg ?? 0);
}
