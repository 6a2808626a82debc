import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { healpixCell, healpixCellAreaDeg2, healpixCentre, healpixCorners } from './healpix';
import { midpoint, separationArcsec } from './sphere';

describe('healpixCell', () => {
  it('finds every cell again from its centre, orders 0 to 4', () => {
    for (let order = 0; order <= 4; order += 1) {
      for (let cell = 0; cell < 12 * 4 ** order; cell += 1) {
        const { raDeg, decDeg } = healpixCentre(order, cell);
        expect(healpixCell(order, raDeg, decDeg)).toBe(cell);
      }
    }
  });

  it('a cell lies in its parent cell', () => {
    const ra = fc.double({ min: 0, max: 360, noNaN: true });
    const dec = fc.double({ min: -90, max: 90, noNaN: true });
    fc.assert(
      fc.property(ra, dec, fc.integer({ min: 1, max: 14 }), (raDeg, decDeg, order) => {
        const cell = healpixCell(order, raDeg, decDeg);
        expect(Math.floor(cell / 4)).toBe(healpixCell(order - 1, raDeg, decDeg));
      }),
    );
  });

  it('spreads uniform positions evenly: equal areas', () => {
    const counts = new Array<number>(48).fill(0);
    const side = 400;
    for (let i = 0; i < side; i += 1) {
      for (let j = 0; j < side; j += 1) {
        const decDeg = (Math.asin((2 * (i + 0.5)) / side - 1) * 180) / Math.PI;
        const cell = healpixCell(1, ((j + 0.5) * 360) / side, decDeg);
        counts[cell] = (counts[cell] ?? 0) + 1;
      }
    }
    const expected = (side * side) / 48;
    for (const count of counts) expect(Math.abs(count / expected - 1)).toBeLessThan(0.03);
  });

  it('refuses what is not on the sky and orders that do not exist', () => {
    expect(() => healpixCell(3, NaN, 0)).toThrow(RangeError);
    expect(() => healpixCell(3, 0, 90.1)).toThrow(RangeError);
    expect(() => healpixCell(15, 0, 0)).toThrow(RangeError);
    expect(() => healpixCell(1.5, 0, 0)).toThrow(RangeError);
    expect(() => healpixCentre(0, 12)).toThrow(RangeError);
  });
});

describe('healpixCorners', () => {
  it('stand around the centre of the cell', () => {
    const [north, west, south, east] = healpixCorners(5, 777);
    const centre = healpixCentre(5, 777);
    const sideArcsec = Math.sqrt(healpixCellAreaDeg2(5)) * 3600;
    for (const corner of [north, west, south, east]) {
      const distance = separationArcsec(
        centre.raDeg,
        centre.decDeg,
        corner?.raDeg ?? NaN,
        corner?.decDeg ?? NaN,
      );
      expect(distance).toBeGreaterThan(sideArcsec * 0.4);
      expect(distance).toBeLessThan(sideArcsec);
    }
    expect(north?.decDeg).toBeGreaterThan(south?.decDeg ?? NaN);
    const middle = north && south ? midpoint(north, south) : null;
    expect(middle?.decDeg).toBeCloseTo(centre.decDeg, 0);
  });

  it('meet at the pole', () => {
    expect(healpixCorners(0, 0)[0]?.decDeg).toBeCloseTo(90, 12);
    expect(healpixCorners(0, 8)[2]?.decDeg).toBeCloseTo(-90, 12);
  });
});
