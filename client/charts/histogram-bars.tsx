import { memo, type ReactNode } from 'react';
import { formatCount } from '../components/quantities';
import { HISTOGRAM_FRAME, stepPath, type HistogramProps } from './histogram-shape';
import { linearTicks, tickStep, tickText, type Scale } from './scales';

const { leftPx, rightPx, topPx, bottomPx } = HISTOGRAM_FRAME;

type BarsProps = HistogramProps & { x: Scale; y: Scale; widthPx: number; heightPx: number; top: number };

/** Bars, component and axes: everything but the limit; not drawn again while that is dragged. */
export const HistogramBars = memo(
  function HistogramBars({
    edges,
    counts,
    overlay,
    xLabel,
    xUnit,
    yLabel,
    x,
    y,
    widthPx,
    heightPx,
    top,
  }: BarsProps) {
    const base = heightPx - bottomPx;
    const lo = edges[0] ?? 0;
    const hi = edges.at(-1) ?? 1;
    const most = Math.max(3, Math.floor(widthPx / 90));
    const xStep = tickStep(lo, hi, most);
    const yStep = Math.max(1, tickStep(0, top, 5));
    return (
      <g aria-hidden="true">
        {linearTicks(0, top, 5)
          .filter((tick) => tick % yStep < 1e-9)
          .map((tick) => (
            <g key={tick}>
              <line x1={leftPx} x2={widthPx - rightPx} y1={y.at(tick)} y2={y.at(tick)} stroke="var(--rule)" />
              <AxisText x={leftPx - 6} y={y.at(tick) + 4} anchor="end">
                {tick >= 100_000 ? tickText(tick, yStep) : formatCount(tick)}
              </AxisText>
            </g>
          ))}
        <path
          d={stepPath(edges, counts, x, y, base)}
          fill="var(--ink)"
          fillOpacity={0.18}
          stroke="var(--ink)"
        />
        {overlay !== undefined && (
          <path
            d={stepPath(edges, overlay.values, x, y, null)}
            fill="none"
            stroke="var(--link)"
            strokeWidth={2}
            strokeDasharray="6 3"
          />
        )}
        <line x1={leftPx} x2={widthPx - rightPx} y1={base} y2={base} stroke="var(--edge)" />
        {linearTicks(lo, hi, most).map((tick) => (
          <g key={tick}>
            <line x1={x.at(tick)} x2={x.at(tick)} y1={base} y2={base + 5} stroke="var(--edge)" />
            <AxisText x={x.at(tick)} y={base + 18} anchor="middle">
              {tickText(tick, xStep)}
            </AxisText>
          </g>
        ))}
        <AxisText x={(leftPx + widthPx - rightPx) / 2} y={base + 37} anchor="middle">
          {xUnit === undefined ? xLabel : `${xLabel} (${xUnit})`}
        </AxisText>
        <text
          transform={`translate(12 ${(topPx + base) / 2}) rotate(-90)`}
          textAnchor="middle"
          fontSize={12}
          fill="var(--muted)"
        >
          {yLabel}
        </text>
      </g>
    );
  },
  (before, after) =>
    before.edges === after.edges &&
    before.counts === after.counts &&
    before.overlay?.values === after.overlay?.values &&
    before.x === after.x &&
    before.y === after.y &&
    before.xLabel === after.xLabel &&
    before.yLabel === after.yLabel,
);

function AxisText({
  x,
  y,
  anchor,
  children,
}: {
  x: number;
  y: number;
  anchor: 'middle' | 'end';
  children: ReactNode;
}) {
  return (
    <text x={x} y={y} textAnchor={anchor} fontSize={12} fill="var(--muted)">
      {children}
    </text>
  );
}
