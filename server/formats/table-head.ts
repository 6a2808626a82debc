import type { TextDialect } from '../../shared/schemas/mapping';
import { guessLayout, mostFrequent } from './dialect';
import { emptyFile, type FileHead } from './file-head';
import { readHeader } from './header-words';
import { readNumber } from './number-text';
import { RecordReader, type RowBatch } from './records';
import { storableText } from './shown-text';
import { UnreadableFile } from './unreadable-file';

const MAX_ROWS = 5000;
const MAX_COLUMNS = 2000;
const BLOCK_LINES = 500;
const MAX_NAME_LENGTH = 200;

/** The first rows of a table. */
export interface TableHead {
  dialect: TextDialect;
  /** One name for each column; '' for a column that has none. */
  names: string[];
  /** At most 5,000 rows, refused ones among them. */
  batch: RowBatch;
  /** True when these are all rows of the file. */
  whole: boolean;
}

/** Reads the first rows of a table. Throws UnreadableFile when there are none, or too many columns. */
export function readTableHead(head: FileHead, known: Partial<TextDialect>): TableHead {
  const { compression, encoding, lines } = head;
  const dialect: TextDialect = { compression, encoding, ...guessLayout(lines, known) };
  const { batch, header, whole } = firstRows(head, dialect);
  if (header === null && batch.lines.length === 0)
    throw emptyFile('The file holds nothing but comments and blank lines.');
  if (batch.lines.length === 0) {
    throw new UnreadableFile(
      'file-header-only',
      'The file holds a header and no rows.',
      'Upload a table with one row for each source.',
    );
  }
  const names = columnNames(header ?? commentHeader(lines, dialect, batch), batch);
  if (names.length > MAX_COLUMNS) {
    throw new UnreadableFile(
      'file-too-many-columns',
      `The table has ${names.length} columns; at most ${MAX_COLUMNS} can be kept.`,
      'Leave out the columns that are not needed, or check the separator.',
    );
  }
  return { dialect, names: names.map((name) => storableText(name.trim(), MAX_NAME_LENGTH)), batch, whole };
}

function firstRows(
  { lines, whole }: FileHead,
  dialect: TextDialect,
): { batch: RowBatch; header: string[] | null; whole: boolean } {
  const reader = new RecordReader(dialect);
  let at = 0;
  for (; at < lines.length && reader.size <= MAX_ROWS; at += BLOCK_LINES) {
    reader.push({ firstLine: at + 1, lines: lines.slice(at, at + BLOCK_LINES), quotes: true });
  }
  const seenAll = whole && at >= lines.length;
  // A quoted cell that is open where the looking ends may be closed further on.
  if (seenAll) reader.end();
  const batch = reader.take();
  const cut: RowBatch = {
    firstRow: batch.firstRow,
    lines: batch.lines.slice(0, MAX_ROWS),
    raws: batch.raws.slice(0, MAX_ROWS),
    cells: batch.cells.slice(0, MAX_ROWS),
  };
  return { batch: cut, header: reader.header, whole: seenAll && batch.lines.length <= MAX_ROWS };
}

/** Fits the header to the rows: an unnamed last column, or an unnamed first column of row names. */
function columnNames(header: readonly string[] | null, batch: RowBatch): string[] {
  const rows = batch.cells.filter((row) => row !== null);
  const width = mostFrequent(rows.map((row) => row.length));
  const lastIsEmpty = rows.every((row) => row.length < width || (row[width - 1] ?? '').trim() === '');
  if (header === null) return new Array<string>(lastIsEmpty && width > 1 ? width - 1 : width).fill('');
  if (header.length === width - 1 && !lastIsEmpty) return ['', ...header];
  const trailing =
    header.length > 1 && (header.at(-1) ?? '').trim() === '' && header.length >= width && lastIsEmpty;
  return trailing ? header.slice(0, -1) : [...header];
}

/** A header written as a comment, '# name ra dec': the last comment before the rows that fits them in width and words. */
function commentHeader(lines: readonly string[], dialect: TextDialect, batch: RowBatch): string[] | null {
  const { commentPrefix } = dialect;
  if (commentPrefix === null) return null;
  const firstRow = (batch.lines[0] ?? 1) - 1;
  const width = mostFrequent(batch.cells.map((row) => row?.length ?? 0));
  for (const line of lines.slice(0, firstRow).reverse()) {
    if (!line.startsWith(commentPrefix)) continue;
    const text = line.slice(commentPrefix.length).replace(/^[#/%\- ]+/, '');
    const reader = new RecordReader({ ...dialect, header: true, commentPrefix: null });
    reader.push({ firstLine: 1, lines: [text], quotes: true });
    const cells = reader.header;
    if (
      cells === null ||
      cells.length !== width ||
      cells.some((cell) => (readNumber(cell, true) ?? NaN) >= 0)
    )
      continue;
    if (cells.some((cell) => readHeader(cell).role !== null)) return cells;
  }
  return null;
}
