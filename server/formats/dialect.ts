import { parseDec, parseRa, splitCombinedPosition } from '../../shared/astro/angles';
import { readSexagesimal } from '../../shared/astro/sexagesimal';
import type { TextDialect } from '../../shared/schemas/mapping';
import { readHeader } from './header-words';
import { hasNoValue, readNumber } from './number-text';
import { RecordReader } from './records';

/** The parts of a dialect that are told by the text; compression and encoding are told by the bytes. */
export type TextLayout = Omit<TextDialect, 'compression' | 'encoding'>;
type Row = string[] | null;

const DELIMITERS: readonly TextDialect['delimiter'][] = ['\t', ';', '|', ',', 'spaces'];
const COMMENT_PREFIXES = ['#', '//', '%', '--'] as const;
const SAMPLE_ROWS = 200;
const SAMPLE_LENGTH = 512 * 1024;
/** No number and no angle is longer. */
const MAX_VALUE_LENGTH = 60;
const COMMENT_LOOK_LINES = 1000;
/** Rows that agree on the number of cells before a sign is taken for the delimiter. */
const MIN_AGREEMENT = 0.6;
const GOOD_AGREEMENT = 0.95;
/** Of the rows, so many may break the rules of quoting before the quotes are taken for plain text. */
const MAX_BROKEN_QUOTING = 0.1;

/** Guesses how a text is laid out from its first lines; what is known already is kept. */
export function guessLayout(lines: readonly string[], known: Partial<TextDialect>): TextLayout {
  const commentPrefix = known.commentPrefix === undefined ? guessCommentPrefix(lines) : known.commentPrefix;
  const { delimiter, quoted, rows } = guessDelimiter(lines, commentPrefix, known);
  return {
    delimiter,
    quoted,
    commentPrefix,
    header: known.header ?? looksLikeHeader(rows),
    decimalComma: known.decimalComma ?? (delimiter !== ',' && hasDecimalComma(rows)),
  };
}

function guessCommentPrefix(lines: readonly string[]): string | null {
  const filled = lines.filter((line) => line.trim() !== '').slice(0, COMMENT_LOOK_LINES);
  for (const prefix of COMMENT_PREFIXES) {
    const isComment = (line: string) => line.startsWith(prefix) && !isDashCell(prefix, line);
    const leading = filled.findIndex((line) => !isComment(line));
    if (leading > 0) return prefix;
    // Between the rows, only a sign that begins no number and no missing value is taken for a comment.
    const inside = prefix === '#' || prefix === '//' ? filled.filter(isComment).length : 0;
    if (inside > 0 && inside <= 0.2 * filled.length) return prefix;
  }
  return filled.length > 0 && filled.every((line) => line.startsWith('#')) && !filled.some(hasSeparator)
    ? '#'
    : null;
}

