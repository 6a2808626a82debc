import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  cosDeg,
  midpoint,
  offsetPosition,
  positionAngleDeg,
  positionAtTangentOffset,
  raDifferenceDeg,
  raHalfWidthDeg,
  separationArcsec,
  tangentOffset,
  unitVector,
  wrapRaDeg,
} from './sphere';

const ra = fc.double({ min: 0, max: 360, noNaN: true });
const dec = fc.double({ min: -90, max: 90, noNaN: true });

describe('wrapRaDeg', () => {
  it('gives 0 <= ra < 360, never 360 and never -0', () => {
    expect(wrapRaDeg(360)).toBe(0);
    expect(wrapRaDeg(-360)).toBe(0);
    expect(wrapRaDeg(-1e-20)).toBe(0);
    expect(wrapRaDeg(725)).toBe(5);
    expect(wrapRaDeg(-0.5)).toBe(359.5);
  });
});

describe('raDifferenceDeg', () => {
  it('keeps all digits across RA 0', () => {
    const small = 1e-13;
    expect(raDifferenceDeg(0, 360 - 2 ** -40)).toBe(-(2 ** -40));
    expect(raDifferenceDeg(360 - 2 ** -40, small)).toBeCloseTo(2 ** -40 + small, 25);
  });

  it('is the negative of the difference the other way round', () => {
    fc.assert(
      fc.property(
        ra,
        ra,
        (one, two) => Math.abs(raDifferenceDeg(one, two)) === Math.abs(raDifferenceDeg(two, one)),
      ),
    );
  });
});

describe('cosDeg', () => {
  it('is exact at and near the poles', () => {
    expect(cosDeg(90)).toBe(0);
    expect(cosDeg(-90)).toBe(0);
    // cos(90 deg - x) = sin x, x formed without rounding.
    expect(cosDeg(90 - 2 ** -30)).toBe(Math.sin((2 ** -30 * Math.PI) / 180));
  });
});

describe('separationArcsec', () => {
  it('is the same in both directions and zero for a position and itself', () => {
    fc.assert(
      fc.property(ra, dec, ra, dec, (ra1, dec1, ra2, dec2) => {
        expect(separationArcsec(ra1, dec1, ra2, dec2)).toBe(separationArcsec(ra2, dec2, ra1, dec1));
        expect(separationArcsec(ra1, dec1, ra1, dec1)).toBe(0);
      }),
    );
  });

  it('takes RA 360 for RA 0 and a pole for one point', () => {
    expect(separationArcsec(0, 12, 360, 12)).toBe(0);
    expect(separationArcsec(10, 90, 200, 90)).toBe(0);
    expect(separationArcsec(10, -90, 200, -90)).toBe(0);
  });

  it('holds up to opposite points', () => {
    expect(separationArcsec(0, 0, 180, 0)).toBeCloseTo(648000, 6);
    expect(separationArcsec(33, -20, 213, 20 - 1e-4)).toBeCloseTo(648000 - 0.36, 6);
    expect(separationArcsec(0, 90, 0, -90)).toBeCloseTo(648000, 6);
  });

  it('gives NaN for NaN', () => {
    expect(separationArcsec(NaN, 0, 0, 0)).toBeNaN();
  });
});

describe('positionAngleDeg', () => {
  it('is null at zero separation and from a pole', () => {
    expect(positionAngleDeg(10, 20, 10, 20)).toBeNull();
    expect(positionAngleDeg(0, 20, 360, 20)).toBeNull();
    expect(positionAngleDeg(10, 90, 10, 89)).toBeNull();
    expect(positionAngleDeg(10, -90, 10, 0)).toBeNull();
  });

  it('points towards a pole from anywhere', () => {
    expect(positionAngleDeg(77, -30, 200, 90)).toBeCloseTo(0, 12);
    expect(positionAngleDeg(77, -30, 200, -90)).toBeCloseTo(180, 12);
  });
});

