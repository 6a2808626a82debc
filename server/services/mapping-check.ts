import type { ColumnMapping } from '../../shared/schemas/mapping';
import { refuse } from '../errors';

/** All column indexes of a mapping, with the path of the field that names each. */
function mappedColumns(mapping: ColumnMapping): { path: string; index: number }[] {
  const list: { path: string; index: number | null }[] = [{ path: 'keyColumn', index: mapping.keyColumn }];
  const collect = (path: string, part: object | null) => {
    for (const [name, value] of Object.entries(part ?? {})) {
      if (/column$/i.test(name) && typeof value === 'number') list.push({ path: `${path}.${name}`, index: value });
    }
  };
  collect('position', mapping.position);
  collect('error', mapping.error);
  collect('properMotion', mapping.properMotion);
  collect('redshift', mapping.redshift);
  mapping.names.forEach((name, i) => collect(`names.${i}`, name));
  mapping.photometry.forEach((band, i) => collect(`photometry.${i}`, band));
  return list.flatMap(({ path, index }) => (index === null ? [] : [{ path, index }]));
}

/** Refuses a mapping that names columns the file does not have, with the path of each. */
export function refuseColumnsBeyond(mapping: ColumnMapping, columnCount: number): void {
  const beyond = mappedColumns(mapping).filter(({ index }) => index >= columnCount);
  if (beyond.length === 0) return;
  refuse('mapping-refused', `The file has ${columnCount} columns; the mapping names more.`, {
    errors: beyond.map(({ path, index }) => ({ path: `mapping.${path}`, message: `there is no column ${index + 1}` })),
  });
}
