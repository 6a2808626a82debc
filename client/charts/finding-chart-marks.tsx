import { memo } from 'react';
import { stampOf, stampPath } from '../components/stamp-rule';
import type { ChartSource } from './chart-source';
import { ellipsePx, pointOfPosition, pxPerArcsec, type Point, type SkyView } from './sky-frame';

/** Below this an ellipse would only be a blot on its own mark. */
const LEAST_ELLIPSE_PX = 2;

/** One source: error ellipse, motion arrow, the mark of its catalogue, and pointers for the pair in question. */
export const SourceMark = memo(function SourceMark({
  view,
  source,
  years,
  onChoose,
}: {
  view: SkyView;
  source: ChartSource;
  years: number | null;
  onChoose?: (source: ChartSource) => void;
}) {
  const at = pointOfPosition(view, source);
  if (at === null || isFarOutside(at, view.sizePx)) return null;
  const { shape, hue } = stampOf(source.ordinal);
  const inPair = source.emphasis === 'a' || source.emphasis === 'b';
  const solid = inPair || source.emphasis === 'member';
  const line = `var(--stamp-${hue}-line)`;
  return (
    <g
      onClick={onChoose === undefined ? undefined : () => onChoose(source)}
      className={onChoose === undefined ? undefined : 'cursor-pointer'}
    >
      <title>{source.catalogue === undefined ? source.label : `${source.catalogue}: ${source.label}`}</title>
      <ErrorEllipse view={view} source={source} at={at} colour={line} />
      <MotionArrow view={view} source={source} at={at} years={years} />
      <path
        d={stampPath(shape, inPair ? 6 : solid ? 5 : 4)}
        transform={`translate(${at.x} ${at.y})`}
        fill={solid ? `var(--stamp-${hue})` : 'var(--raised)'}
        stroke={solid ? 'var(--stamp-edge)' : line}
        strokeWidth={solid ? 1 : 1.5}
      />
      {onChoose !== undefined && <circle cx={at.x} cy={at.y} r={12} fill="transparent" />}
      {inPair && <Pointer at={at} letter={source.emphasis === 'a' ? 'A' : 'B'} />}
    </g>
  );
});

function isFarOutside(at: Point, sizePx: number): boolean {
  return at.x < -sizePx || at.x > 2 * sizePx || at.y < -sizePx || at.y > 2 * sizePx;
}

function ErrorEllipse({
  view,
  source,
  at,
  colour,
}: {
  view: SkyView;
  source: ChartSource;
  at: Point;
  colour: string;
}) {
  const ellipse = ellipsePx(view, source.errMajArcsec, source.errMinArcsec, source.errPaDeg);
  if (ellipse === null || ellipse.rx < LEAST_ELLIPSE_PX) return null;
  return (
    <ellipse
      cx={at.x}
      cy={at.y}
      rx={ellipse.rx}
      ry={ellipse.ry}
      transform={`rotate(${ellipse.rotateDeg} ${at.x} ${at.y})`}
      fill={colour}
      fillOpacity={0.08}
      stroke={colour}
      strokeWidth={1}
    />
  );
}

function MotionArrow({
  view,
  source,
  at,
  years,
}: {
  view: SkyView;
  source: ChartSource;
  at: Point;
  years: number | null;
}) {
  if (years === null) return null;
  const perYear = (pxPerArcsec(view) * years) / 1000;
  const dx = -(source.pmRaMasYr ?? 0) * perYear;
  const dy = -(source.pmDecMasYr ?? 0) * perYear;
  const length = Math.hypot(dx, dy);
  if (length < 3) return null;
  const turnDeg = (Math.atan2(dy, dx) * 180) / Math.PI;
  return (
    <path
      d={`M0 0H${length}M${length - 5} -3L${length} 0L${length - 5} 3`}
      transform={`translate(${at.x} ${at.y}) rotate(${turnDeg})`}
      fill="none"
      stroke="var(--ink)"
      strokeWidth={1.25}
    />
  );
}

/** Two short strokes that end beside the mark, as on printed finding charts, and the letter of the side. */
function Pointer({ at, letter }: { at: Point; letter: 'A' | 'B' }) {
  const side = letter === 'A' ? 1 : -1;
  return (
    <g stroke="var(--accent)" strokeWidth={2} fill="none" aria-hidden="true">
      <path d={`M${at.x + side * 11} ${at.y}h${side * 13}M${at.x} ${at.y - side * 11}v${-side * 13}`} />
      <text
        x={at.x + side * 20}
        y={at.y - side * 16}
        stroke="var(--raised)"
        strokeWidth={4}
        paintOrder="stroke"
        fill="var(--accent)"
        fontSize={13}
        fontWeight={700}
        textAnchor="middle"
        dominantBaseline="central"
      >
        {letter}
      </text>
    </g>
  );
}

/** The line between the pair in question. */
export function PairLine({ view, sources }: { view: SkyView; sources: readonly ChartSource[] }) {
  const a = sources.find((source) => source.emphasis === 'a');
  const b = sources.find((source) => source.emphasis === 'b');
  if (a === undefined || b === undefined) return null;
  const from = pointOfPosition(view, a);
  const to = pointOfPosition(view, b);
  if (from === null || to === null) return null;
  return (
    <line
      x1={from.x}
      y1={from.y}
      x2={to.x}
      y2={to.y}
      stroke="var(--accent)"
      strokeWidth={1}
      strokeDasharray="2 3"
      aria-hidden="true"
    />
  );
}
