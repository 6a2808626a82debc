import { geoArea, geoPath } from 'd3-geo';
import { describe, expect, it } from 'vitest';
import { healpixCellAreaDeg2, healpixCentre } from '../../shared/astro/healpix';
import { graticule } from './sky-graticule';
import { countClasses } from './coverage-classes';
import { cellOutline, fieldOf, healpixOrderOf, outlines, skyMap } from './sky-projection';

const SPHERE_DEG2 = (4 * Math.PI * 180 * 180) / (Math.PI * Math.PI);
const sizeOf = (order: number) => Math.sqrt(healpixCellAreaDeg2(order));

function cellsAround(raDeg: number, decDeg: number) {
  return [-0.02, 0, 0.02].flatMap((d) =>
    [-0.02, 0, 0.02].map((e) => ({ raDeg: raDeg + d, decDeg: decDeg + e, count: 4 })),
  );
}

describe('fieldOf', () => {
  it('finds the middle of a field, also across RA 0', () => {
    const field = fieldOf(
      [
        { raDeg: 359.9, decDeg: 10, count: 1 },
        { raDeg: 0.1, decDeg: 10, count: 1 },
      ],
      0.01,
    );
    expect(Math.min(field?.centre.raDeg ?? NaN, 360 - (field?.centre.raDeg ?? NaN))).toBeLessThan(1e-9);
    expect(field?.radiusDeg).toBeCloseTo(0.0985 + 0.01, 3);
  });

  it('has none for directions that cancel', () => {
    expect(
      fieldOf(
        [
          { raDeg: 0, decDeg: 0, count: 1 },
          { raDeg: 180, decDeg: 0, count: 1 },
        ],
        1,
      ),
    ).toBeNull();
  });
});

describe('cell outlines', () => {
  it('knows the sizes of HEALPix orders and no others', () => {
    expect([0, 3, 11].map((order) => healpixOrderOf(sizeOf(order)))).toEqual([0, 3, 11]);
    expect(healpixOrderOf(0.5)).toBeNull();
  });

  it('covers the cell and not the rest of the sphere, at the pole as well', () => {
    for (const cell of [0, 77, 300, 767]) {
      const outline = cellOutline(healpixCentre(3, cell), sizeOf(3));
      const areaDeg2 = (geoArea(outline) / (4 * Math.PI)) * SPHERE_DEG2;
      // Sides of the true cells are not great circles: a tenth is enough to tell the cell from its neighbourhood.
      expect(areaDeg2 / healpixCellAreaDeg2(3)).toBeGreaterThan(0.9);
      expect(areaDeg2 / healpixCellAreaDeg2(3)).toBeLessThan(1.1);
    }
    const square = cellOutline({ raDeg: 10, decDeg: 60 }, 0.5);
    expect(((geoArea(square) / (4 * Math.PI)) * SPHERE_DEG2) / 0.25).toBeCloseTo(1, 2);
  });
});

describe('skyMap', () => {
  it('puts east to the left and north up, and fills the picture with a small field', () => {
    const cells = cellsAround(187.5, 4.2);
    const { projection, radiusDeg } = skyMap(cells, 0.02, 400, 300);
    const [x0 = NaN, y0 = NaN] = projection([187.5, 4.2]) ?? [];
    const [east = NaN] = projection([187.51, 4.2]) ?? [];
    const [, north = NaN] = projection([187.5, 4.21]) ?? [];
    expect(radiusDeg).toBeLessThan(0.1);
    expect(east).toBeLessThan(x0);
    expect(north).toBeLessThan(y0);
    const [[left, top], [right, bottom]] = geoPath(projection).bounds(outlines(cells, 0.02));
    expect(Math.max((right - left) / 326, (bottom - top) / 256)).toBeCloseTo(1, 1);
  });

  it('has equal areas in a field and on the whole sky', () => {
    const whole = Array.from({ length: 192 }, (_, cell) => ({ ...healpixCentre(2, cell), count: 1 }));
    const map = skyMap(whole, sizeOf(2), 600, 330);
    expect(map.radiusDeg).toBeNull();
    const path = geoPath(map.projection);
    // Two squares of the same area, at the equator and at 60 deg.
    const low = path.area(cellOutline({ raDeg: 100, decDeg: 0 }, 2));
    const high = path.area(cellOutline({ raDeg: 230, decDeg: 60 }, 2));
    expect(high / low).toBeCloseTo(1, 1);
  });

  it('numbers its lines at the edges', () => {
    const { ra, dec } = graticule(skyMap(cellsAround(187.5, 4.2), 0.02, 400, 300), 400, 300);
    expect(ra.filter(({ at }) => at !== null).length).toBeGreaterThanOrEqual(2);
    expect(dec.filter(({ at }) => at !== null).length).toBeGreaterThanOrEqual(2);
    expect(ra.map(({ text }) => text)).toContain('187.50°');
    expect(dec.map(({ text }) => text)).toContain('+4.20°');
  });

  it('wraps the numbers at RA 0', () => {
    const { ra } = graticule(skyMap(cellsAround(0, 0), 0.02, 400, 300), 400, 300);
    expect(ra.every(({ text }) => parseFloat(text) >= 0 && parseFloat(text) < 360)).toBe(true);
  });
});

describe('countClasses', () => {
  it('begins at one and rises to the densest cell', () => {
    expect(countClasses([{ raDeg: 0, decDeg: 0, count: 1 }], 5)).toEqual([1]);
    const bounds = countClasses([{ raDeg: 0, decDeg: 0, count: 1000 }], 5);
    expect(bounds[0]).toBe(1);
    expect(bounds).toEqual([...bounds].sort((a, b) => a - b));
    expect(bounds.at(-1)).toBeLessThanOrEqual(1000);
    expect(new Set(bounds).size).toBe(5);
  });
});
