import { linearTicks } from './scales';
import { pointOfOffset, pxPerArcsec, scaleBar, type SkyView } from './sky-frame';

const INSET_PX = 9;
const BAR_SHARE = 0.3;

/** The map's edge with a tick at every length of the scale bar, counted from the centre of the field. */
export function NeatFrame({ view }: { view: SkyView }) {
  const { sizePx } = view;
  const bar = scaleBar(view, sizePx * BAR_SHARE);
  const half = sizePx / 2 / pxPerArcsec(view);
  const most = Math.max(2, Math.ceil((2 * half) / bar.arcsec));
  const inside = (px: number) => px > INSET_PX && px < sizePx - INSET_PX;
  const xs = linearTicks(view.panEastArcsec - half, view.panEastArcsec + half, most)
    .map((east) => pointOfOffset(view, east, 0).x)
    .filter(inside);
  const ys = linearTicks(view.panNorthArcsec - half, view.panNorthArcsec + half, most)
    .map((north) => pointOfOffset(view, 0, north).y)
    .filter(inside);
  const far = sizePx - INSET_PX;
  const ticks = [
    ...xs.map((x) => `M${x} ${INSET_PX}v-5M${x} ${far}v5`),
    ...ys.map((y) => `M${INSET_PX} ${y}h-5M${far} ${y}h5`),
  ].join('');
  return (
    <g fill="none" stroke="var(--edge)" aria-hidden="true">
      <rect x={INSET_PX} y={INSET_PX} width={far - INSET_PX} height={far - INSET_PX} />
      <path d={ticks} />
    </g>
  );
}

/** North up and east left, in the upper right corner. */
export function Compass({ sizePx }: { sizePx: number }) {
  const x = sizePx - 28;
  const y = 62;
  return (
    <g stroke="var(--ink)" fill="none" strokeWidth={1.25} aria-hidden="true">
      <path d={`M${x} ${y}v-28m-3.5 6l3.5 -6l3.5 6M${x} ${y}h-28m6 -3.5l-6 3.5l6 3.5`} />
      <g stroke="none" fill="var(--ink)" fontSize={12} fontWeight={700} textAnchor="middle">
        <text x={x} y={y - 32}>
          N
        </text>
        <text x={x - 35} y={y + 4}>
          E
        </text>
      </g>
    </g>
  );
}

/** A bar of a round angle, in the lower left corner. */
export function ScaleBarMark({ view }: { view: SkyView }) {
  const bar = scaleBar(view, view.sizePx * BAR_SHARE);
  const x = 24;
  const y = view.sizePx - 26;
  return (
    <g aria-hidden="true">
      <rect x={x - 6} y={y - 20} width={bar.px + 12} height={29} fill="var(--raised)" opacity={0.85} />
      <path d={`M${x} ${y - 4}v8m0 -4h${bar.px}m0 -4v8`} fill="none" stroke="var(--ink)" strokeWidth={1.5} />
      <text x={x + bar.px / 2} y={y - 8} textAnchor="middle" fontSize={12} fill="var(--ink)">
        {bar.text}
      </text>
    </g>
  );
}

/** A dashed circle around the centre of the field, with its name at the lower edge. */
export function FieldCircle({
  view,
  radiusArcsec,
  label,
}: {
  view: SkyView;
  radiusArcsec: number;
  label: string;
}) {
  const centre = pointOfOffset(view, 0, 0);
  const r = radiusArcsec * pxPerArcsec(view);
  return (
    <g aria-hidden="true">
      <circle cx={centre.x} cy={centre.y} r={r} fill="none" stroke="var(--accent)" strokeDasharray="5 4" />
      <text x={centre.x} y={centre.y + r + 14} textAnchor="middle" fontSize={12} fill="var(--accent)">
        {label}
      </text>
    </g>
  );
}
