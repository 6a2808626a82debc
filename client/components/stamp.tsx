import { stampLetters, stampOf, stampPath } from './stamp-rule';

/** The sign of a catalogue, the same in every table, chart and chip. */
export function Stamp({
  catalogue,
  withLabel = false,
  size = 22,
}: {
  catalogue: { label: string; ordinal: number };
  /** Writes the label beside the sign. */
  withLabel?: boolean;
  /** Height in px. */
  size?: number;
}) {
  const { shape, hue } = stampOf(catalogue.ordinal);
  const sign = (
    <svg
      viewBox="-14 -14 28 28"
      width={size}
      height={size}
      className="inline-block shrink-0 align-[-0.4em]"
      {...(withLabel
        ? { 'aria-hidden': true }
        : { role: 'img', 'aria-label': `catalogue ${catalogue.label}` })}
    >
      {!withLabel && <title>{catalogue.label}</title>}
      <path
        d={stampPath(shape, 10.6)}
        fill={`var(--stamp-${hue})`}
        stroke="var(--stamp-edge)"
        strokeWidth={1}
      />
      <text
        y={0.5}
        textAnchor="middle"
        dominantBaseline="central"
        fill={`var(--stamp-${hue}-ink)`}
        fontSize={shape === 'diamond' ? 10 : 11}
        fontWeight={700}
      >
        {stampLetters(catalogue.label)}
      </text>
    </svg>
  );
  if (!withLabel) return sign;
  return (
    <span className="inline-flex items-center gap-1.5 whitespace-nowrap">
      {sign}
      {catalogue.label}
    </span>
  );
}
