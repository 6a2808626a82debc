import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  covarianceOfCircle,
  covarianceOfEllipse,
  ellipseOfCovariance,
  normalisedSeparation,
  normalisedSeparationBetween,
  radiusOfShareArcsec,
  scaledCovariance,
  shareWithinRadius,
  sigmaFromRadiusArcsec,
} from './errors';
import { offsetPosition } from './sphere';

describe('radii of circular errors', () => {
  it('turns a stated radius to one sigma per axis', () => {
    // Methods handbook, section 4: the radii in units of sigma, four decimals.
    expect(sigmaFromRadiusArcsec(1.1774, 'r50')).toBeCloseTo(1, 4);
    expect(sigmaFromRadiusArcsec(1.5151, 'r68')).toBeCloseTo(1, 3);
    expect(sigmaFromRadiusArcsec(2.146, 'r90')).toBeCloseTo(1, 4);
    expect(sigmaFromRadiusArcsec(2.4477, 'r95')).toBeCloseTo(1, 4);
    expect(sigmaFromRadiusArcsec(3.0349, 'r99')).toBeCloseTo(1, 4);
    expect(sigmaFromRadiusArcsec(0.25, 'sigma')).toBe(0.25);
  });

  it('share and radius are inverse to each other', () => {
    const share = fc.double({ min: 1e-6, max: 0.999999, noNaN: true });
    fc.assert(
      fc.property(share, (p) => Math.abs(shareWithinRadius(radiusOfShareArcsec(p, 0.7), 0.7) - p) < 1e-12),
    );
  });
});

describe('ellipses and covariances', () => {
  it('comes back to the ellipse it started from', () => {
    const axis = fc.double({ min: 0.01, max: 10, noNaN: true });
    const angle = fc.double({ min: 0, max: 179.9, noNaN: true });
    fc.assert(
      fc.property(axis, axis, angle, (one, two, paDeg) => {
        const [min, max] = [Math.min(one, two), Math.max(one, two)];
        fc.pre(max / min > 1.01);
        const back = ellipseOfCovariance(covarianceOfEllipse(max, min, paDeg));
        expect(back.majArcsec).toBeCloseTo(max, 9);
        expect(back.minArcsec).toBeCloseTo(min, 9);
        const turn = Math.abs((back.paDeg ?? NaN) - paDeg);
        expect(Math.min(turn, 180 - turn)).toBeLessThan(1e-8);
      }),
    );
  });

  it('a circle has no position angle', () => {
    expect(ellipseOfCovariance(covarianceOfEllipse(2, 2, 33)).paDeg).toBeNull();
  });

  it('an ellipse at position angle 0 is long to the north', () => {
    expect(covarianceOfEllipse(2, 1, 0)).toEqual({ xx: 1, yy: 4, xy: 0 });
  });

  it('scale multiplies errors, the floor is added in quadrature', () => {
    expect(scaledCovariance({ xx: 1, yy: 4, xy: 0.5 }, 2, 3)).toEqual({ xx: 13, yy: 25, xy: 2 });
  });
});

describe('normalised separation', () => {
  it('is the separation in sigmas for circles', () => {
    expect(normalisedSeparation(3, 4, covarianceOfCircle(2))).toBeCloseTo(2.5, 14);
  });

  it('is NaN without errors', () => {
    expect(normalisedSeparation(1, 1, covarianceOfCircle(0))).toBeNaN();
  });

  it('is right next to a pole, where RA differences are large', () => {
    const a = { raDeg: 10, decDeg: 89.9999 };
    const b = offsetPosition(a, 2, 120);
    const value = normalisedSeparationBetween(a, covarianceOfCircle(0.6), b, covarianceOfCircle(0.8));
    expect(value).toBeCloseTo(2, 9);
  });
});
