import { positionAtTangentOffset } from '../shared/astro/sphere';
import { FIELD } from './scenario';

/** ICRS position of an offset from the field centre (gnomonic, arcsec east and north). */
export function skyFromOffset(at: { eastArcsec: number; northArcsec: number }): { raDeg: number; decDeg: number } {
  return positionAtTangentOffset({ xiArcsec: at.eastArcsec, etaArcsec: at.northArcsec }, { raDeg: FIELD.raDeg, decDeg: FIELD.decDeg });
}
