/** Lines of equal RA and Dec for the coverage picture, with the places of their numbers. */
import type { LineString, Position } from 'geojson';
import { linearTicks, tickStep, tickText } from './scales';
import { PLOT_BOTTOM_PX, PLOT_LEFT_PX, type SkyMap } from './sky-projection';

interface Place {
  x: number;
  y: number;
}

export interface GraticuleLine {
  line: LineString;
  text: string;
  /** Place of the number; null where the line does not reach the picture's edge. */
  at: Place | null;
}

const SAMPLES = 64;
/** About so many lines over the reach, which is wider than the picture. */
const LINES = 9;

function range(lo: number, hi: number): number[] {
  return Array.from({ length: SAMPLES + 1 }, (_, i) => lo + ((hi - lo) * i) / SAMPLES);
}

/** Meridians (numbers at the lower edge) and parallels (numbers at the left edge). */
export function graticule(
  map: SkyMap,
  widthPx: number,
  heightPx: number,
): { ra: GraticuleLine[]; dec: GraticuleLine[] } {
  const { centre } = map;
  const whole = map.radiusDeg === null;
  const reach = map.radiusDeg === null ? 90 : map.radiusDeg * 1.6;
  const decLo = whole ? -90 : Math.max(-90, centre.decDeg - reach);
  const decHi = whole ? 90 : Math.min(90, centre.decDeg + reach);
  const polar = decHi >= 90 || decLo <= -90;
  const raReach = whole || polar ? 180 : Math.min(180, reach / Math.cos((centre.decDeg * Math.PI) / 180));
  const raLo = centre.raDeg - raReach;
  const raHi = centre.raDeg + raReach;
  const raStep = raReach === 180 ? 45 : tickStep(raLo, raHi, LINES);
  const ras = raReach === 180 ? [0, 45, 90, 135, 180, 225, 270, 315] : linearTicks(raLo, raHi, LINES);
  const decStep = whole ? 30 : tickStep(decLo, decHi, LINES);
  const decs = whole
    ? [-60, -30, 30, 60]
    : linearTicks(decLo, decHi, LINES).filter((dec) => Math.abs(dec) < 90);
  return {
    ra: ras.map((ra) => {
      const line: LineString = {
        type: 'LineString',
        coordinates: range(decLo, decHi).map((dec) => [ra, dec]),
      };
      const text = `${tickText(((ra % 360) + 360) % 360, raStep)}°`;
      return { line, text, at: edgePlace(map, line, 'bottom', widthPx, heightPx) };
    }),
    dec: decs.map((dec) => {
      const line: LineString = { type: 'LineString', coordinates: range(raLo, raHi).map((ra) => [ra, dec]) };
      const text = `${dec > 0 ? '+' : ''}${tickText(dec, decStep)}°`;
      return { line, text, at: edgePlace(map, line, 'left', widthPx, heightPx) };
    }),
  };
}

/** Where a line leaves the picture at an edge: between the sample inside and the one outside. */
function edgePlace(
  map: SkyMap,
  line: LineString,
  edge: 'bottom' | 'left',
  widthPx: number,
  heightPx: number,
): Place | null {
  const bottom = heightPx - PLOT_BOTTOM_PX;
  if (map.radiusDeg === null) return wholeSkyPlace(map, line, edge);
  const goal = edge === 'bottom' ? bottom : PLOT_LEFT_PX;
  let before: Place | null = null;
  for (const coordinates of line.coordinates) {
    const here = placeOf(map, coordinates);
    const crossing: Place | null =
      before === null || here === null ? null : crossingOf(before, here, edge, goal);
    before = here;
    if (crossing === null) continue;
    const { x, y } = crossing;
    const inside = edge === 'bottom' ? x >= PLOT_LEFT_PX && x <= widthPx - 14 : y >= 8 && y <= bottom;
    if (inside) return { x, y };
  }
  return null;
}

function placeOf(map: SkyMap, [ra = 0, dec = 0]: Position): Place | null {
  const at = map.projection([ra, dec]);
  return at === null ? null : { x: at[0], y: at[1] };
}

function crossingOf(from: Place, to: Place, edge: 'bottom' | 'left', goal: number): Place | null {
  const [v0, v1] = edge === 'bottom' ? [from.y, to.y] : [from.x, to.x];
  if ((v0 - goal) * (v1 - goal) > 0 || v0 === v1) return null;
  const t = (goal - v0) / (v1 - v0);
  return { x: from.x + t * (to.x - from.x), y: from.y + t * (to.y - from.y) };
}

/** On the whole sky the numbers stand on the map itself: RA along the equator, Dec along the middle meridian. */
function wholeSkyPlace(map: SkyMap, line: LineString, edge: 'bottom' | 'left'): Place | null {
  const [ra = 0, dec = 0] = line.coordinates[0] ?? [];
  return placeOf(map, edge === 'bottom' ? [ra, 0] : [180, dec]);
}
