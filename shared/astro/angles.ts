/**
 * Right ascensions and declinations as people write them, and back to text. Methods handbook, section 14.
 * A text that can't be read gives a code and a sentence, never an exception.
 */
import { isDigit, isMinus, readSexagesimal, type FirstUnit, type NumberOptions } from './sexagesimal';
import { wrapRaDeg } from './sphere';

export type { NumberOptions } from './sexagesimal';

/** The notations of shared/schemas/mapping.ts. */
export type RaNotation = 'degrees' | 'hours' | 'sexagesimal-hours' | 'sexagesimal-degrees';
export type DecNotation = 'degrees' | 'sexagesimal-degrees';

/** A subset of the reasons for which a row is set aside. */
export type AngleRefusal =
  'no-position' | 'unreadable-number' | 'unreadable-angle' | 'ra-out-of-range' | 'dec-out-of-range';

/** `carried`: a seconds field of exactly 60 was carried into the minutes; worth a warning. */
export type AngleResult =
  { ok: true; deg: number; carried: boolean } | { ok: false; code: AngleRefusal; message: string };

/** Cells that say "no value" in published tables. */
const NO_VALUE = /^(|[-–—.]+|nan|null|none|n\/?a|\\n)$/i;
const DECIMAL = /^[+-]?(\d+\.?\d*|\.\d+)(e[+-]?\d{1,3})?$/i;
const UNIT_SUFFIX = /\s*(°|º|deg|degrees?|d|h|hours?|hr)$/i;
const SHOWN_LENGTH = 40;

/**
 * Reads a right ascension to degrees, 0 <= deg < 360 (360, or 24 h, is 0).
 * Refusals: 'no-position' for an empty cell, 'unreadable-number', 'unreadable-angle', 'ra-out-of-range'.
 * A unit written in the text that contradicts the notation is refused, not guessed at.
 */
export function parseRa(text: string, notation: RaNotation, options?: NumberOptions): AngleResult {
  const degPerUnit = notation === 'hours' || notation === 'sexagesimal-hours' ? 15 : 1;
  const read = readAngle(text, notation, degPerUnit === 15 ? 'hours' : 'degrees', options);
  if (!read.ok) return read;
  const deg = read.deg * degPerUnit;
  if (!(deg >= 0 && deg <= 360))
    return refusal('ra-out-of-range', text, 'a right ascension lies between 0 and 360 degrees (24 h)');
  read.deg = deg === 360 ? 0 : deg + 0;
  return read;
}

/**
 * Reads a declination to degrees, -90 <= deg <= 90. The sign belongs to the whole value: '-00 12 30' is negative.
 * Refusals: as `parseRa`, with 'dec-out-of-range'.
 */
export function parseDec(text: string, notation: DecNotation, options?: NumberOptions): AngleResult {
  const read = readAngle(text, notation, 'degrees', options);
  if (!read.ok) return read;
  if (!(read.deg >= -90 && read.deg <= 90))
    return refusal('dec-out-of-range', text, 'a declination lies between -90 and 90 degrees');
  read.deg += 0;
  return read;
}

/** Reads the value in the unit of the notation; `deg` of the result still is in that unit. */
function readAngle(
  text: string,
  notation: RaNotation,
  unit: 'hours' | 'degrees',
  options: NumberOptions | undefined,
): AngleResult {
  if (notation === 'degrees' || notation === 'hours') {
    if (isPlainDecimal(text)) return { ok: true, deg: Number(text), carried: false };
    return readDecimal(text, unit, options?.decimalComma === true);
  }
  const read = readSexagesimal(text, options);
  if (read.ok) {
    if (read.firstUnit !== 'unmarked' && read.firstUnit !== unit) {
      return refusal(
        'unreadable-angle',
        text,
        `the text says ${read.firstUnit}, the column is read as ${unit}`,
      );
    }
    return { ok: true, deg: read.value, carried: read.carried };
  }
  if (NO_VALUE.test(text.trim())) return refusal('no-position', text, 'the cell has no value');
  return refusal('unreadable-angle', text, read.reason);
}

