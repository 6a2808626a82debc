import { parse } from 'csv-parse/sync';
import type { TextDialect } from '../../shared/schemas/mapping';
import type { LineBlock } from './lines';

/** Rows as parallel arrays; the row at index i has the number `firstRow + i`. */
export interface RowBatch {
  /** Number of the first row, counted from 1 over all data rows (comments, blank lines and header not counted). */
  firstRow: number;
  /** Line of the file in which each row begins, counted from 1. */
  lines: number[];
  /** Each row as written, without its line end. */
  raws: string[];
  /** The cells of each row; null when its quoting is broken. */
  cells: (string[] | null)[];
}

/** A quoted cell may run over lines, but not without end: a forgotten quote must not swallow the file. */
const MAX_RECORD_LINES = 1000;
const MAX_RECORD_LENGTH = 1024 * 1024;
const QUOTE = 34;
const BLANKS = /[ \t]+/;
const BLANK_SEPARATED = /"((?:[^"]|"")*)"(?=[ \t]|$)|([^" \t][^ \t]*)|(\S+)/g;

interface OpenRecord {
  line: number;
  lines: string[];
  length: number;
}

/**
 * Makes rows of lines. A line without a quote is split at the delimiter; rows with a quote go through csv-parse.
 * A line that breaks the rules of quoting becomes a row without cells, and reading goes on with the next line.
 * Line breaks inside quoted cells are kept as LF.
 */
export class RecordReader {
  /** Cells of the header, once it has been read. */
  header: string[] | null = null;
  private readonly dialect: TextDialect;
  private headerAwaited: boolean;
  private open: OpenRecord | null = null;
  private rowsGiven = 0;
  private batch: RowBatch = emptyBatch(1);
  /** Indexes in the batch of the records that wait for csv-parse. */
  private quotedAt: number[] = [];

  constructor(dialect: TextDialect) {
    this.dialect = dialect;
    this.headerAwaited = dialect.header;
  }

  /** Rows that wait to be taken. */
  get size(): number {
    return this.batch.lines.length;
  }

  push(block: LineBlock): void {
    const { lines, firstLine } = block;
    if ((block.quotes && this.dialect.quoted) || this.open !== null) {
      lines.forEach((line, i) => this.pushLine(line, firstLine + i));
      return;
    }
    const { delimiter, commentPrefix } = this.dialect;
    for (let i = 0; i < lines.length; i += 1) {
      const line = lines[i] ?? '';
      if (!isNoRow(line, commentPrefix)) this.add(firstLine + i, line, splitPlain(line, delimiter));
    }
  }

  /** Ends the file: a quoted cell that is still open is broken. */
  end(): void {
    while (this.open !== null) this.giveUpOpen(null);
  }

  /** The rows read since the last call. */
  take(): RowBatch {
    const taken = this.batch;
    if (this.quotedAt.length > 0) {
      const texts = this.quotedAt.map((index) => taken.raws[index] ?? '');
      const cells = parseQuoted(texts, this.dialect);
      this.quotedAt.forEach((index, i) => {
        taken.cells[index] = cells[i] ?? null;
      });
      this.quotedAt = [];
    }
    this.rowsGiven += taken.lines.length;
    this.batch = emptyBatch(this.rowsGiven + 1);
    return taken;
  }

  private pushLine(line: string, number: number): void {
    if (this.open === null) {
      this.startRecord(line, number);
      return;
    }
    const state = quoteState(line, this.dialect.delimiter, true);
    if (state === 'broken') {
      this.giveUpOpen(line);
      return;
    }
    this.open.lines.push(line);
    this.open.length += line.length + 1;
    if (state === 'closed') {
      const { line: first, lines } = this.open;
      this.open = null;
      this.addQuoted(first, lines.join('\n'));
    } else if (this.open.lines.length > MAX_RECORD_LINES || this.open.length > MAX_RECORD_LENGTH) {
      this.giveUpOpen(null);
    }
  }

