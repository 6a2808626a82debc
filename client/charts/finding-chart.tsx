import { useId, useMemo } from 'react';
import type { SkyPosition } from '../../shared/astro/sphere';
import { Button } from '../components/button';
import { useElementWidth } from '../components/use-element-width';
import { ChartTable } from './chart-table';
import { drawingOrder, SOURCE_TABLE_HEAD, sourceTableRows, type ChartSource } from './chart-source';
import { Compass, FieldCircle, NeatFrame, ScaleBarMark } from './finding-chart-frame';
import { PairLine, SourceMark } from './finding-chart-marks';
import { motionYears, type SkyView } from './sky-frame';
import { useSkyView } from './use-sky-view';

export type { ChartSource } from './chart-source';

const MOST_PX = 640;

export interface FindingChartProps {
  /** Names the chart: 'Field of A and B'. */
  title: string;
  centre: SkyPosition;
  radiusArcsec: number;
  sources: readonly ChartSource[];
  onChoose?: (source: ChartSource) => void;
  /** A circle around the centre, e.g. the run's radius. */
  circle?: { radiusArcsec: number; label: string };
}

/**
 * The sky around a place: north up, east to the left, one-sigma error ellipses and motions to scale, each source
 * with its catalogue's mark. Buttons, keys (+, −, 0, arrows) and the wheel over the focused chart move the view.
 */
export function FindingChart(props: FindingChartProps) {
  const { title, centre, radiusArcsec, sources, onChoose } = props;
  const [ref, widthPx] = useElementWidth(480);
  const sizePx = Math.max(200, Math.min(MOST_PX, widthPx));
  const hintId = useId();
  const { view, moved, bind, zoomBy, reset } = useSkyView({ centre, radiusArcsec, sizePx });
  const years = useMemo(() => motionYears(sources, radiusArcsec), [sources, radiusArcsec]);
  const rows = useMemo(() => sourceTableRows(sources, centre), [sources, centre]);
  return (
    <figure ref={ref} className="grid w-full min-w-0 content-start gap-2">
      <div
        {...bind}
        role="group"
        tabIndex={0}
        aria-label={title}
        aria-describedby={hintId}
        className="w-fit cursor-grab border border-edge bg-raised select-none active:cursor-grabbing"
        style={{ touchAction: view.zoom > 1 ? 'none' : 'pan-y' }}
      >
        <ChartPicture {...props} view={view} years={years} />
      </div>
      <figcaption className="flex flex-wrap items-center justify-between gap-2" style={{ maxWidth: sizePx }}>
        <span className="text-xs text-muted">
          <span id={hintId}>North up, east left. Keys + − 0 and arrows move the view.</span> Ellipses: 1σ per
          axis.
          {years !== null && ` Arrows: motion in ${years} ${years === 1 ? 'year' : 'years'}.`}
        </span>
        <span className="screen-only flex gap-1">
          <Button size="sm" aria-label="Zoom in" onClick={() => zoomBy(1.5)}>
            +
          </Button>
          <Button size="sm" aria-label="Zoom out" onClick={() => zoomBy(1 / 1.5)}>
            −
          </Button>
          <Button size="sm" disabled={!moved} onClick={reset}>
            Whole field
          </Button>
        </span>
      </figcaption>
      <ChartTable
        label={title}
        head={SOURCE_TABLE_HEAD}
        rows={rows}
        action={
          onChoose === undefined
            ? undefined
            : (index) => {
                const source = sources[index];
                if (source === undefined) return null;
                return (
                  <Button size="sm" aria-label={`Choose ${source.label}`} onClick={() => onChoose(source)}>
                    Choose
                  </Button>
                );
              }
        }
      />
    </figure>
  );
}

function ChartPicture({
  title,
  sources,
  onChoose,
  circle,
  view,
  years,
}: FindingChartProps & { view: SkyView; years: number | null }) {
  const clipId = useId();
  const ordered = useMemo(() => drawingOrder(sources), [sources]);
  const { sizePx } = view;
  return (
    <svg
      width={sizePx}
      height={sizePx}
      viewBox={`0 0 ${sizePx} ${sizePx}`}
      role="img"
      aria-label={`${title}: ${sources.length} ${sources.length === 1 ? 'source' : 'sources'} within ${view.radiusArcsec}″`}
      className="block"
    >
      <clipPath id={clipId}>
        <rect x={9} y={9} width={sizePx - 18} height={sizePx - 18} />
      </clipPath>
      <g clipPath={`url(#${clipId})`}>
        {circle !== undefined && (
          <FieldCircle view={view} radiusArcsec={circle.radiusArcsec} label={circle.label} />
        )}
        <PairLine view={view} sources={ordered} />
        {ordered.map((source) => (
          <SourceMark key={source.id} view={view} source={source} years={years} onChoose={onChoose} />
        ))}
      </g>
      <NeatFrame view={view} />
      <Compass sizePx={sizePx} />
      <ScaleBarMark view={view} />
    </svg>
  );
}