/** True for [sign] digits [. digits] and nothing else: the common case, decided without a regular expression. */
function isPlainDecimal(text: string): boolean {
  const length = text.length;
  const first = text.charCodeAt(0);
  let at = first === 45 || first === 43 ? 1 : 0;
  let digits = 0;
  let points = 0;
  for (; at < length; at += 1) {
    const code = text.charCodeAt(at);
    if (isDigit(code)) digits += 1;
    else if (code === 46 && points === 0) points = 1;
    else return false;
  }
  return digits > 0;
}

function readDecimal(text: string, unit: 'hours' | 'degrees', decimalComma: boolean): AngleResult {
  const bare = withPlainSigns(text.trim());
  if (NO_VALUE.test(bare)) return refusal('no-position', text, 'the cell has no value');
  const suffix = UNIT_SUFFIX.exec(bare);
  if (suffix && (suffix[1] ?? '').toLowerCase().startsWith('h') !== (unit === 'hours')) {
    return refusal('unreadable-number', text, `its unit is not ${unit}`);
  }
  const number = suffix ? bare.slice(0, suffix.index) : bare;
  const pointed = decimalComma ? number.replace(',', '.') : number;
  if (DECIMAL.test(pointed)) return { ok: true, deg: Number(pointed), carried: false };
  const hint = /\d[:\s]\d/.test(number)
    ? 'it looks sexagesimal, the column is read as decimal'
    : 'it is not a number';
  return refusal('unreadable-number', text, hint);
}

/** Every kind of dash in front of a digit becomes '-', full-width plus becomes '+'. */
function withPlainSigns(text: string): string {
  let plain = '';
  for (const char of text) plain += isMinus(char) ? '-' : char === '＋' ? '+' : char;
  return plain;
}

function refusal(code: AngleRefusal, text: string, reason: string): AngleResult {
  const shown = text.length > SHOWN_LENGTH ? `${text.slice(0, SHOWN_LENGTH)}…` : text;
  return { ok: false, code, message: `“${shown}” can’t be read as an angle: ${reason}.` };
}

/**
 * RA in degrees as 'hh:mm:ss.s' with `digits` decimals (0..9) in the seconds. The whole value is rounded in units
 * of the last digit and then split, so 59.96 s carries; RA wraps, 24 h is 00 h. Throws RangeError for what is not finite.
 */
export function formatRa(raDeg: number, digits: number): string {
  const scale = scaleOf(digits);
  const ticks = Math.round((wrapRaDeg(checkFinite('raDeg', raDeg)) / 15) * 3600 * scale);
  return splitTicks(ticks % (86400 * scale), scale, digits);
}

/**
 * Dec in degrees as '+dd:mm:ss.s' with `digits` decimals (0..9) in the seconds, rounded with carry.
 * A value that rounds to zero is written with '+'. Throws RangeError for what is not finite.
 */
export function formatDec(decDeg: number, digits: number): string {
  const scale = scaleOf(digits);
  const ticks = Math.round(Math.abs(checkFinite('decDeg', decDeg)) * 3600 * scale);
  return `${decDeg < 0 && ticks > 0 ? '-' : '+'}${splitTicks(ticks, scale, digits)}`;
}

function scaleOf(digits: number): number {
  if (!Number.isInteger(digits) || digits < 0 || digits > 9) {
    throw new RangeError(`digits must be an integer 0..9, not ${digits}`);
  }
  return 10 ** digits;
}

function checkFinite(name: string, value: number): number {
  if (!Number.isFinite(value)) throw new RangeError(`${name} must be finite, not ${value}`);
  return value;
}

function splitTicks(ticks: number, scale: number, digits: number): string {
  const wholeSeconds = Math.floor(ticks / scale);
  const two = (value: number) => String(value).padStart(2, '0');
  const hms = [Math.floor(wholeSeconds / 3600), Math.floor(wholeSeconds / 60) % 60, wholeSeconds % 60].map(
    two,
  );
  const fraction = digits > 0 ? `.${String(ticks - wholeSeconds * scale).padStart(digits, '0')}` : '';
  return hms.join(':') + fraction;
}

/**
 * Splits a cell that holds RA and Dec, e.g. '12 34 56.7 -01 02 03', '188.73 -1.034', '12h30m49s12d23m28s'.
 * Cuts at the sign of Dec; else at a comma, semicolon or bar; else after the seconds of RA; else in the middle of
 * 2, 4 or 6 fields. Null when no such place exists. The parts are not checked: give them to `parseRa` and `parseDec`.
 */
