/** The coverage picture's geometry: an equal-area projection that fits the cells, east to the left. */
import { geoArea, geoAzimuthalEqualArea, geoEqualEarth, type GeoProjection } from 'd3-geo';
import type { MultiPolygon, Polygon, Position } from 'geojson';
import { healpixCell, healpixCorners, MAX_HEALPIX_ORDER } from '../../shared/astro/healpix';
import { positionOfVector, separationArcsec, unitVector, type SkyPosition } from '../../shared/astro/sphere';

export interface CoverageCell {
  raDeg: number;
  decDeg: number;
  count: number;
}

/** Room for the numbers left of and below the plot, and between plot edge and cells. */
export const PLOT_LEFT_PX = 50;
export const PLOT_BOTTOM_PX = 20;
const INSET_PX = 12;
/** Fields larger than this radius are shown on a map of the whole sky. */
const WHOLE_SKY_FROM_DEG = 60;
/** Side of an order-0 HEALPix cell taken as a square: sqrt of a twelfth of the sphere, degrees. */
const ORDER_0_SIDE_DEG = (Math.sqrt((4 * Math.PI) / 12) * 180) / Math.PI;

/** The smallest cap around the mean direction that holds all cells; null for none, or when they balance out. */
export function fieldOf(
  cells: readonly CoverageCell[],
  cellSizeDeg: number,
): { centre: SkyPosition; radiusDeg: number } | null {
  const sum: [number, number, number] = [0, 0, 0];
  for (const { raDeg, decDeg } of cells) {
    const [x, y, z] = unitVector(raDeg, decDeg);
    sum[0] += x;
    sum[1] += y;
    sum[2] += z;
  }
  // Directions that cancel (a survey of the whole sky) have no middle.
  if (Math.hypot(...sum) < 0.05 * cells.length) return null;
  const centre = positionOfVector(sum);
  if (centre === null) return null;
  const widest = cells.reduce(
    (most, cell) => Math.max(most, separationArcsec(centre.raDeg, centre.decDeg, cell.raDeg, cell.decDeg)),
    0,
  );
  return { centre, radiusDeg: widest / 3600 + cellSizeDeg };
}

/** The HEALPix order whose cells have this size; null when no order has. */
export function healpixOrderOf(cellSizeDeg: number): number | null {
  const order = Math.log2(ORDER_0_SIDE_DEG / cellSizeDeg);
  const whole = Math.round(order);
  return Math.abs(order - whole) < 1e-3 && whole >= 0 && whole <= MAX_HEALPIX_ORDER ? whole : null;
}

/** Outline of a cell: of the HEALPix cell when the size is that of an order, else a square of the size. */
export function cellOutline(cell: SkyPosition, cellSizeDeg: number): Polygon {
  const order = healpixOrderOf(cellSizeDeg);
  const corners =
    order === null
      ? squareCorners(cell, cellSizeDeg)
      : healpixCorners(order, healpixCell(order, cell.raDeg, cell.decDeg)).map((p): Position => [
          p.raDeg,
          p.decDeg,
        ]);
  const first = corners[0];
  const ring = first === undefined ? corners : [...corners, first];
  const polygon: Polygon = { type: 'Polygon', coordinates: [ring] };
  // On the sphere a ring in the wrong sense is everything *but* the cell.
  return geoArea(polygon) > 2 * Math.PI ? { type: 'Polygon', coordinates: [[...ring].reverse()] } : polygon;
}

function squareCorners({ raDeg, decDeg }: SkyPosition, sizeDeg: number): Position[] {
  const half = sizeDeg / 2;
  const low = Math.max(-90, decDeg - half);
  const high = Math.min(90, decDeg + half);
  const halfRa = Math.min(180, half / Math.max(1e-6, Math.cos((decDeg * Math.PI) / 180)));
  return [
    [raDeg - halfRa, low],
    [raDeg - halfRa, high],
    [raDeg + halfRa, high],
    [raDeg + halfRa, low],
  ];
}

export function outlines(cells: readonly CoverageCell[], cellSizeDeg: number): MultiPolygon {
  return {
    type: 'MultiPolygon',
    coordinates: cells.map((cell) => cellOutline(cell, cellSizeDeg).coordinates),
  };
}

export interface SkyMap {
  projection: GeoProjection;
  /** Whole sky, or a field with its radius. */
  radiusDeg: number | null;
  centre: SkyPosition;
}

/**
 * An equal-area projection into a picture of `widthPx` by `heightPx`, mirrored so that east is to the left:
 * azimuthal around a field, Equal Earth (Šavrič, Patterson & Jenny 2019, from memory) for the whole sky.
 */
export function skyMap(
  cells: readonly CoverageCell[],
  cellSizeDeg: number,
  widthPx: number,
  heightPx: number,
): SkyMap {
  const extent: [[number, number], [number, number]] = [
    [PLOT_LEFT_PX + INSET_PX, INSET_PX],
    [widthPx - INSET_PX, heightPx - PLOT_BOTTOM_PX - INSET_PX],
  ];
  const field = fieldOf(cells, cellSizeDeg);
  if (field === null || field.radiusDeg > WHOLE_SKY_FROM_DEG) {
    const projection = geoEqualEarth().rotate([180, 0]).reflectX(true).fitExtent(extent, { type: 'Sphere' });
    return { projection, radiusDeg: null, centre: { raDeg: 180, decDeg: 0 } };
  }
  const { centre, radiusDeg } = field;
  const projection = geoAzimuthalEqualArea()
    .rotate([-centre.raDeg, -centre.decDeg])
    .reflectX(true)
    .precision(0.1)
    .fitExtent(extent, outlines(cells, cellSizeDeg));
  return { projection, radiusDeg, centre };
}
