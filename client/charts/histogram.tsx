import { useMemo } from 'react';
import { formatCount, formatFixed } from '../components/quantities';
import { useElementWidth } from '../components/use-element-width';
import { ChartTable } from './chart-table';
import { HistogramBars } from './histogram-bars';
import { checkBins, HISTOGRAM_FRAME, type HistogramProps } from './histogram-shape';
import { LimitHandle } from './limit-handle';
import { linearScale } from './scales';

const { leftPx, rightPx, topPx, bottomPx } = HISTOGRAM_FRAME;

/** Counts per bin with an optional component over them and an optional limit mark. */
export function Histogram(props: HistogramProps) {
  const { title, edges, counts, overlay, xLabel, xUnit, limit, heightPx = 260 } = props;
  checkBins(edges, counts);
  const [ref, measuredPx] = useElementWidth(520);
  const widthPx = Math.max(240, measuredPx);
  const lo = edges[0] ?? 0;
  const hi = edges.at(-1) ?? 1;
  const top = useMemo(() => Math.max(1, ...counts, ...(overlay?.values ?? [])) * 1.05, [counts, overlay]);
  const x = useMemo(() => linearScale(lo, hi, leftPx, widthPx - rightPx), [lo, hi, widthPx]);
  const y = useMemo(() => linearScale(0, top, heightPx - bottomPx, topPx), [top, heightPx]);
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
        <HistogramBars {...props} x={x} y={y} widthPx={widthPx} top={top} heightPx={heightPx} />
        {limit !== undefined && (
          <LimitHandle
            {...limit}
            x={x}
            lo={lo}
            hi={hi}
            unit={xUnit ?? ''}
            topPx={topPx}
            basePx={heightPx - bottomPx}
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