export function splitCombinedPosition(text: string, options?: NumberOptions): [string, string] | null {
  const whole = text.trim();
  const separators = options?.decimalComma ? /[;|]/ : /[,;|]/;
  const parts = whole.split(separators);
  if (parts.length > 2) return null;
  if (parts.length === 2) return bothFilled(parts[0] ?? '', parts[1] ?? '');
  const atSign = innerSignAt(whole);
  if (atSign > 0) return bothFilled(whole.slice(0, atSign), whole.slice(atSign));
  const glued = /^(.*?\d\s*(?:s|ˢ|″|"|''))\s*(\d.*)$/.exec(whole);
  if (glued) return bothFilled(glued[1] ?? '', glued[2] ?? '');
  const fields = whole.split(/[\s:]+/);
  if (fields.length !== 2 && fields.length !== 4 && fields.length !== 6) return null;
  const half = fields.length / 2;
  return [fields.slice(0, half).join(' '), fields.slice(half).join(' ')];
}

function bothFilled(first: string, second: string): [string, string] | null {
  const [ra, dec] = [first.trim(), second.trim()];
  return ra && dec ? [ra, dec] : null;
}

/** Index of the one sign that stands inside the text and is not of an exponent; -1 for none or several. */
function innerSignAt(text: string): number {
  let found = -1;
  for (let at = 1; at < text.length; at += 1) {
    const char = text.charAt(at);
    if (!isMinus(char) && char !== '+' && char !== '＋') continue;
    if (/[eE]/.test(text.charAt(at - 1)) && /\d/.test(text.charAt(at - 2))) continue;
    if (found >= 0) return -1;
    found = at;
  }
  return found;
}

const FRAME_WORDS = /^(?:J2000(?:\.0)?|ICRS)\s*[:,]?\s+|\s*[,(]?\s*\b(?:J2000(?:\.0)?|ICRS)\)?$/gi;
/** What may stand in a position: digits, signs, separators and unit marks, and never another letter. */
const POSITION_SIGNS = /^[\d\s:.,;|+\-−–—hHdDmMsSegEGʰᵐˢᵈ°º˚'′’‘´`"″”“]+$/;

/**
 * Reads a position as typed into the find field: degrees ('187.70 12.39', '187.70, +12.39') or sexagesimal
 * ('12:30:49.4 +12:23:28', '12 30 49.4 +12 23 28', '12h30m49.4s+12d23m28s', with or without blanks).
 * Null for everything else, above all names: 'J123456.7-123456' is a designation, not a position.
 */
export function parsePosition(text: string): { raDeg: number; decDeg: number } | null {
  const bare = text.trim().replace(FRAME_WORDS, '').trim();
  if (!POSITION_SIGNS.test(bare)) return null;
  const split = splitCombinedPosition(bare);
  if (!split) return null;
  const [raText, decText] = split;
  const raShape = readSexagesimal(raText);
  const decShape = readSexagesimal(decText);
  const notation = notationOfPair(raShape.ok ? raShape : null, decShape.ok ? decShape : null);
  if (!notation || !/[\s,;|:hd°]/i.test(bare)) return null;
  const ra = parseRa(raText, notation.ra);
  const dec = parseDec(decText, notation.dec);
  return ra.ok && dec.ok ? { raDeg: ra.deg, decDeg: dec.deg } : null;
}

interface Shape {
  firstUnit: FirstUnit;
  fields: number;
}

/** RA of several fields without a mark is in hours; one bare field on either side is a pair of degrees. */
function notationOfPair(ra: Shape | null, dec: Shape | null): { ra: RaNotation; dec: DecNotation } | null {
  if (!ra || !dec || dec.firstUnit === 'hours') return null;
  const raIsBare = ra.fields === 1 && ra.firstUnit === 'unmarked';
  if (raIsBare) return dec.fields === 1 ? { ra: 'sexagesimal-degrees', dec: 'sexagesimal-degrees' } : null;
  return {
    ra: ra.firstUnit === 'degrees' ? 'sexagesimal-degrees' : 'sexagesimal-hours',
    dec: 'sexagesimal-degrees',
  };
}
