import { formatDec, formatRa } from '../../shared/astro/angles';
import { tangentOffset, type SkyPosition } from '../../shared/astro/sphere';
import { formatFixed } from '../components/quantities';
import { secondsDigits } from '../components/seconds-digits';

/** A source as the finding chart draws it. */
export interface ChartSource {
  id: number | string;
  /** Designation, for labels and the table. */
  label: string;
  /** Label of the catalogue, for the table. */
  catalogue?: string;
  /** Order of arrival of the catalogue: gives shape and hue. */
  ordinal: number;
  raDeg: number;
  decDeg: number;
  /** One sigma along the axes of the error ellipse; null when not stated. */
  errMajArcsec: number | null;
  errMinArcsec: number | null;
  /** Major axis, degrees east of north. */
  errPaDeg: number | null;
  /** Proper motion in RA times cos Dec, and in Dec. */
  pmRaMasYr?: number | null;
  pmDecMasYr?: number | null;
  /** 'a' and 'b': the pair in question; 'member': of the object; 'neighbour': anything else around. */
  emphasis?: 'a' | 'b' | 'member' | 'neighbour';
}

export const SOURCE_TABLE_HEAD = [
  'Source',
  'Catalogue',
  'RA',
  'Dec',
  'East (″)',
  'North (″)',
  'Error (″)',
] as const;

/** The rows of the table behind the chart, in the order of the sources. */
export function sourceTableRows(sources: readonly ChartSource[], centre: SkyPosition): string[][] {
  return sources.map((source) => {
    const offset = tangentOffset(source, centre);
    const digits = secondsDigits(source.errMajArcsec);
    return [
      source.emphasis === 'a' || source.emphasis === 'b'
        ? `${source.emphasis.toUpperCase()}: ${source.label}`
        : source.label,
      source.catalogue ?? '',
      formatRa(source.raDeg, digits + 1),
      formatDec(source.decDeg, digits),
      offset === null ? '' : formatFixed(offset.xiArcsec, 3),
      offset === null ? '' : formatFixed(offset.etaArcsec, 3),
      source.errMajArcsec === null ? '' : formatFixed(source.errMajArcsec, 4),
    ];
  });
}

/** Drawing order: what matters is drawn last and lies on top. */
export function drawingOrder(sources: readonly ChartSource[]): ChartSource[] {
  const rank = (source: ChartSource) =>
    source.emphasis === 'b' ? 3 : source.emphasis === 'a' ? 2 : source.emphasis === 'member' ? 1 : 0;
  return [...sources].sort((one, other) => rank(one) - rank(other));
}
