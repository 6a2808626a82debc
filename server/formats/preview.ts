import type { Readable } from 'node:stream';
import type {
  ColumnMapping,
  MappingPreview,
  SetAsideRow,
  TextDialect,
  UnderstoodRow,
} from '../../shared/schemas/mapping';
import { readHead } from './file-head';
import { columnTitle, MAX_RAW_LENGTH, storableText } from './shown-text';
import { readTableHead, type TableHead } from './table-head';
import { compileMapping } from './understand';

export interface PreviewOptions {
  /** Largest size of the text of a packed file, in bytes. */
  maxUnpackedBytes: number;
  /** How many rows, and how many refusals, at most; 20 without it. */
  limit?: number;
}

/**
 * The first rows as they will be understood under a mapping, and the first refusals among the first 5,000 rows.
 * Throws UnreadableFile, and RangeError for a mapping that names columns beyond the table.
 */
export async function previewMapping(
  openStream: () => Readable,
  dialect: TextDialect,
  mapping: ColumnMapping,
  { maxUnpackedBytes, limit = 20 }: PreviewOptions,
): Promise<MappingPreview> {
  const head = await readHead(openStream, { maxUnpackedBytes, dialect });
  return previewOf(readTableHead(head, dialect), mapping, limit);
}

function previewOf(
  { dialect, names, batch }: TableHead,
  mapping: ColumnMapping,
  limit: number,
): MappingPreview {
  const reader = compileMapping(
    mapping,
    names.map((name) => ({ name })),
    dialect,
  );
  const firstLineOfKey = new Map<string, number>();
  const rows: UnderstoodRow[] = [];
  const setAside: SetAsideRow[] = [];
  for (let i = 0; i < batch.lines.length && (rows.length < limit || setAside.length < limit); i += 1) {
    const [line, raw] = [batch.lines[i] ?? 0, batch.raws[i] ?? ''];
    const row = reader.newRow();
    const refusal =
      reader.read(batch.cells[i] ?? null, raw, line, batch.firstRow + i, row) ??
      duplicate(row, raw, mapping.keyColumn, names, firstLineOfKey);
    if (refusal === null && rows.length < limit) rows.push(row);
    if (refusal !== null && setAside.length < limit) setAside.push(refusal);
  }
  return { rows, setAside };
}

/** Only a key column promises that keys differ; two rows may bear one name. */
function duplicate(
  row: UnderstoodRow,
  raw: string,
  keyColumn: number | null,
  names: readonly string[],
  firstLineOfKey: Map<string, number>,
): SetAsideRow | null {
  if (keyColumn === null) return null;
  const earlier = firstLineOfKey.get(row.key);
  if (earlier === undefined) {
    firstLineOfKey.set(row.key, row.line);
    return null;
  }
  return {
    line: row.line,
    column: columnTitle(names[keyColumn], keyColumn),
    code: 'duplicate-key',
    message: `The key “${row.key}” stands in line ${earlier} already.`,
    raw: storableText(raw, MAX_RAW_LENGTH),
  };
}
