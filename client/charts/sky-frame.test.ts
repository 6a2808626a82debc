import { describe, expect, it } from 'vitest';
import { offsetPosition } from '../../shared/astro/sphere';
import {
  ellipsePx,
  MAX_ZOOM,
  motionYears,
  pannedView,
  pointOfOffset,
  pointOfPosition,
  pxPerArcsec,
  scaleBar,
  zoomedView,
  type SkyView,
} from './sky-frame';

const view: SkyView = {
  centre: { raDeg: 187.5, decDeg: 60 },
  radiusArcsec: 20,
  sizePx: 500,
  zoom: 1,
  panEastArcsec: 0,
  panNorthArcsec: 0,
};

describe('finding chart geometry', () => {
  it('has north up and east left', () => {
    const middle = pointOfPosition(view, view.centre);
    const north = pointOfPosition(view, offsetPosition(view.centre, 10, 0));
    const east = pointOfPosition(view, offsetPosition(view.centre, 10, 90));
    expect(middle).toEqual({ x: 250, y: 250 });
    expect(north?.x).toBeCloseTo(250, 6);
    expect(north?.y).toBeCloseTo(250 - 10 * pxPerArcsec(view), 4);
    expect(east?.x).toBeCloseTo(250 - 10 * pxPerArcsec(view), 4);
    expect(east?.y).toBeCloseTo(250, 1);
  });

  it('draws across RA 0 without a jump', () => {
    const field = { ...view, centre: { raDeg: 0.0005, decDeg: 0 } };
    const west = pointOfPosition(field, { raDeg: 359.9995, decDeg: 0 });
    expect(west?.x).toBeCloseTo(250 + 3.6 * pxPerArcsec(view), 3);
  });

  it('has no place for the far side of the sky', () => {
    expect(pointOfPosition(view, { raDeg: 7.5, decDeg: -60 })).toBeNull();
  });

  it('keeps what lies under the pointer in place while zooming', () => {
    const at = { x: 100, y: 420 };
    const offsetUnder = (v: SkyView) => ({
      east: v.panEastArcsec - (at.x - v.sizePx / 2) / pxPerArcsec(v),
      north: v.panNorthArcsec - (at.y - v.sizePx / 2) / pxPerArcsec(v),
    });
    const closer = zoomedView(view, 2.5, at);
    expect(closer.zoom).toBe(2.5);
    expect(offsetUnder(closer).east).toBeCloseTo(offsetUnder(view).east, 9);
    expect(offsetUnder(closer).north).toBeCloseTo(offsetUnder(view).north, 9);
    expect(zoomedView(view, 1e9, at).zoom).toBe(MAX_ZOOM);
  });

  it('moves the picture with the pointer and stops beyond the field', () => {
    const moved = pannedView(view, 30, -20);
    const before = pointOfOffset(view, 1, 2);
    const after = pointOfOffset(moved, 1, 2);
    expect(after.x - before.x).toBeCloseTo(30, 9);
    expect(after.y - before.y).toBeCloseTo(-20, 9);
    expect(pannedView(view, 1e6, 0).panEastArcsec).toBe(30);
  });

  it('turns error ellipses by 90 - position angle and draws them to scale', () => {
    const ellipse = ellipsePx(view, 3, 1, 30);
    expect(ellipse?.rotateDeg).toBe(60);
    expect(ellipse?.rx).toBeCloseTo(3 * pxPerArcsec(view), 9);
    expect(ellipse?.ry).toBeCloseTo(pxPerArcsec(view), 9);
    // The end of the major axis by the position angle, and by the turned ellipse.
    const end = pointOfPosition(view, offsetPosition(view.centre, 3, 30));
    const turn = ((ellipse?.rotateDeg ?? NaN) * Math.PI) / 180;
    expect(end?.x).toBeCloseTo(250 - (ellipse?.rx ?? NaN) * Math.cos(turn), 1);
    expect(end?.y).toBeCloseTo(250 - (ellipse?.rx ?? NaN) * Math.sin(turn), 1);
    expect(ellipsePx(view, null, null, null)).toBeNull();
    expect(ellipsePx(view, 2, null, null)?.ry).toBeCloseTo(2 * pxPerArcsec(view), 9);
  });

  it('chooses years in which the fastest source stays in the field', () => {
    expect(motionYears([{ pmRaMasYr: 30, pmDecMasYr: 40 }, { pmRaMasYr: null }], 20)).toBe(100);
    expect(motionYears([{ pmRaMasYr: 5000, pmDecMasYr: 0 }], 20)).toBe(1);
    expect(motionYears([{}, { pmRaMasYr: 0, pmDecMasYr: 0 }], 20)).toBeNull();
  });

  it('has a scale bar of a round angle that fits, in its unit', () => {
    const bar = scaleBar(view, 150);
    expect(bar.text).toBe('10″');
    expect(bar.px).toBeCloseTo(10 * pxPerArcsec(view), 9);
    expect(bar.px).toBeLessThanOrEqual(150);
    expect(scaleBar({ ...view, radiusArcsec: 900 }, 150).text).toBe('5′');
    expect(scaleBar({ ...view, radiusArcsec: 36_000 }, 150).text).toBe('5°');
    expect(scaleBar({ ...view, zoom: 200 }, 150).text).toBe('0.05″');
  });
});
