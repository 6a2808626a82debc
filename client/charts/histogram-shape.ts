import type { Scale } from './scales';

/** Room around the plot for axes and their words, px. */
export const HISTOGRAM_FRAME = { leftPx: 58, rightPx: 14, topPx: 14, bottomPx: 44 } as const;

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

/** Refuses what cannot be drawn: edges must rise and be one more than the counts. */
export function checkBins(edges: readonly number[], counts: readonly number[]): void {
  if (edges.length !== counts.length + 1) {
    throw new RangeError(`${counts.length} counts need ${counts.length + 1} edges, not ${edges.length}`);
  }
  for (let i = 1; i < edges.length; i++) {
    if (!((edges[i] ?? NaN) > (edges[i - 1] ?? NaN))) throw new RangeError(`edges must rise, at index ${i}`);
  }
}

/** Outline of the bins as one stepped path; closed along the base line when `base` is given. */
export function stepPath(
  edges: readonly number[],
  values: readonly number[],
  x: Scale,
  y: Scale,
  base: number | null,
): string {
  const at = (edge: number | undefined) => round(x.at(edge ?? NaN));
  const steps = values.map((value, i) => `V${round(y.at(value))}H${at(edges[i + 1])}`).join('');
  const start =
    base === null ? `M${at(edges[0])} ${round(y.at(values[0] ?? 0))}` : `M${at(edges[0])} ${round(base)}`;
  return base === null ? start + steps : `${start}${steps}V${round(base)}Z`;
}

function round(px: number): number {
  return Math.round(px * 10) / 10;
}

/** Sum of the values of all bins that end at or before `limit`, plus the share of the bin that it cuts. */
export function sumBelow(edges: readonly number[], values: readonly number[], limit: number): number {
  let sum = 0;
  values.forEach((value, i) => {
    const lo = edges[i] ?? NaN;
    const hi = edges[i + 1] ?? NaN;
    sum += value * Math.min(1, Math.max(0, (limit - lo) / (hi - lo)));
  });
  return sum;
}
