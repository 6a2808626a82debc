import type { ColumnMapping } from '../../shared/schemas/mapping';
import { hasNoValue } from './number-text';
import { shownCell } from './shown-text';
import type { Refusal, Step, TableShape } from './understand';
import { checkColumns, inColumn } from './understand-position';

const MAX_NAME_LENGTH = 200;
const CONTROL = /[\u0000-\u001f\u007f-\u009f]/;

/**
 * All names in the mapped columns of a row, each once, in the order of the mapping. Blanks around a name and cells
 * without a value are dropped. The same names that the reader of `compileMapping` gives.
 */
export function namesInCells(mapping: Pick<ColumnMapping, 'names'>, cells: readonly string[]): string[] {
  const names: string[] = [];
  collectNames(mapping.names, cells, names);
  return names;
}

function collectNames(mapped: ColumnMapping['names'], cells: readonly string[], names: string[]): void {
  for (const { column, separator } of mapped) {
    const cell = cells[column] ?? '';
    if (cell === '') continue;
    if (separator === null || !cell.includes(separator)) addName(cell, names);
    else for (const part of cell.split(separator)) addName(part, names);
  }
}

function addName(text: string, names: string[]): void {
  const name = text.trim();
  if (!hasNoValue(name) && !names.includes(name)) names.push(name);
}

/**
 * The step that reads names and key. The key is the text in the key column, else the first name, else the number of the row.
 */
export function compileNames(mapping: ColumnMapping, shape: TableShape): Step {
  const { keyColumn, names: mapped } = mapping;
  checkColumns([keyColumn, ...mapped.map(({ column }) => column)], shape);
  return (cells, rowNumber, out) => {
    out.names.length = 0;
    collectNames(mapped, cells, out.names);
    for (const name of out.names) {
      const refusal = isGoodName(name) ? null : badName(name, columnOfName(name, mapped, cells), shape);
      if (refusal !== null) return refusal;
    }
    const [first] = out.names;
    out.key = keyColumn === null ? (first ?? String(rowNumber)) : (cells[keyColumn] ?? '').trim();
    if (keyColumn === null || (isGoodName(out.key) && !hasNoValue(out.key))) return null;
    if (!hasNoValue(out.key)) return badName(out.key, keyColumn, shape);
    return {
      code: 'no-key',
      column: keyColumn,
      message: `${inColumn(keyColumn, shape)}: the row has no key of its own.`,
    };
  };
}

function columnOfName(name: string, mapped: ColumnMapping['names'], cells: readonly string[]): number | null {
  return mapped.find(({ column }) => cells[column]?.includes(name))?.column ?? null;
}

function isGoodName(name: string): boolean {
  return name.length <= MAX_NAME_LENGTH && !CONTROL.test(name);
}

function badName(name: string, column: number | null, shape: TableShape): Refusal {
  const long = name.length > MAX_NAME_LENGTH;
  const reason = long ? `is longer than ${MAX_NAME_LENGTH} characters` : 'holds a control character';
  const place = column === null ? '' : `${inColumn(column, shape)}: `;
  return {
    code: long ? 'name-too-long' : 'control-character',
    column,
    message: `${place}“${shownCell(name)}” ${reason}.`,
  };
}
