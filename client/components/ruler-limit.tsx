import { useRef, type KeyboardEvent, type PointerEvent } from 'react';
import { formatSepArcsec } from './quantities';
import {
  RULER_MAX_ARCSEC,
  RULER_MIN_ARCSEC,
  RULER_SIDE_PX,
  roundedSep,
  rulerPx,
  rulerSepArcsec,
  steppedSep,
} from './ruler-scale';

/** The plan's limit on the ruler; a slider when it can be changed. */
export function RulerLimit({
  limitArcsec,
  widthPx,
  y,
  onChange,
}: {
  limitArcsec: number;
  widthPx: number;
  y: number;
  onChange?: (limitArcsec: number) => void;
}) {
  const handle = useRef<SVGGElement>(null);
  const x = rulerPx(limitArcsec, widthPx);
  const sign = (
    <>
      <line x1={x} x2={x} y1={2} y2={y + 8} stroke="var(--accent)" strokeWidth={1.5} />
      <path d={`M${x - 4} 1h8l-4 6Z`} fill="var(--accent)" />
    </>
  );
  if (onChange === undefined) return <g aria-hidden="true">{sign}</g>;

  const follow = (event: PointerEvent) => {
    const svg = handle.current?.ownerSVGElement;
    if (!svg || (event.type === 'pointermove' && event.buttons === 0)) return;
    onChange(
      roundedSep(rulerSepArcsec(event.clientX - svg.getBoundingClientRect().left - RULER_SIDE_PX, widthPx)),
    );
  };
  const onKeyDown = (event: KeyboardEvent) => {
    const next = limitAfterKey(event.key, event.shiftKey, limitArcsec);
    if (next === null) return;
    event.preventDefault();
    event.stopPropagation();
    onChange(next);
  };
  return (
    <g
      ref={handle}
      role="slider"
      tabIndex={0}
      aria-label="Limit"
      aria-valuemin={RULER_MIN_ARCSEC}
      aria-valuemax={RULER_MAX_ARCSEC}
      aria-valuenow={limitArcsec}
      aria-valuetext={formatSepArcsec(limitArcsec)}
      onKeyDown={onKeyDown}
      onPointerDown={(event) => {
        event.currentTarget.setPointerCapture(event.pointerId);
        follow(event);
      }}
      onPointerMove={follow}
      className="cursor-ew-resize touch-none"
    >
      <rect x={x - 12} y={0} width={24} height={y + 10} fill="transparent" />
      {sign}
    </g>
  );
}

function limitAfterKey(key: string, fast: boolean, limitArcsec: number): number | null {
  const steps = fast ? 10 : 1;
  if (key === 'ArrowRight' || key === 'ArrowUp') return steppedSep(limitArcsec, steps);
  if (key === 'ArrowLeft' || key === 'ArrowDown') return steppedSep(limitArcsec, -steps);
  if (key === 'PageUp') return steppedSep(limitArcsec, 25);
  if (key === 'PageDown') return steppedSep(limitArcsec, -25);
  if (key === 'Home') return RULER_MIN_ARCSEC;
  if (key === 'End') return RULER_MAX_ARCSEC;
  return null;
}
