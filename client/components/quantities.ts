/** How numbers are written on the screen: one rule per quantity, the unit always with it. */

/** A number and its unit stay on one line. */
const NBSP = '\u00a0';

/** A count with groups of three: 12345 -> '12,345'. */
export function formatCount(count: number): string {
  return count.toLocaleString('en-GB', { maximumFractionDigits: 0 });
}

/** 'row' or 'rows' with its count: plural(1, 'row', 'rows') -> '1 row'. */
export function plural(count: number, one: string, many: string): string {
  return `${formatCount(count)} ${count === 1 ? one : many}`;
}

/** Fixed decimals with a real minus sign; a value that rounds to zero has no sign. NaN and infinity give '–'. */
export function formatFixed(value: number, digits: number): string {
  if (!Number.isFinite(value)) return '–';
  const text = value.toFixed(digits);
  return /^-0(\.0*)?$/.test(text) ? text.slice(1) : text.replace('-', '−');
}

/** Separation in arcsec to a tenth of a milliarcsecond below 1″, in arcmin from 1′ on: '0.0312″', '2.318″', '3.42′'. */
export function formatSepArcsec(sepArcsec: number): string {
  if (!Number.isFinite(sepArcsec)) return '–';
  if (sepArcsec >= 3600) return `${formatFixed(sepArcsec / 3600, 3)}°`;
  if (sepArcsec >= 60) return `${formatFixed(sepArcsec / 60, 2)}′`;
  return `${formatFixed(sepArcsec, sepArcsec < 1 ? 4 : 3)}″`;
}

/** An angle in degrees with its sign. */
export function formatAngle(deg: number, digits = 1): string {
  return `${formatFixed(deg, digits)}°`;
}

/** A share 0..1 in percent: '97.3 %'. */
export function formatShare(share: number, digits = 1): string {
  return `${formatFixed(share * 100, digits)}${NBSP}%`;
}

const BYTE_UNITS = ['B', 'kB', 'MB', 'GB', 'TB'] as const;

/** Size of a file in powers of 1000: '13.4 MB'. */
export function formatBytes(bytes: number): string {
  const step = Math.min(BYTE_UNITS.length - 1, bytes < 1000 ? 0 : Math.floor(Math.log10(bytes) / 3));
  return `${formatFixed(bytes / 1000 ** step, step === 0 ? 0 : 1)}${NBSP}${BYTE_UNITS[step] ?? 'B'}`;
}

/** A duration in its two largest units: '48 s', '3 min 20 s', '2 h 5 min'. */
export function formatDuration(seconds: number): string {
  const whole = Math.max(0, Math.round(seconds));
  if (whole < 60) return `${whole} s`;
  if (whole < 3600) return joined(Math.floor(whole / 60), 'min', whole % 60, 's');
  if (whole < 86_400) return joined(Math.floor(whole / 3600), 'h', Math.floor((whole % 3600) / 60), 'min');
  return joined(Math.floor(whole / 86_400), 'd', Math.floor((whole % 86_400) / 3600), 'h');
}

function joined(large: number, largeUnit: string, small: number, smallUnit: string): string {
  return small === 0 ? `${large} ${largeUnit}` : `${large} ${largeUnit} ${small} ${smallUnit}`;
}