/** '--' may be a missing value in the first cell, or two signs of a number. */
function isDashCell(prefix: string, line: string): boolean {
  return prefix === '--' && !/^--+\s*[A-Za-z(*]|^-+$/.test(line);
}

function hasSeparator(line: string): boolean {
  return /[\t;|,]/.test(line);
}

interface Candidate {
  delimiter: TextDialect['delimiter'];
  quoted: boolean;
  rows: Row[];
}

interface Score {
  /** Cells in most rows, and the share of rows that have so many. */
  width: number;
  agreement: number;
  /** Larger is better. */
  rank: number;
}

function guessDelimiter(
  lines: readonly string[],
  commentPrefix: string | null,
  known: Partial<TextDialect>,
): Candidate {
  const tried = (known.delimiter === undefined ? DELIMITERS : [known.delimiter]).map((delimiter) =>
    readCandidate(lines, delimiter, commentPrefix, known.quoted),
  );
  const [only] = tried;
  if (known.delimiter !== undefined && only !== undefined) return only;
  const scored = tried
    .map((candidate) => ({ candidate, score: scoreOf(candidate) }))
    .filter(({ candidate, score }) => isPossible(candidate, score));
  const visible = scored.filter(({ candidate }) => candidate.delimiter !== 'spaces');
  const best = (visible.length > 0 ? visible : scored).sort((a, b) => b.score.rank - a.score.rank)[0]
    ?.candidate;
  if (best === undefined || (best.delimiter === 'spaces' && isPositionPerLine(best.rows))) {
    return readCandidate(lines, ',', commentPrefix, known.quoted);
  }
  return best;
}

/** Blanks also stand inside of names: they separate cells only when the first row has several, too. */
function isPossible({ delimiter, rows }: Candidate, { width, agreement }: Score): boolean {
  const firstWidth = rows[0]?.length ?? 0;
  return width > 1 && agreement >= MIN_AGREEMENT && (delimiter !== 'spaces' || firstWidth > 1);
}

function readCandidate(
  lines: readonly string[],
  delimiter: TextDialect['delimiter'],
  commentPrefix: string | null,
  quoted: boolean | undefined,
): Candidate {
  const withQuotes = sampleRows(lines, delimiter, commentPrefix, quoted ?? true);
  const broken = withQuotes.filter((row) => row === null).length;
  if (quoted !== undefined || broken <= MAX_BROKEN_QUOTING * withQuotes.length) {
    return { delimiter, quoted: quoted ?? true, rows: withQuotes };
  }
  return { delimiter, quoted: false, rows: sampleRows(lines, delimiter, commentPrefix, false) };
}

function sampleRows(
  lines: readonly string[],
  delimiter: TextDialect['delimiter'],
  commentPrefix: string | null,
  quoted: boolean,
): Row[] {
  const reader = new RecordReader({
    compression: 'none',
    encoding: 'utf-8',
    delimiter,
    quoted,
    header: false,
    commentPrefix,
    decimalComma: false,
  });
  let length = 0;
  for (let i = 0; i < lines.length && reader.size < SAMPLE_ROWS && length < SAMPLE_LENGTH; i += 1) {
    const line = lines[i] ?? '';
    length += line.length;
    reader.push({ firstLine: i + 1, lines: [line], quotes: true });
  }
  return reader.take().cells.slice(0, SAMPLE_ROWS);
}

/** How well a delimiter fits: rows of equal width, the first of them too, and cells that are numbers or angles. */
function scoreOf({ rows }: Candidate): Score {
  const widths = rows.map((row) => (row === null ? 0 : widthOf(row)));
  const width = mostFrequent(widths);
  const agreement = rows.length === 0 ? 0 : widths.filter((other) => other === width).length / rows.length;
  const cells = rows.slice(1).flatMap((row) => row ?? []);
  const filled = cells.filter((cell) => !hasNoValue(cell));
  const values = filled.filter(isValue).length / Math.max(1, filled.length);
  const rank = (agreement >= GOOD_AGREEMENT ? 4 : 2 * agreement) + (widths[0] === width ? 2 : 0) + values;
  return { width, agreement, rank };
}

/** Cells of a row; an empty one after the last delimiter doesn't count. */
function widthOf(row: readonly string[]): number {
  return row.length > 1 && (row.at(-1) ?? '').trim() === '' ? row.length - 1 : row.length;
}

/** The most frequent of some numbers, the larger of equals; 0 for none. */
export function mostFrequent(numbers: readonly number[]): number {
  const counts = new Map<number, number>();
  for (const number of numbers) counts.set(number, (counts.get(number) ?? 0) + 1);
  return [...counts].sort((a, b) => b[1] - a[1] || b[0] - a[0])[0]?.[0] ?? 0;
}

/** True for a number, with point or comma, or a sexagesimal angle. */
function isValue(cell: string): boolean {
  if (cell.length > MAX_VALUE_LENGTH) return false;
  if (!Number.isNaN(readNumber(cell, true) ?? NaN)) return true;
  const angle = readSexagesimal(cell, { decimalComma: true });
  return angle.ok && angle.fields > 1;
}

/** Lines like '12 34 56.7 -01 02 03' are one cell each, although blanks cut them into six. */
function isPositionPerLine(rows: readonly Row[]): boolean {
  const texts = rows.flatMap((row) => (row !== null && row.length === 6 ? [row.join(' ')] : []));
  const positions = texts.filter((text) => {
    const [ra, dec] = splitCombinedPosition(text) ?? ['', ''];
    return parseRa(ra, 'sexagesimal-hours').ok && parseDec(dec, 'sexagesimal-degrees').ok;
  });
  return positions.length > 0 && positions.length >= GOOD_AGREEMENT * (rows.length - 1);
}

/**
 * The first row is a header when nothing in it is a value and something below is, or has digits all the way down; or
 * when it has words that tables of sources use.
 */
function looksLikeHeader(rows: readonly Row[]): boolean {
  const [first, ...rest] = rows;
  if (first === undefined || first === null) return first === null;
  const filled = first.filter((cell) => !hasNoValue(cell));
  if (filled.length === 0) return false;
  const known = filled.filter((cell) => readHeader(cell).role !== null).length;
  if (filled.some(isValue)) return known >= 2 && known > filled.length / 2;
  if (known > 0 || rest.length === 0) return true;
  return first.some((cell, index) => {
    const below = rest.flatMap((row) =>
      row === null || hasNoValue(row[index] ?? '') ? [] : [row[index] ?? ''],
    );
    if (below.some(isValue)) return true;
    return below.length > 1 && !/\d/.test(cell) && below.every((value) => /\d/.test(value));
  });
}

/** Some cells have a comma before their last digits, and none has a point there. */
function hasDecimalComma(rows: readonly Row[]): boolean {
  let commas = 0;
  let points = 0;
  for (const cell of rows.flatMap((row) => row ?? [])) {
    if (cell.length > MAX_VALUE_LENGTH) continue;
    if (/^\s*[+\-−–]?[\d :]*\d,\d+\s*$/.test(cell)) commas += 1;
    else if (/^\s*[+\-−–]?[\d :]*\d\.\d+\s*$/.test(cell)) points += 1;
  }
  return commas > 0 && points === 0;
}
