/**
 * The finding chart's geometry, free of any drawing: tangent plane to pixels with north up and east to the left,
 * error ellipses, motion arrows and the scale bar.
 */
import { tangentOffset, type SkyPosition } from '../../shared/astro/sphere';
import { roundDown125 } from './scales';

export interface SkyView {
  centre: SkyPosition;
  /** Radius that fits into the picture at zoom 1, arcsec. */
  radiusArcsec: number;
  /** Side of the square picture. */
  sizePx: number;
  zoom: number;
  /** What stands in the middle of the picture: offset from the centre, arcsec, east and north. */
  panEastArcsec: number;
  panNorthArcsec: number;
}

export interface Point {
  x: number;
  y: number;
}

/** Room around the circle of `radiusArcsec` at zoom 1, for the frame and its numbers. */
const EDGE_SHARE = 0.06;

export function pxPerArcsec(view: SkyView): number {
  return ((view.sizePx / 2) * (1 - EDGE_SHARE) * view.zoom) / view.radiusArcsec;
}

/** Pixel of an offset from the centre: east grows to the left, north upwards. */
export function pointOfOffset(view: SkyView, eastArcsec: number, northArcsec: number): Point {
  const scale = pxPerArcsec(view);
  return {
    x: view.sizePx / 2 - (eastArcsec - view.panEastArcsec) * scale,
    y: view.sizePx / 2 - (northArcsec - view.panNorthArcsec) * scale,
  };
}

/** Pixel of a position; null on the far side of the sky. */
export function pointOfPosition(view: SkyView, position: SkyPosition): Point | null {
  const offset = tangentOffset(position, view.centre);
  return offset === null ? null : pointOfOffset(view, offset.xiArcsec, offset.etaArcsec);
}

/** The view after the picture was dragged by so many pixels. */
export function pannedView(view: SkyView, dxPx: number, dyPx: number): SkyView {
  const scale = pxPerArcsec(view);
  const reach = view.radiusArcsec * 1.5;
  const hold = (arcsec: number) => Math.min(reach, Math.max(-reach, arcsec));
  return {
    ...view,
    panEastArcsec: hold(view.panEastArcsec + dxPx / scale),
    panNorthArcsec: hold(view.panNorthArcsec + dyPx / scale),
  };
}

export const MIN_ZOOM = 0.5;
export const MAX_ZOOM = 200;

/** The view with its zoom multiplied; what stands under `at` (px) stays there. */
export function zoomedView(view: SkyView, factor: number, at: Point): SkyView {
  const zoom = Math.min(MAX_ZOOM, Math.max(MIN_ZOOM, view.zoom * factor));
  const before = pxPerArcsec(view);
  const after = pxPerArcsec({ ...view, zoom });
  const shift = 1 / before - 1 / after;
  return pannedView(
    {
      ...view,
      zoom,
      panEastArcsec: view.panEastArcsec - (at.x - view.sizePx / 2) * shift,
      panNorthArcsec: view.panNorthArcsec - (at.y - view.sizePx / 2) * shift,
    },
    0,
    0,
  );
}

export interface EllipsePx {
  rx: number;
  ry: number;
  /** SVG rotation of the rx axis, degrees clockwise on the screen. */
  rotateDeg: number;
}

/**
 * An error ellipse to scale. `paDeg` is the position angle of the major axis, degrees east of north: with east to
 * the left that axis points to (-sin pa, -cos pa) on the screen, which is a turn of 90 - pa from the x axis.
 */
export function ellipsePx(
  view: SkyView,
  errMajArcsec: number | null,
  errMinArcsec: number | null,
  paDeg: number | null,
): EllipsePx | null {
  if (errMajArcsec === null || !(errMajArcsec > 0)) return null;
  const scale = pxPerArcsec(view);
  return {
    rx: errMajArcsec * scale,
    ry: (errMinArcsec ?? errMajArcsec) * scale,
    rotateDeg: 90 - (paDeg ?? 0),
  };
}

const MOTION_YEARS = [1, 2, 5, 10, 25, 50, 100, 250, 500, 1000, 5000] as const;

/** Years for which motion arrows are drawn: the longest span in which the fastest source crosses at most 0.4 radii. */
export function motionYears(
  motions: readonly { pmRaMasYr?: number | null; pmDecMasYr?: number | null }[],
  radiusArcsec: number,
): number | null {
  const fastest = motions.reduce(
    (most, m) => Math.max(most, Math.hypot(m.pmRaMasYr ?? 0, m.pmDecMasYr ?? 0)),
    0,
  );
  if (!(fastest > 0)) return null;
  const fits = MOTION_YEARS.filter((years) => (fastest / 1000) * years <= 0.4 * radiusArcsec);
  return fits.at(-1) ?? MOTION_YEARS[0];
}

export interface ScaleBar {
  arcsec: number;
  px: number;
  text: string;
}

/** The longest bar of a round angle (1, 2, 5 …) that fits into `mostPx`, in the unit that suits it. */
export function scaleBar(view: SkyView, mostPx: number): ScaleBar {
  const scale = pxPerArcsec(view);
  const most = mostPx / scale;
  const unit = most >= 3600 ? 3600 : most >= 60 ? 60 : 1;
  const count = roundDown125(most / unit);
  const sign = unit === 3600 ? '°' : unit === 60 ? '′' : '″';
  return { arcsec: count * unit, px: count * unit * scale, text: `${Number(count.toPrecision(3))}${sign}` };
}
