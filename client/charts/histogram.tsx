import { memo, useMemo, type ReactNode } from 'react';
import { formatCount, formatFixed } from '../components/quantities';
import { useElementWidth } from '../components/use-element-width';
import { ChartTable } from './chart-table';
import { checkBins, stepPath } from './histogram-shape';
import { LimitHandle } from './limit-handle';
import { linearScale, linearTicks, tickStep, tickText, type Scale } from './scales';

const LEFT = 58;
const RIGHT = 14;
const TOP = 14;
const BOTTOM = 44;

export interface HistogramProps {
  /** Names the chart: 'Separations of A and B'. */
  title: string;
  /** Rising bin edges, one more than counts, in xUnit. */
  edges: readonly number[];
  counts: readonly number[];
  /** A component drawn over the counts, e.g. the expected chance pairs per bin. */
  overlay?: { label: string; values: readonly number[] };
  /** What the bars are, for the legend. */
  countsLabel?: string;
  xLabel: string;
  xUnit?: string;
  yLabel: string;
  /** A limit mark; with `onChange` it can be dragged and moved with the arrow keys. */
  limit?: { value: number; label: string; onChange?: (value: number) => void };
  heightPx?: number;
}

/** Counts per bin with an optional component over them and an optional limit mark. */
export function Histogram(props: HistogramProps) {
  const { title, edges, counts, overlay, xLabel, xUnit, limit, heightPx = 260 } = props;
  checkBins(edges, counts);
  const [ref, measuredPx] = useElementWidth(520);
  const widthPx = Math.max(240, measuredPx);
  const lo = edges[0] ?? 0;
  const hi = edges.at(-1) ?? 1;
  const top = useMemo(() => Math.max(1, ...counts, ...(overlay?.values ?? [])) * 1.05, [counts, overlay]);
  const x = useMemo(() => linearScale(lo, hi, LEFT, widthPx - RIGHT), [lo, hi, widthPx]);
  const y = useMemo(() => linearScale(0, top, heightPx - BOTTOM, TOP), [top, heightPx]);
  const digits = Math.max(0, 1 - Math.floor(Math.log10((hi - lo) / counts.length)));
  const unit = xUnit === undefined ? '' : ` (${xUnit})`;
  return (
    <figure ref={ref} className="grid w-full min-w-0 content-start gap-2">
      <svg
        width={widthPx}
        height={heightPx}
        viewBox={`0 0 ${widthPx} ${heightPx}`}
        role={limit?.onChange === undefined ? 'img' : 'group'}
        aria-label={`${title}: ${formatCount(counts.reduce((sum, n) => sum + n, 0))} counts in ${counts.length} bins`}
        className="block max-w-full bg-raised"
      >
        <Bars {...props} x={x} y={y} widthPx={widthPx} top={top} heightPx={heightPx} />
        {limit !== undefined && (
          <LimitHandle
            {...limit}
            x={x}
            lo={lo}
            hi={hi}
            unit={xUnit ?? ''}
            topPx={TOP}
            basePx={heightPx - BOTTOM}
          />
        )}
      </svg>
      <Legend {...props} />
      <ChartTable
        label={title}
        head={[
          `${xLabel} from${unit}`,
          `to${unit}`,
          props.countsLabel ?? 'Counts',
          ...(overlay ? [overlay.label] : []),
        ]}
        rows={counts.map((count, i) => [
          formatFixed(edges[i] ?? NaN, digits),
          formatFixed(edges[i + 1] ?? NaN, digits),
          count,
          ...(overlay ? [formatFixed(overlay.values[i] ?? NaN, 2)] : []),
        ])}
      />
    </figure>
  );
}

type BarsProps = HistogramProps & { x: Scale; y: Scale; widthPx: number; heightPx: number; top: number };

/** Everything but the limit; not drawn again while that is dragged. */
const Bars = memo(
  function Bars({ edges, counts, overlay, xLabel, xUnit, yLabel, x, y, widthPx, heightPx, top }: BarsProps) {
    const base = heightPx - BOTTOM;
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
              <line x1={LEFT} x2={widthPx - RIGHT} y1={y.at(tick)} y2={y.at(tick)} stroke="var(--rule)" />
              <AxisText x={LEFT - 6} y={y.at(tick) + 4} anchor="end">
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
        <line x1={LEFT} x2={widthPx - RIGHT} y1={base} y2={base} stroke="var(--edge)" />
        {linearTicks(lo, hi, most).map((tick) => (
          <g key={tick}>
            <line x1={x.at(tick)} x2={x.at(tick)} y1={base} y2={base + 5} stroke="var(--edge)" />
            <AxisText x={x.at(tick)} y={base + 18} anchor="middle">
              {tickText(tick, xStep)}
            </AxisText>
          </g>
        ))}
        <AxisText x={(LEFT + widthPx - RIGHT) / 2} y={base + 37} anchor="middle">
          {xUnit === undefined ? xLabel : `${xLabel} (${xUnit})`}
        </AxisText>
        <text
          transform={`translate(12 ${(TOP + base) / 2}) rotate(-90)`}
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

function Legend({ overlay, countsLabel, yLabel }: HistogramProps) {
  if (overlay === undefined) return null;
  return (
    <figcaption className="flex flex-wrap gap-x-5 gap-y-1 text-xs text-muted">
      <span className="inline-flex items-center gap-2">
        <svg width={18} height={12} aria-hidden="true">
          <rect
            x={0.5}
            y={0.5}
            width={17}
            height={11}
            fill="var(--ink)"
            fillOpacity={0.18}
            stroke="var(--ink)"
          />
        </svg>
        {countsLabel ?? yLabel}
      </span>
      <span className="inline-flex items-center gap-2">
        <svg width={24} height={12} aria-hidden="true">
          <line x1={0} x2={24} y1={6} y2={6} stroke="var(--link)" strokeWidth={2} strokeDasharray="6 3" />
        </svg>
        {overlay.label}
      </span>
    </figcaption>
  );
}
