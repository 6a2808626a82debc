import type { FileColumn } from '../../../shared/schemas/mapping';

export type Columns = readonly FileColumn[];

/** The header of a column, or its place when it has none. */
export function columnName(columns: Columns, index: number): string {
  const name = columns[index]?.name ?? '';
  return name === '' ? `column ${index + 1}` : name;
}
