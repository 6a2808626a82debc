/**
 * Reads one sexagesimal angle in one pass over its characters. Methods handbook, section 14.
 * It knows nothing of RA or Dec: it gives fields and signs, `angles.ts` gives them a meaning.
 */

/** What the first field counts, as far as the text itself tells: 'h' or 'd' marks, or none. */
export type FirstUnit = 'hours' | 'degrees' | 'unmarked';

export type SexagesimalReading =
  | { ok: true; value: number; firstUnit: FirstUnit; fields: number; carried: boolean }
  | { ok: false; reason: string };

export interface NumberOptions {
  /** true: a comma is the decimal sign. */
  decimalComma?: boolean;
}

/** 'minute' and 'second' are the letters m and s, 'prime' and 'double-prime' the marks of arcminutes and arcseconds. */
type Mark = 'hour' | 'degree' | 'minute' | 'second' | 'prime' | 'double-prime' | 'colon';

const MARKS: Readonly<Record<string, Mark>> = {
  ':': 'colon',
  h: 'hour',
  H: 'hour',
  ʰ: 'hour',
  d: 'degree',
  D: 'degree',
  '°': 'degree',
  º: 'degree',
  '˚': 'degree',
  ᵈ: 'degree',
  m: 'minute',
  M: 'minute',
  ᵐ: 'minute',
  s: 'second',
  S: 'second',
  ˢ: 'second',
  "'": 'prime',
  '′': 'prime',
  '’': 'prime',
  '‘': 'prime',
  '´': 'prime',
  '`': 'prime',
  '"': 'double-prime',
  '″': 'double-prime',
  '”': 'double-prime',
  '“': 'double-prime',
};

/** The marks that may close each field. */
const CLOSING: readonly (readonly Mark[])[] = [
  ['hour', 'degree', 'colon'],
  ['minute', 'prime', 'colon'],
  ['second', 'double-prime'],
];

const MINUS_SIGNS = '-−–—‐‑﹣－';
const PLUS_SIGNS = '+＋﹢';

export function isMinus(char: string): boolean {
  return MINUS_SIGNS.includes(char);
}

export function isPlus(char: string): boolean {
  return PLUS_SIGNS.includes(char);
}

export function isBlank(code: number): boolean {
  return code === 32 || code === 9 || code === 0xa0 || code === 0x202f || (code >= 0x2000 && code <= 0x200a);
}

export function isDigit(code: number): boolean {
  return code >= 48 && code <= 57;
}

const refused = (reason: string): SexagesimalReading => ({ ok: false, reason });

/**
 * Reads '12:34:56.7', '-00 12 30', '12h34m56.7s', '-29d00m28.1s', −05°23′28″ and the like: one to three
 * fields, a fraction only in the last, the sign for the whole value. `value` is in units of the first field.
 * Seconds of exactly 60 carry (with the flag); more, or minutes of 60, are refused.
 */
export function readSexagesimal(text: string, options: NumberOptions = {}): SexagesimalReading {
  const end = lengthWithoutTail(text);
  let at = skipBlanks(text, 0);
  const negative = isMinus(text.charAt(at));
  if (at < end && (negative || isPlus(text.charAt(at)))) at = skipBlanks(text, at + 1);

  const fields = [0, 0, 0];
  let count = 0;
  let firstUnit: FirstUnit = 'unmarked';
  let fractionSeen = false;
  while (at < end) {
    if (count === 3) return refused('more than three fields');
    if (fractionSeen) return refused('a fraction is allowed in the last field only');
    const stop = endOfNumber(text, at, options.decimalComma === true);
    if (stop === at) return refused(`a digit is expected at position ${at + 1}`);
    fractionSeen = !isWhole(text, at, stop);
    const value = numberBetween(text, at, stop, fractionSeen);
    if (Number.isNaN(value)) return refused(`'${text.slice(at, stop)}' is not a number`);
    fields[count] = value;

    at = skipBlanks(text, stop);
    if (at < end && !isDigit(text.charCodeAt(at)) && text[at] !== '.') {
      const mark = markAt(text, at);
      if (!mark || !CLOSING[count]?.includes(mark.mark))
        return refused(`'${text.charAt(at)}' does not belong there`);
      if (count === 0 && mark.mark !== 'colon') firstUnit = mark.mark === 'hour' ? 'hours' : 'degrees';
      if (isPrime(mark.mark) && firstUnit === 'hours') return refused('arcminutes or arcseconds after hours');
      at = skipBlanks(text, mark.end);
      if (mark.mark === 'colon' && at >= end) return refused('nothing follows the last colon');
    }
    count += 1;
  }
  return combine(fields, count, negative, firstUnit);
}

function isPrime(mark: Mark): boolean {
  return mark === 'prime' || mark === 'double-prime';
}

function combine(
  fields: number[],
  count: number,
  negative: boolean,
  firstUnit: FirstUnit,
): SexagesimalReading {
  const [first = 0, minutes = 0, seconds = 0] = fields;
  if (count === 0) return refused('there is no number');
  if (minutes >= 60) return refused('minutes must be below 60');
  if (seconds > 60) return refused('seconds must not exceed 60');
  const size = (first * 3600 + minutes * 60 + seconds) / 3600;
  return { ok: true, value: negative ? -size : size, firstUnit, fields: count, carried: seconds === 60 };
}

function lengthWithoutTail(text: string): number {
  let end = text.length;
  while (end > 0 && isBlank(text.charCodeAt(end - 1))) end -= 1;
  return end;
}

function skipBlanks(text: string, from: number): number {
  let at = from;
  while (at < text.length && isBlank(text.charCodeAt(at))) at += 1;
  return at;
}

function endOfNumber(text: string, from: number, decimalComma: boolean): number {
  let at = from;
  let points = 0;
  for (; at < text.length; at += 1) {
    const code = text.charCodeAt(at);
    if (isDigit(code)) continue;
    const isPoint = code === 46 || (decimalComma && code === 44);
    if (!isPoint || points > 0) break;
    points += 1;
  }
  return at;
}

function isWhole(text: string, from: number, to: number): boolean {
  for (let at = from; at < to; at += 1) if (!isDigit(text.charCodeAt(at))) return false;
  return true;
}

/** Whole fields are summed by hand: at a million rows that is several times faster than Number(slice). */
function numberBetween(text: string, from: number, to: number, hasFraction: boolean): number {
  if (hasFraction) {
    const plain = text.slice(from, to).replace(',', '.');
    return plain === '.' ? NaN : Number(plain);
  }
  let value = 0;
  for (let at = from; at < to; at += 1) value = value * 10 + (text.charCodeAt(at) - 48);
  return value;
}

/** The mark at a place and where it ends: two single quotes in a row are arcseconds, 'deg' is a 'd'. */
function markAt(text: string, at: number): { mark: Mark; end: number } | null {
  const mark = MARKS[text.charAt(at)];
  if (!mark) return null;
  if (mark === 'prime' && MARKS[text.charAt(at + 1)] === 'prime')
    return { mark: 'double-prime', end: at + 2 };
  if (mark === 'degree' && /^deg/i.test(text.slice(at, at + 3))) return { mark, end: at + 3 };
  return { mark, end: at + 1 };
}
