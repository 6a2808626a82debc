import { useRef, type KeyboardEvent, type PointerEvent } from 'react';
import { formatFixed } from '../components/quantities';
import { valueAfterKey } from './limit-keys';
import type { Scale } from './scales';

/** A vertical limit mark on a horizontal scale; a slider when it can be changed. */
export function LimitHandle({
  value,
  label,
  onChange,
  x,
  lo,
  hi,
  unit,
  topPx,
  basePx,
}: {
  value: number;
  label: string;
  onChange?: (value: number) => void;
  x: Scale;
  lo: number;
  hi: number;
  unit: string;
  topPx: number;
  basePx: number;
}) {
  const handle = useRef<SVGGElement>(null);
  const px = x.at(Math.min(hi, Math.max(lo, value)));
  const digits = Math.max(0, 2 - Math.floor(Math.log10(hi - lo)));
  const text = `${label} ${formatFixed(value, digits)}${unit === '' ? '' : ` ${unit}`}`;
  const nearEnd = px > (x.at(lo) + x.at(hi)) / 2;
  const sign = (
    <>
      <line x1={px} x2={px} y1={topPx - 8} y2={basePx + 5} stroke="var(--accent)" strokeWidth={1.5} />
      <path d={`M${px - 5} ${topPx - 10}h10l-5 8Z`} fill="var(--accent)" />
      <text
        x={px + (nearEnd ? -9 : 9)}
        y={topPx}
        textAnchor={nearEnd ? 'end' : 'start'}
        fontSize={12}
        fill="var(--accent)"
        stroke="var(--raised)"
        strokeWidth={4}
        paintOrder="stroke"
      >
        {text}
      </text>
    </>
  );
  if (onChange === undefined) return <g aria-hidden="true">{sign}</g>;
  const follow = (event: PointerEvent) => {
    const svg = handle.current?.ownerSVGElement;
    if (!svg || (event.type === 'pointermove' && event.buttons === 0)) return;
    const at = x.valueAt(event.clientX - svg.getBoundingClientRect().left);
    onChange(Math.min(hi, Math.max(lo, at)));
  };
  const onKeyDown = (event: KeyboardEvent) => {
    const next = valueAfterKey(event.key, event.shiftKey, value, lo, hi);
    if (next === null) return;
    event.preventDefault();
    onChange(next);
  };
  return (
    <g
      ref={handle}
      role="slider"
      tabIndex={0}
      aria-label={label}
      aria-valuemin={lo}
      aria-valuemax={hi}
      aria-valuenow={value}
      aria-valuetext={text}
      onKeyDown={onKeyDown}
      onPointerDown={(event) => {
        event.currentTarget.setPointerCapture(event.pointerId);
        follow(event);
      }}
      onPointerMove={follow}
      className="cursor-ew-resize touch-none"
    >
      <rect x={px - 14} y={topPx - 12} width={28} height={basePx - topPx + 20} fill="transparent" />
      {sign}
    </g>
  );
}
