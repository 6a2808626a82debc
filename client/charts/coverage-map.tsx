import { useId, useMemo } from 'react';
import { geoPath } from 'd3-geo';
import { formatFixed, plural } from '../components/quantities';
import { stampOf } from '../components/stamp-rule';
import { useElementWidth } from '../components/use-element-width';
import { ChartTable } from './chart-table';
import { CoverageLegend, GraticuleNumbers } from './coverage-parts';
import { classOpacity, countClasses } from './coverage-classes';
import { graticule } from './sky-graticule';
import {
  outlines,
  PLOT_BOTTOM_PX,
  PLOT_LEFT_PX,
  skyMap,
  type CoverageCell,
  type SkyMap,
} from './sky-projection';

const MOST_PX = 620;
const CLASSES = 5;
const TABLE_ROWS = 200;

/**
 * Where on the sky sources lie: density cells in an equal-area projection, east to the left; the map zooms to the
 * field, or shows the whole sky when the cells spread over it.
 */
export function CoverageMap({
  cells,
  cellSizeDeg,
  label,
  ordinal,
}: {
  cells: readonly CoverageCell[];
  cellSizeDeg: number;
  /** Names the chart: 'Sky coverage of DEEP'. */
  label: string;
  /** Draws in the hue of this catalogue's stamp instead of ink. */
  ordinal?: number;
}) {
  const [ref, measuredPx] = useElementWidth(420);
  const widthPx = Math.max(240, Math.min(MOST_PX, measuredPx));
  const densest = useMemo(
    () => [...cells].sort((a, b) => b.count - a.count || a.raDeg - b.raDeg).slice(0, TABLE_ROWS),
    [cells],
  );
  if (cells.length === 0) return <p className="text-muted">No position to show.</p>;
  const colour = ordinal === undefined ? 'var(--ink)' : `var(--stamp-${stampOf(ordinal).hue}-line)`;
  const bounds = countClasses(cells, CLASSES);
  return (
    <figure ref={ref} className="grid w-full min-w-0 content-start gap-2">
      <Picture
        cells={cells}
        cellSizeDeg={cellSizeDeg}
        widthPx={widthPx}
        label={label}
        colour={colour}
        bounds={bounds}
      />
      <figcaption className="grid gap-1 text-xs text-muted">
        <CoverageLegend bounds={bounds} colour={colour} />
        Sources per cell of {formatFixed(cellSizeDeg, cellSizeDeg < 0.1 ? 3 : 2)}° by{' '}
        {formatFixed(cellSizeDeg, cellSizeDeg < 0.1 ? 3 : 2)}°. Equal-area, RA and Dec in degrees, east left.
      </figcaption>
      <ChartTable
        label={densest.length < cells.length ? `${label}: the ${TABLE_ROWS} densest cells` : label}
        head={['RA (deg)', 'Dec (deg)', 'Sources']}
        rows={densest.map((cell) => [cell.raDeg.toFixed(4), cell.decDeg.toFixed(4), cell.count])}
      />
    </figure>
  );
}

function Picture({
  cells,
  cellSizeDeg,
  widthPx,
  label,
  colour,
  bounds,
}: {
  cells: readonly CoverageCell[];
  cellSizeDeg: number;
  widthPx: number;
  label: string;
  colour: string;
  bounds: readonly number[];
}) {
  const clipId = useId();
  const heightPx = Math.round(widthPx * 0.66);
  const drawn = useMemo(
    () => drawing(cells, cellSizeDeg, widthPx, heightPx, bounds),
    [cells, cellSizeDeg, widthPx, heightPx, bounds],
  );
  const total = cells.reduce((sum, cell) => sum + cell.count, 0);
  return (
    <svg
      width={widthPx}
      height={heightPx}
      viewBox={`0 0 ${widthPx} ${heightPx}`}
      role="img"
      aria-label={`${label}: ${plural(total, 'source', 'sources')} in ${plural(cells.length, 'cell', 'cells')}`}
      className="block max-w-full bg-raised"
    >
      <clipPath id={clipId}>
        <rect
          x={PLOT_LEFT_PX}
          y={1}
          width={widthPx - PLOT_LEFT_PX - 1}
          height={heightPx - PLOT_BOTTOM_PX - 1}
        />
      </clipPath>
      <g clipPath={`url(#${clipId})`}>
        {drawn.layers.map((path, index) => (
          <path key={index} d={path} fill={colour} fillOpacity={classOpacity(index, bounds.length)} />
        ))}
        <path d={drawn.lines} fill="none" stroke="var(--edge)" strokeWidth={0.75} strokeDasharray="1 3" />
      </g>
      {drawn.whole ? (
        <path d={drawn.outline} fill="none" stroke="var(--edge)" />
      ) : (
        <rect
          x={PLOT_LEFT_PX}
          y={1}
          width={widthPx - PLOT_LEFT_PX - 1}
          height={heightPx - PLOT_BOTTOM_PX - 1}
          fill="none"
          stroke="var(--edge)"
        />
      )}
      <GraticuleNumbers lines={drawn.ra} whole={drawn.whole} edge="bottom" />
      <GraticuleNumbers lines={drawn.dec} whole={drawn.whole} edge="left" />
    </svg>
  );
}

function drawing(
  cells: readonly CoverageCell[],
  cellSizeDeg: number,
  widthPx: number,
  heightPx: number,
  bounds: readonly number[],
) {
  const map: SkyMap = skyMap(cells, cellSizeDeg, widthPx, heightPx);
  const path = geoPath(map.projection).digits(1);
  const { ra, dec } = graticule(map, widthPx, heightPx);
  const layers = bounds.map((bound, index) => {
    const above = bounds[index + 1] ?? Infinity;
    const inClass = cells.filter((cell) => cell.count >= bound && cell.count < above);
    return path(outlines(inClass, cellSizeDeg)) ?? '';
  });
  const lines = [...ra, ...dec].map(({ line }) => path(line) ?? '').join('');
  return { layers, lines, ra, dec, outline: path({ type: 'Sphere' }) ?? '', whole: map.radiusDeg === null };
}