describe('offsetPosition', () => {
  it('goes where separation and position angle say it went', () => {
    const inner = fc.double({ min: -89.9, max: 89.9, noNaN: true });
    const distance = fc.double({ min: 0.01, max: 7200, noNaN: true });
    const angle = fc.double({ min: 0, max: 359.999, noNaN: true });
    fc.assert(
      fc.property(ra, inner, distance, angle, (raDeg, decDeg, arcsec, paDeg) => {
        const moved = offsetPosition({ raDeg, decDeg }, arcsec, paDeg);
        expect(Math.abs(separationArcsec(raDeg, decDeg, moved.raDeg, moved.decDeg) - arcsec)).toBeLessThan(
          1e-8,
        );
        const back = positionAngleDeg(raDeg, decDeg, moved.raDeg, moved.decDeg) ?? NaN;
        // 1e-9 arcsec across, seen from the distance, plus rounding.
        expect(Math.abs(raDifferenceDeg(paDeg, back))).toBeLessThan((2e-9 / arcsec) * 60 + 1e-9);
      }),
    );
  });

  it('crosses a pole', () => {
    const over = offsetPosition({ raDeg: 40, decDeg: 89.999 }, 7.2, 0);
    expect(over.raDeg).toBeCloseTo(220, 9);
    expect(over.decDeg).toBeCloseTo(89.999, 9);
  });
});

describe('tangent plane', () => {
  it('comes back to the position it started from', () => {
    const near = fc.double({ min: -3, max: 3, noNaN: true });
    fc.assert(
      fc.property(ra, dec, near, near, (raDeg, decDeg, xi, eta) => {
        const centre = { raDeg, decDeg };
        const place = positionAtTangentOffset({ xiArcsec: xi * 3600, etaArcsec: eta * 3600 }, centre);
        const back = tangentOffset(place, centre);
        expect(back).not.toBeNull();
        expect(Math.abs((back?.xiArcsec ?? NaN) - xi * 3600)).toBeLessThan(1e-8);
        expect(Math.abs((back?.etaArcsec ?? NaN) - eta * 3600)).toBeLessThan(1e-8);
      }),
    );
  });

  it('has no place for what is 90 deg away or further', () => {
    expect(tangentOffset({ raDeg: 180, decDeg: 0 }, { raDeg: 0, decDeg: 0 })).toBeNull();
    expect(tangentOffset({ raDeg: 0, decDeg: -90 }, { raDeg: 5, decDeg: 0 })).toBeNull();
  });
});

describe('midpoint', () => {
  it('lies halfway on the great circle', () => {
    fc.assert(
      fc.property(ra, dec, ra, dec, (ra1, dec1, ra2, dec2) => {
        const whole = separationArcsec(ra1, dec1, ra2, dec2);
        fc.pre(whole < 600_000);
        const middle = midpoint({ raDeg: ra1, decDeg: dec1 }, { raDeg: ra2, decDeg: dec2 });
        const half = separationArcsec(ra1, dec1, middle?.raDeg ?? NaN, middle?.decDeg ?? NaN);
        expect(Math.abs(half - whole / 2)).toBeLessThan(1e-7);
      }),
    );
  });

  it('is null between opposite points', () => {
    expect(midpoint({ raDeg: 10, decDeg: 20 }, { raDeg: 190, decDeg: -20 })).toBeNull();
  });
});

describe('raHalfWidthDeg', () => {
  it('is never less than the RA distance of a point on the rim of the cone', () => {
    const inner = fc.double({ min: -89, max: 89, noNaN: true });
    const angle = fc.double({ min: 0, max: 360, noNaN: true });
    fc.assert(
      fc.property(inner, angle, (decDeg, paDeg) => {
        const rim = offsetPosition({ raDeg: 180, decDeg }, 3000, paDeg);
        expect(Math.abs(rim.raDeg - 180)).toBeLessThanOrEqual(raHalfWidthDeg(3000, decDeg) * (1 + 1e-9));
      }),
    );
  });
});

describe('unitVector', () => {
  it('has length 1', () => {
    fc.assert(
      fc.property(
        ra,
        dec,
        (raDeg, decDeg) => Math.abs(Math.hypot(...unitVector(raDeg, decDeg)) - 1) < 1e-15 * 4,
      ),
    );
  });
});
