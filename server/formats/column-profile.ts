import { readSexagesimal } from '../../shared/astro/sexagesimal';
import type { FileColumn } from '../../shared/schemas/mapping';
import { hasNoValue, readNumber } from './number-text';
import { storableText } from './shown-text';

/** Of a column of numbers or angles, so large a share must be readable; the rest may be slips of the pen. */
const KIND_SHARE = 0.9;
const MAX_EXAMPLES = 5;
export const MAX_EXAMPLE_LENGTH = 200;
/** Sexagesimal angles are read for the first so many values only: they serve to tell the notation. */
const MAX_ANGLES = 1000;

/** What the values of a column look like, in the rows that were looked at. */
export interface ColumnProfile {
  index: number;
  name: string;
  kind: FileColumn['kind'];
  /** Cells that hold a value, as written, without the blanks around it. */
  values: string[];
  /** Rows that were looked at. */
  rows: number;
  /** Values of a column of kind 'number', in the order of the file. */
  numbers: number[];
  /** Values of a column of kind 'sexagesimal' in units of the first field; `degrees`: some are marked as degrees. */
  angles: { values: number[]; degrees: boolean };
  /** Share of the values that occur once. */
  distinctShare: number;
}

/** Looks at one column of rows that all have the same number of cells. */
export function profileColumn(
  rows: readonly (readonly string[])[],
  index: number,
  name: string,
  decimalComma: boolean,
): ColumnProfile {
  const values: string[] = [];
  for (const row of rows) {
    const cell = row[index] ?? '';
    if (!hasNoValue(cell)) values.push(cell.trim());
  }
  const numbers: number[] = [];
  for (const value of values) {
    const number = readNumber(value, decimalComma) ?? NaN;
    if (!Number.isNaN(number)) numbers.push(number);
  }
  const isNumber = numbers.length >= KIND_SHARE * values.length;
  const angles = isNumber ? null : anglesOf(values, decimalComma);
  const kind = values.length === 0 ? 'empty' : isNumber ? 'number' : angles !== null ? 'sexagesimal' : 'text';
  return {
    index,
    name,
    kind,
    values,
    rows: rows.length,
    numbers: kind === 'number' ? numbers : [],
    angles: angles ?? { values: [], degrees: false },
    distinctShare: values.length === 0 ? 0 : new Set(values).size / values.length,
  };
}

function anglesOf(values: readonly string[], decimalComma: boolean): ColumnProfile['angles'] | null {
  const looked = values.slice(0, MAX_ANGLES);
  const angles: number[] = [];
  let degrees = false;
  for (const value of looked) {
    const read = readSexagesimal(value, { decimalComma });
    if (!read.ok || read.fields < 2) continue;
    angles.push(read.value);
    degrees ||= read.firstUnit === 'degrees';
  }
  return angles.length > 0 && angles.length >= KIND_SHARE * looked.length
    ? { values: angles, degrees }
    : null;
}

/** The column as the person sees it. */
export function describedColumn(profile: ColumnProfile): FileColumn {
  const examples = profile.values
    .slice(0, MAX_EXAMPLES)
    .map((value) => storableText(value, MAX_EXAMPLE_LENGTH));
  return { name: profile.name, kind: profile.kind, examples };
}

/** Smallest and largest of a list of numbers; 0 and 0 for none. */
export function rangeOf(numbers: readonly number[]): { min: number; max: number } {
  let min = Infinity;
  let max = -Infinity;
  for (const number of numbers) {
    if (number < min) min = number;
    if (number > max) max = number;
  }
  return numbers.length === 0 ? { min: 0, max: 0 } : { min, max };
}
