import {
  parseDec,
  parseRa,
  splitCombinedPosition,
  type AngleResult,
  type NumberOptions,
} from '../../shared/astro/angles';
import type { ColumnMapping } from '../../shared/schemas/mapping';
import { hasNoValue, readPlainDecimal } from './number-text';
import { columnTitle, shownCell, storableText } from './shown-text';
import type { Refusal, Step, TableShape } from './understand';

type Position = ColumnMapping['position'];
type Unread = Extract<AngleResult, { ok: false }>;
type ReadAngle = (text: string) => number | Unread;

const MAX_MESSAGE_LENGTH = 400;
/** A right ascension and a declination in one cell are shorter, however they are written. */
export const MAX_COMBINED_LENGTH = 100;

/** The step that reads RA and Dec, both in degrees, RA 0 <= ra < 360. */
export function compilePosition(position: Position, shape: TableShape): Step {
  const options: NumberOptions = { decimalComma: shape.decimalComma };
  const readRa = raReader(position.raNotation, options);
  const readDec = decReader(position.decNotation, options);
  if (position.kind === 'one-column') return oneColumn(position.column, readRa, readDec, shape, options);
  const { raColumn, decColumn } = position;
  checkColumns([raColumn, decColumn], shape);
  return (cells, _rowNumber, out) => {
    const ra = readRa(cells[raColumn] ?? '');
    if (typeof ra !== 'number') return refusal(ra, raColumn, shape);
    const dec = readDec(cells[decColumn] ?? '');
    if (typeof dec !== 'number') return refusal(dec, decColumn, shape);
    out.raDeg = ra;
    out.decDeg = dec;
    return null;
  };
}

function oneColumn(
  column: number,
  readRa: ReadAngle,
  readDec: ReadAngle,
  shape: TableShape,
  options: NumberOptions,
): Step {
  checkColumns([column], shape);
  return (cells, _rowNumber, out) => {
    const text = cells[column] ?? '';
    if (hasNoValue(text)) {
      return { code: 'no-position', column, message: `${inColumn(column, shape)}: the cell has no value.` };
    }
    const parts = text.length > MAX_COMBINED_LENGTH ? null : splitCombinedPosition(text, options);
    if (parts === null) {
      const message = `${inColumn(column, shape)}: “${shownCell(text)}” can’t be cut into a right ascension and a declination.`;
      return { code: 'unreadable-angle', column, message };
    }
    const ra = readRa(parts[0]);
    if (typeof ra !== 'number') return refusal(ra, column, shape);
    const dec = readDec(parts[1]);
    if (typeof dec !== 'number') return refusal(dec, column, shape);
    out.raDeg = ra;
    out.decDeg = dec;
    return null;
  };
}

function raReader(notation: Position['raNotation'], options: NumberOptions): ReadAngle {
  const parse: ReadAngle = (text) => {
    const read = parseRa(text, notation, options);
    return read.ok ? read.deg : read;
  };
  if (notation !== 'degrees') return parse;
  // Plain decimals, nearly all cells of nearly all files, are read without an object per cell.
  return (text) => {
    const deg = readPlainDecimal(text);
    return deg >= 0 && deg < 360 ? deg + 0 : parse(text);
  };
}

function decReader(notation: Position['decNotation'], options: NumberOptions): ReadAngle {
  const parse: ReadAngle = (text) => {
    const read = parseDec(text, notation, options);
    return read.ok ? read.deg : read;
  };
  if (notation !== 'degrees') return parse;
  return (text) => {
    const deg = readPlainDecimal(text);
    return deg >= -90 && deg <= 90 ? deg + 0 : parse(text);
  };
}

/** Throws RangeError for a column that the table does not have. */
export function checkColumns(columns: readonly (number | null)[], shape: TableShape): void {
  for (const column of columns) {
    if (column !== null && !(column >= 0 && column < shape.columnNames.length)) {
      throw new RangeError(`column must be 0..${shape.columnNames.length - 1}, not ${column}`);
    }
  }
}

/** 'Column “Vmag”', the beginning of a message. */
export function inColumn(column: number, shape: TableShape): string {
  return `Column “${columnTitle(shape.columnNames[column], column)}”`;
}

function refusal(read: Unread, column: number, shape: TableShape): Refusal {
  return {
    code: read.code,
    column,
    message: storableText(`${inColumn(column, shape)}: ${read.message}`, MAX_MESSAGE_LENGTH),
  };
}
