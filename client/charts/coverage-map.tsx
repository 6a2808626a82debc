import { useId, useMemo } from 'react';
import { geoPath } from 'd3-geo';
import { formatCount, formatFixed, plural } from '../components/quantities';
import { stampOf } from '../components/stamp-rule';
import { useElementWidth } from '../components/use-element-width';
import { ChartTable } from './chart-table';
import { graticule, PLOT_BOTTOM_PX, PLOT_LEFT_PX, type GraticuleLine } from './sky-graticule';
import { countClasses, outlines, skyMap, type CoverageCell, type SkyMap } from './sky-projection';

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
        <Legend bounds={bounds} colour={colour} />
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

function opacityOf(index: number, classes: number): number {
  return classes <= 1 ? 0.7 : 0.16 + (0.74 * index) / (classes - 1);
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
          <path key={index} d={path} fill={colour} fillOpacity={opacityOf(index, bounds.length)} />
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
      <Numbers lines={drawn.ra} whole={drawn.whole} edge="bottom" />
      <Numbers lines={drawn.dec} whole={drawn.whole} edge="left" />
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

function Numbers({
  lines,
  whole,
  edge,
}: {
  lines: readonly GraticuleLine[];
  whole: boolean;
  edge: 'bottom' | 'left';
}) {
  const side = edge === 'left' && !whole;
  return (
    <g fontSize={11} fill="var(--muted)" aria-hidden="true">
      {lines.map(({ text, at }) =>
        at === null ? null : (
          <text
            key={text}
            x={side ? at.x - 4 : at.x}
            y={edge === 'bottom' && !whole ? at.y + 14 : at.y}
            dy={edge === 'bottom' && !whole ? 0 : 4}
            textAnchor={side ? 'end' : 'middle'}
            {...(whole
              ? { stroke: 'var(--raised)', strokeWidth: 5, strokeLinejoin: 'round', paintOrder: 'stroke' }
              : {})}
          >
            {text}
          </text>
        ),
      )}
    </g>
  );
}

function Legend({ bounds, colour }: { bounds: readonly number[]; colour: string }) {
  return (
    <span className="flex flex-wrap gap-x-4 gap-y-1">
      {bounds.map((bound, index) => {
        const next = bounds[index + 1];
        const text =
          next === undefined
            ? `${formatCount(bound)} or more`
            : next - 1 === bound
              ? formatCount(bound)
              : `${formatCount(bound)} to ${formatCount(next - 1)}`;
        return (
          <span key={bound} className="inline-flex items-center gap-1.5">
            <svg width={14} height={14} aria-hidden="true">
              <rect width={14} height={14} fill="var(--raised)" />
              <rect
                x={0.5}
                y={0.5}
                width={13}
                height={13}
                fill={colour}
                fillOpacity={opacityOf(index, bounds.length)}
                stroke="var(--edge)"
              />
            </svg>
            {text}
          </span>
        );
      })}
    </span>
  );
}
