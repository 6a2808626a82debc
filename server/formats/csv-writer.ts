const NEEDS_QUOTES = /[",\r\n]/;
/** A spreadsheet runs what begins so, also after blanks; the full-width signs work in some of them. */
const FORMULA = /^(?:[\t\r]|\s*[=+\-@＝＋－＠])/;
/** A number, or an angle in up to three fields: nothing that runs, and its sign must stay where it is. */
const SIGNED_VALUE =
  /^\s*[+-]\d+(?:[ :]\d{1,2}){0,2}(?:\.\d*)?(?:[eE][+-]?\d+)?\s*$|^\s*[+-]\.\d+(?:[eE][+-]?\d+)?\s*$/;
const DASHES = /^-+$/;

/**
 * One line of a CSV file (RFC 4180, ended by CR LF). Null and numbers that are not finite become empty cells.
 * Text that a spreadsheet would run as a formula gets an apostrophe in front; numbers and angles stay as they are.
 */
export function csvLine(values: readonly (string | number | null)[]): string {
  let line = '';
  for (let i = 0; i < values.length; i += 1) {
    if (i > 0) line += ',';
    const value = values[i] ?? null;
    if (typeof value === 'string') line += textCell(value);
    else if (value !== null && Number.isFinite(value)) line += String(value);
  }
  return `${line}\r\n`;
}

function textCell(text: string): string {
  const safe = FORMULA.test(text) && !SIGNED_VALUE.test(text) && !DASHES.test(text) ? `'${text}` : text;
  return NEEDS_QUOTES.test(safe) ? `"${safe.replaceAll('"', '""')}"` : safe;
}
