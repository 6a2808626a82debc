import { RulerLimit } from './ruler-limit';
import {
  RULER_LABELS,
  RULER_MAX_ARCSEC,
  RULER_MIN_ARCSEC,
  RULER_SIDE_PX,
  RULER_TICKS,
  rulerPx,
  rulerText,
  type RulerMark,
} from './ruler-scale';
import { stampOf } from './stamp-rule';
import { useElementWidth } from './use-element-width';

interface RulerProps {
  marks: readonly RulerMark[];
  /** The plan's limit. */
  limitArcsec?: number | null;
  /** Makes the limit a handle: called while it is dragged and for each arrow key. */
  onLimitChange?: (limitArcsec: number) => void;
  /** Without numbers, for table rows. */
  compact?: boolean;
  /** What is measured, before the text equivalent: 'Separation'. */
  label?: string;
}

/** Separations on the scale that is the same everywhere: 0.01″ to 10′, with error bars and the limit as a mark. */
export function Ruler({
  marks,
  limitArcsec = null,
  onLimitChange,
  compact = false,
  label = 'Separation',
}: RulerProps) {
  const [ref, fullPx] = useElementWidth(compact ? 160 : 480);
  const widthPx = Math.max(60, fullPx - 2 * RULER_SIDE_PX);
  const lineY = compact ? 15 : 22;
  const heightPx = compact ? 24 : 48;
  const text = `${label}: ${rulerText(marks, limitArcsec)}`;
  return (
    <div ref={ref} className={compact ? 'w-full min-w-30' : 'w-full'}>
      <svg
        width={fullPx}
        height={heightPx}
        viewBox={`${-RULER_SIDE_PX} 0 ${fullPx} ${heightPx}`}
        role={onLimitChange === undefined ? 'img' : 'group'}
        aria-label={text}
        className="block max-w-full"
      >
        {!compact && <title>{text}</title>}
        <RulerLine widthPx={widthPx} y={lineY} numbers={!compact} />
        {marks.map((mark, index) => (
          <Mark key={index} mark={mark} widthPx={widthPx} y={lineY} />
        ))}
        {limitArcsec !== null && (
          <RulerLimit limitArcsec={limitArcsec} widthPx={widthPx} y={lineY} onChange={onLimitChange} />
        )}
      </svg>
    </div>
  );
}

function RulerLine({ widthPx, y, numbers }: { widthPx: number; y: number; numbers: boolean }) {
  const labels = widthPx < 260 ? RULER_LABELS.filter((_, i) => i !== 4) : RULER_LABELS;
  return (
    <g aria-hidden="true">
      <line x1={0} x2={widthPx} y1={y} y2={y} stroke="var(--edge)" />
      {RULER_TICKS.map((sep) => (
        <line
          key={sep}
          x1={rulerPx(sep, widthPx)}
          x2={rulerPx(sep, widthPx)}
          y1={y}
          y2={y + 3}
          stroke="var(--edge)"
          strokeWidth={0.75}
        />
      ))}
      {RULER_LABELS.map(({ sepArcsec }) => (
        <line
          key={sepArcsec}
          x1={rulerPx(sepArcsec, widthPx)}
          x2={rulerPx(sepArcsec, widthPx)}
          y1={y}
          y2={y + 6}
          stroke="var(--muted)"
        />
      ))}
      {numbers &&
        labels.map(({ sepArcsec, text }) => (
          <text
            key={text}
            x={rulerPx(sepArcsec, widthPx)}
            y={y + 20}
            textAnchor={
              sepArcsec === RULER_MIN_ARCSEC ? 'start' : sepArcsec === RULER_MAX_ARCSEC ? 'end' : 'middle'
            }
            dx={
              sepArcsec === RULER_MIN_ARCSEC
                ? -RULER_SIDE_PX
                : sepArcsec === RULER_MAX_ARCSEC
                  ? RULER_SIDE_PX
                  : 0
            }
            fontSize={12}
            fill="var(--muted)"
          >
            {text}
          </text>
        ))}
    </g>
  );
}

function Mark({ mark, widthPx, y }: { mark: RulerMark; widthPx: number; y: number }) {
  const { sepArcsec, errArcsec, ordinal, emphasis = false } = mark;
  if (!(sepArcsec >= 0)) return null;
  const x = rulerPx(sepArcsec, widthPx);
  const colour = ordinal === undefined ? 'var(--ink)' : `var(--stamp-${stampOf(ordinal).hue}-line)`;
  const low = errArcsec ? rulerPx(Math.max(0, sepArcsec - errArcsec), widthPx) : x;
  const high = errArcsec ? rulerPx(sepArcsec + errArcsec, widthPx) : x;
  const beyond = sepArcsec < RULER_MIN_ARCSEC ? -1 : sepArcsec > RULER_MAX_ARCSEC ? 1 : 0;
  return (
    <g stroke={colour} aria-hidden="true">
      {high > low && <path d={`M${low} ${y - 8}v4m0 -2H${high}m0 -2v4`} fill="none" strokeWidth={1.25} />}
      <line x1={x} x2={x} y1={y - (emphasis ? 13 : 10)} y2={y} strokeWidth={emphasis ? 3 : 2} />
      {beyond !== 0 && (
        <path
          d={`M${x} ${y - 7}h${beyond * 9}m${-beyond * 4} -3l${beyond * 4} 3l${-beyond * 4} 3`}
          fill="none"
          strokeWidth={1.5}
        />
      )}
    </g>
  );
}
