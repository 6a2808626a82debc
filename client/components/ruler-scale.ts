import { logScale } from '../charts/scales';
import { formatSepArcsec } from './quantities';

/** The one scale of the recurring ruler: 0.01″ to 10′, logarithmic, the same wherever it appears. */
export const RULER_MIN_ARCSEC = 0.01;
export const RULER_MAX_ARCSEC = 600;
/** Room beside the scale for marks and numbers at its ends. */
export const RULER_SIDE_PX = 14;

export const RULER_LABELS: readonly { sepArcsec: number; text: string }[] = [
  { sepArcsec: 0.01, text: '0.01″' },
  { sepArcsec: 0.1, text: '0.1″' },
  { sepArcsec: 1, text: '1″' },
  { sepArcsec: 10, text: '10″' },
  { sepArcsec: 60, text: '1′' },
  { sepArcsec: 600, text: '10′' },
];

/** Unlabelled ticks: 2..9 times each power of ten up to 10″, then 2..9 times ten up to 60″ and whole arcminutes. */
export const RULER_TICKS: readonly number[] = [
  ...[0.01, 0.1, 1].flatMap((decade) => [2, 3, 4, 5, 6, 7, 8, 9].map((n) => n * decade)),
  20,
  30,
  40,
  50,
  ...[2, 3, 4, 5, 6, 7, 8, 9].map((minutes) => minutes * 60),
];

export interface RulerMark {
  sepArcsec: number;
  /** One sigma, arcsec: drawn as a bar. */
  errArcsec?: number | null;
  /** What the mark is, for the text equivalent: a catalogue or a designation. */
  label?: string;
  /** Ordinal of the catalogue: gives the mark its stamp's hue. */
  ordinal?: number;
  emphasis?: boolean;
}

/** Place of a separation on a ruler of `widthPx`, 0..widthPx; values beyond an end stand at that end. */
export function rulerPx(sepArcsec: number, widthPx: number): number {
  const inside = Math.min(RULER_MAX_ARCSEC, Math.max(RULER_MIN_ARCSEC, sepArcsec));
  return logScale(RULER_MIN_ARCSEC, RULER_MAX_ARCSEC, 0, widthPx).at(inside);
}

/** Separation (arcsec) at a place of the ruler; places beyond an end give that end. */
export function rulerSepArcsec(px: number, widthPx: number): number {
  const inside = Math.min(widthPx, Math.max(0, px));
  return logScale(RULER_MIN_ARCSEC, RULER_MAX_ARCSEC, 0, widthPx).valueAt(inside);
}

/** A chosen limit rounded to three significant digits: finer steps could not be aimed at. */
export function roundedSep(sepArcsec: number): number {
  const inside = Math.min(RULER_MAX_ARCSEC, Math.max(RULER_MIN_ARCSEC, sepArcsec));
  return Number(inside.toPrecision(3));
}

/** The limit moved by `steps` of a hundredth of a decade, as an arrow key does. */
export function steppedSep(sepArcsec: number, steps: number): number {
  return roundedSep(sepArcsec * 10 ** (steps / 100));
}

/** The ruler in words. */
export function rulerText(marks: readonly RulerMark[], limitArcsec: number | null): string {
  const parts = marks.map((mark) => {
    const error = mark.errArcsec ? ` ± ${formatSepArcsec(mark.errArcsec)}` : '';
    return `${mark.label === undefined ? '' : `${mark.label} `}${formatSepArcsec(mark.sepArcsec)}${error}`;
  });
  const limit = limitArcsec === null ? [] : [`limit ${formatSepArcsec(limitArcsec)}`];
  return [...(parts.length === 0 ? ['no separation'] : parts), ...limit].join('; ');
}
