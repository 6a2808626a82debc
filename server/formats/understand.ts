import type {
  ColumnMapping,
  SetAsideCode,
  SetAsideRow,
  TextDialect,
  UnderstoodRow,
} from '../../shared/schemas/mapping';
import { columnTitle, MAX_RAW_LENGTH, storableText } from './shown-text';
import { compileMeasurements } from './understand-measurements';
import { compileNames } from './understand-names';
import { compilePosition } from './understand-position';

export { namesInCells } from './understand-names';

const MAX_CELL_LENGTH = 10_000;

/** Why a row is refused, and the index of the column that says so; null when it is the row as a whole. */
export interface Refusal {
  code: SetAsideCode;
  column: number | null;
  message: string;
}

/** One step of reading a row: fills its part of `out`, or says why the row is refused. */
export type Step = (cells: readonly string[], rowNumber: number, out: UnderstoodRow) => Refusal | null;

/** What the steps need to know of the table. */
export interface TableShape {
  columnNames: readonly string[];
  decimalComma: boolean;
}

export interface RowReader {
  /** A row to read into; `read` overwrites all of it, so one is enough for a whole file. */
  newRow(): UnderstoodRow;
  /**
   * Reads one row of a RowBatch into `out` and gives null; or gives the refusal, and `out` is meaningless.
   * `rowNumber` is the key of a row that has neither key column nor name. A single empty cell beyond the last column
   * is removed from `cells`.
   */
  read(
    cells: string[] | null,
    raw: string,
    line: number,
    rowNumber: number,
    out: UnderstoodRow,
  ): SetAsideRow | null;
}

/**
 * Compiles a mapping into a reader of rows. `columns` are all columns of the table, in order; a mapping that names
 * a column beyond them throws RangeError. Units of what is read: see `UnderstoodRow`.
 */
export function compileMapping(
  mapping: ColumnMapping,
  columns: readonly { name: string }[],
  dialect: Pick<TextDialect, 'decimalComma'>,
): RowReader {
  const shape: TableShape = {
    columnNames: columns.map(({ name }) => name),
    decimalComma: dialect.decimalComma,
  };
  const steps: Step[] = [
    compilePosition(mapping.position, shape),
    compileNames(mapping, shape),
    ...compileMeasurements(mapping, shape),
  ];
  return {
    newRow: () => emptyRow(mapping),
    read(cells, raw, line, rowNumber, out) {
      if (cells === null) return setAside(BAD_QUOTING, line, raw, shape);
      let refusal = checkCells(cells, raw, shape);
      out.line = line;
      for (let i = 0; i < steps.length && refusal === null; i += 1) {
        refusal = steps[i]?.(cells, rowNumber, out) ?? null;
      }
      return refusal && setAside(refusal, line, raw, shape);
    },
  };
}

const BAD_QUOTING: Refusal = {
  code: 'bad-quoting',
  column: null,
  message: 'A quoted cell is not closed, or text follows its closing quote.',
};

/** Checks that come before any meaning: number of the cells, signs that can't be stored, length. */
function checkCells(cells: string[], raw: string, { columnNames }: TableShape): Refusal | null {
  const width = columnNames.length;
  if (cells.length === width + 1 && (cells[width] ?? '').trim() === '') cells.pop();
  if (cells.length !== width) {
    const has = cells.length === 1 ? '1 cell' : `${cells.length} cells`;
    const message = `The row has ${has}, the table has ${width === 1 ? '1 column' : `${width} columns`}.`;
    return { code: cells.length < width ? 'too-few-cells' : 'too-many-cells', column: null, message };
  }
  // U+0000 can't be stored in the database, U+001F separates the cells of a stored row.
  if (raw.includes('\0') || raw.includes('\u001f')) {
    const column = cells.findIndex((cell) => cell.includes('\0') || cell.includes('\u001f'));
    const message = `Column “${columnTitle(columnNames[column], column)}”: the cell holds a control character.`;
    return { code: 'control-character', column, message };
  }
  if (raw.length <= MAX_CELL_LENGTH) return null;
  const column = cells.findIndex((cell) => cell.length > MAX_CELL_LENGTH);
  if (column < 0) return null;
  const message = `Column “${columnTitle(columnNames[column], column)}”: the cell is longer than ${MAX_CELL_LENGTH} characters.`;
  return { code: 'cell-too-long', column, message };
}

function setAside(
  { code, column, message }: Refusal,
  line: number,
  raw: string,
  shape: TableShape,
): SetAsideRow {
  const title = column === null ? null : columnTitle(shape.columnNames[column], column);
  return { line, column: title, code, message, raw: storableText(raw, MAX_RAW_LENGTH) };
}

function emptyRow(mapping: ColumnMapping): UnderstoodRow {
  return {
    line: 0,
    key: '',
    names: [],
    raDeg: NaN,
    decDeg: NaN,
    errMajArcsec: null,
    errMinArcsec: null,
    errPaDeg: null,
    pmRaMasYr: null,
    pmDecMasYr: null,
    photometry: mapping.photometry.map(({ band }) => ({ band, value: null, error: null })),
    redshift: null,
  };
}
