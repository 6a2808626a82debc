/**
 * Numbers as people write them in tables. A cell without a value gives null, a cell that is no number gives NaN.
 */
const NO_VALUE = /^(?:|[-–—.]+|nan|null|none|n\/?a|\\n)$/i;
const DECIMAL = /^[+-]?(?:\d+\.?\d*|\.\d+)(?:[eE][+-]?\d{1,3})?$/;
const MINUS_SIGNS = /^[−–‐‑﹣－]/;
/** Up to this many digits the digits are an exact integer, and one division rounds correctly. */
const EXACT_DIGITS = 15;
const POWERS_OF_TEN = [
  1, 1e1, 1e2, 1e3, 1e4, 1e5, 1e6, 1e7, 1e8, 1e9, 1e10, 1e11, 1e12, 1e13, 1e14, 1e15,
] as const;

/** True for cells that say "no value": '', 'NaN', 'null', '-', '--', 'n/a', '...', '\N' and the like. */
export function hasNoValue(cell: string): boolean {
  // No mark that begins with a letter or digit is longer than four signs: names and numbers are told without a pattern.
  if (cell.length > 4 && cell.charCodeAt(0) >= 48 && cell.charCodeAt(0) <= 122) return false;
  return NO_VALUE.test(cell.trim());
}

/**
 * The number in a cell: null when the cell has no value, NaN when it holds something else. Exact: the same double
 * as JavaScript's own reading. With `decimalComma` a comma may stand for the point.
 */
export function readNumber(cell: string, decimalComma: boolean): number | null {
  const quick = readPlainDecimal(cell);
  return quick === quick ? quick : readAnyNumber(cell, decimalComma);
}

/**
 * [sign] digits [. digits] of at most 15 digits, and nothing else; NaN for all other texts. In one pass, several
 * times faster than a check by a pattern and Number().
 */
export function readPlainDecimal(text: string): number {
  const length = text.length;
  const first = text.charCodeAt(0);
  let value = 0;
  let digits = 0;
  let decimals = -1;
  for (let at = first === 45 || first === 43 ? 1 : 0; at < length; at += 1) {
    const digit = text.charCodeAt(at) - 48;
    if (digit >= 0 && digit <= 9) {
      value = value * 10 + digit;
      digits += 1;
      if (decimals >= 0) decimals += 1;
    } else if (digit === -2 && decimals < 0) {
      decimals = 0;
    } else {
      return NaN;
    }
  }
  if (digits === 0 || digits > EXACT_DIGITS) return NaN;
  if (decimals > 0) value /= POWERS_OF_TEN[decimals] ?? NaN;
  return first === 45 ? -value : value;
}

function readAnyNumber(cell: string, decimalComma: boolean): number | null {
  const bare = cell.trim();
  if (NO_VALUE.test(bare)) return null;
  const signed = bare.replace(MINUS_SIGNS, '-');
  const pointed = decimalComma ? signed.replace(',', '.') : signed;
  if (!DECIMAL.test(pointed)) return NaN;
  const value = Number(pointed);
  return Number.isFinite(value) ? value : NaN;
}
