import { formatCount } from '../components/quantities';
import { classOpacity } from './coverage-classes';
import type { GraticuleLine } from './sky-graticule';

/** The numbers of meridians or parallels. */
export function GraticuleNumbers({
  lines,
  whole,
  edge,
}: {
  lines: readonly GraticuleLine[];
  whole: boolean;
  edge: 'bottom' | 'left';
}) {
  const side = edge === 'left' && !whole;
  return (
    <g fontSize={11} fill="var(--muted)" aria-hidden="true">
      {lines.map(({ text, at }) =>
        at === null ? null : (
          <text
            key={text}
            x={side ? at.x - 4 : at.x}
            y={edge === 'bottom' && !whole ? at.y + 14 : at.y}
            dy={edge === 'bottom' && !whole ? 0 : 4}
            textAnchor={side ? 'end' : 'middle'}
            {...(whole
              ? { stroke: 'var(--raised)', strokeWidth: 5, strokeLinejoin: 'round', paintOrder: 'stroke' }
              : {})}
          >
            {text}
          </text>
        ),
      )}
    </g>
  );
}

/** What the shades mean. */
export function CoverageLegend({ bounds, colour }: { bounds: readonly number[]; colour: string }) {
  return (
    <span className="flex flex-wrap gap-x-4 gap-y-1">
      {bounds.map((bound, index) => {
        const next = bounds[index + 1];
        const text =
          next === undefined
            ? `${formatCount(bound)} or more`
            : next - 1 === bound
              ? formatCount(bound)
              : `${formatCount(bound)} to ${formatCount(next - 1)}`;
        return (
          <span key={bound} className="inline-flex items-center gap-1.5">
            <svg width={14} height={14} aria-hidden="true">
              <rect width={14} height={14} fill="var(--raised)" />
              <rect
                x={0.5}
                y={0.5}
                width={13}
                height={13}
                fill={colour}
                fillOpacity={classOpacity(index, bounds.length)}
                stroke="var(--edge)"
              />
            </svg>
            {text}
          </span>
        );
      })}
    </span>
  );
}
