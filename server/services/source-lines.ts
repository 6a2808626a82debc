import type { SetAsideRow } from '../../shared/schemas/mapping';
import type { Context } from '../context';
import { KeyFilter } from '../engine/key-filter';
import { copyTextEscape } from '../formats/copy-text';
import { openTable } from '../formats/rows';
import { compileMapping, type SourceFields } from '../formats/understand';
import type { ImportedRevision } from './imports';
import type { JobRun } from './jobs';

const CHUNK_CHARACTERS = 128 * 1024;
const ENTRY_ID_BLOCK = 50_000;
const CELL_SEPARATOR = '\u001f';
/** Of so many suspected duplicates the suspicion is checked exactly at the end. */
const MAX_CHECKED_SUSPECTS = 10_000;

export interface ImportCounts {
  rowsRead: number;
  sources: number;
  setAside: number;
  firstReason?: string;
  suspectKeys: string[];
}

interface Import {
  context: Context;
  run: JobRun;
  imported: ImportedRevision;
  /** Counted up while the lines are read. */
  counts: ImportCounts;
  setAside(row: SetAsideRow): Promise<void>;
}

/** Reads the file of a revision and yields its sources as text for COPY, in chunks of whole lines. */
export async function* sourceLines(input: Import): AsyncGenerator<string> {
  const { context, counts, imported, run } = input;
  const { revision } = imported;
  const table = openTable(context.files.open(revision.fileId), revision.dialect, {
    maxUnpackedBytes: context.config.maxUnpackedBytes,
  });
  const understand = compileMapping(revision.mapping, revision.columns, revision.dialect);
  const takeEntryId = entryIdSource(context);
  const keyOf = uniqueKeys(revision.mapping.keyColumn !== null, counts);
  const prefix = `${revision.groupId}\t${revision.id}\t`;
  let chunk = '';
  for await (const batch of table.batches) {
    for (let i = 0; i < batch.lines.length; i += 1) {
      const line = batch.lines[i] ?? 0;
      const cells = batch.cells[i] ?? [];
      counts.rowsRead += 1;
      const understood = batch.refusals?.get(i) ?? understand(line, cells);
      const source = 'code' in understood ? understood : keyOf(understood, cells);
      if ('code' in source) {
        counts.setAside += 1;
        counts.firstReason ??= source.message;
        await input.setAside(source);
        continue;
      }
      counts.sources += 1;
      const entryId = takeEntryId.ready() ?? (await takeEntryId.next());
      chunk += prefix + sourceLine(counts.sources, entryId, source, cells);
      if (chunk.length > CHUNK_CHARACTERS) {
        yield chunk;
        chunk = '';
      }
    }
    await run.report(counts.rowsRead, estimateRows(counts.rowsRead, table.bytesRead(), imported.sizeBytes), 'Reading rows');
  }
  if (chunk !== '') yield chunk;
}

/** How many rows the file will turn out to have, from the share of its bytes that has been read. */
function estimateRows(rows: number, bytesRead: number, sizeBytes: number): number | null {
  return bytesRead === 0 ? null : Math.max(rows, Math.round((rows * sizeBytes) / bytesRead));
}

/** Entry ids from blocks of the sequence: mostly at hand without waiting. */
function entryIdSource(context: Context) {
  let next = 0;
  let end = 0;
  return {
    ready: () => (next < end ? next++ : null),
    async next() {
      const { rows } = await context.database.pool.query<{ first: number }>('select reserve_entry_ids($1) as first', [
        ENTRY_ID_BLOCK,
      ]);
      next = rows[0]?.first ?? 0;
      end = next + ENTRY_ID_BLOCK;
      return next++;
    },
  };
}

/**
 * A row whose own key was there before is set aside. Where the catalogue has no key of its own, a repeated name only
 * gets its line behind it: two rows may well bear one name.
 */
function uniqueKeys(ownKeys: boolean, counts: ImportCounts) {
  const seen = new KeyFilter();
  return (source: SourceFields, cells: readonly string[]): SourceFields | SetAsideRow => {
    if (!seen.addAndTest(source.key)) return source;
    if (!ownKeys) {
      const key = `${source.key} (line ${source.line})`;
      seen.addAndTest(key);
      return { ...source, key };
    }
    if (counts.suspectKeys.length < MAX_CHECKED_SUSPECTS) counts.suspectKeys.push(source.key);
    return {
      line: source.line,
      column: null,
      code: 'duplicate-key',
      message: `The key ${JSON.stringify(source.key)} stands in an earlier row already.`,
      raw: cells.join(' | ').slice(0, 2000),
    };
  };
}

const orNull = (value: number | null): number | '\\N' => value ?? '\\N';

function sourceLine(rowNo: number, entryId: number, s: SourceFields, cells: readonly string[]): string {
  return (
    `${rowNo}\t${entryId}\t${copyTextEscape(s.key)}\t${copyTextEscape(s.designation)}\t${s.raDeg}\t${s.decDeg}\t` +
    `${orNull(s.errMajArcsec)}\t${orNull(s.errMinArcsec)}\t${orNull(s.errPaDeg)}\t` +
    `${orNull(s.pmRaMasYr)}\t${orNull(s.pmDecMasYr)}\t${copyTextEscape(cells.join(CELL_SEPARATOR))}\n`
  );
}