  private startRecord(line: string, number: number): void {
    const { delimiter, commentPrefix } = this.dialect;
    if (isNoRow(line, commentPrefix)) return;
    if (delimiter === 'spaces') {
      this.add(number, line, splitAtBlanks(line));
      return;
    }
    if (!line.includes('"')) {
      this.add(number, line, line.split(delimiter));
      return;
    }
    const state = quoteState(line, delimiter, false);
    if (state === 'closed') this.addQuoted(number, line);
    else if (state === 'broken') this.add(number, line, null);
    else this.open = { line: number, lines: [line], length: line.length };
  }

  /** The first line of the open record is broken; the lines after it are read again as rows of their own. */
  private giveUpOpen(next: string | null): void {
    const given = this.open;
    if (given === null) return;
    this.open = null;
    this.add(given.line, given.lines[0] ?? '', null);
    const again = next === null ? given.lines.slice(1) : [...given.lines.slice(1), next];
    again.forEach((line, i) => this.pushLine(line, given.line + 1 + i));
  }

  private addQuoted(line: number, raw: string): void {
    if (this.headerAwaited) {
      this.add(line, raw, parseQuoted([raw], this.dialect)[0] ?? null);
      return;
    }
    this.quotedAt.push(this.size);
    this.add(line, raw, null);
  }

  private add(line: number, raw: string, cells: string[] | null): void {
    if (this.headerAwaited) {
      this.headerAwaited = false;
      this.header = cells ?? splitPlain(raw, this.dialect.delimiter);
      return;
    }
    this.batch.lines.push(line);
    this.batch.raws.push(raw);
    this.batch.cells.push(cells);
  }
}

function emptyBatch(firstRow: number): RowBatch {
  return { firstRow, lines: [], raws: [], cells: [] };
}

function isNoRow(line: string, commentPrefix: string | null): boolean {
  if (commentPrefix !== null && line.startsWith(commentPrefix)) return true;
  // Only a line that begins with a blank can be blank: most lines are done after one comparison.
  return !(line.charCodeAt(0) > 32) && line.trim() === '';
}

function splitPlain(line: string, delimiter: TextDialect['delimiter']): string[] {
  return delimiter === 'spaces' ? line.trim().split(BLANKS) : line.split(delimiter);
}

/** Whether a line ends outside of quotes, inside, or can't be: text after a closing quote. */
function quoteState(line: string, delimiter: string, startsInside: boolean): 'closed' | 'open' | 'broken' {
  let inside = startsInside;
  let at = 0;
  for (;;) {
    if (!inside) {
      if (line.charCodeAt(at) !== QUOTE) {
        const next = line.indexOf(delimiter, at);
        if (next < 0) return 'closed';
        at = next + 1;
        continue;
      }
      inside = true;
      at += 1;
    }
    const end = line.indexOf('"', at);
    if (end < 0) return 'open';
    if (line.charCodeAt(end + 1) === QUOTE) {
      at = end + 2;
    } else if (end + 1 === line.length) {
      return 'closed';
    } else if (line.startsWith(delimiter, end + 1)) {
      inside = false;
      at = end + 2;
    } else {
      return 'broken';
    }
  }
}

/** Cells of records whose quoting is known to be right. */
function parseQuoted(records: readonly string[], dialect: TextDialect): string[][] {
  const rows: string[][] = parse(`${records.join('\n')}\n`, {
    delimiter: dialect.delimiter,
    record_delimiter: '\n',
    relax_quotes: true,
    relax_column_count: true,
  });
  if (rows.length !== records.length) {
    throw new Error(`csv-parse found ${rows.length} records where ${records.length} were given`);
  }
  return rows;
}

/** Cells separated by runs of blanks, each as it is or in double quotes; null when a quote is not closed. */
function splitAtBlanks(line: string): string[] | null {
  const cells: string[] = [];
  for (const match of line.matchAll(BLANK_SEPARATED)) {
    const [, quoted, bare, broken] = match;
    if (broken !== undefined) return null;
    cells.push(quoted === undefined ? (bare ?? '') : quoted.replaceAll('""', '"'));
  }
  return cells;
}
