import type { SetAsideRow, UnderstoodRow } from '../../shared/schemas/mapping';
import type { Context } from '../context';
import { KeyFilter } from '../engine/key-filter';
import { copyTextEscape } from '../formats/copy-text';
import { readRows } from '../formats/rows';
import { compileMapping } from '../formats/understand';
import type { ImportedRevision } from './imports';
import type { JobRun } from './jobs';

const CHUNK_CHARACTERS = 128 * 1024;
const ENTRY_ID_BLOCK = 50_000;
const CELL_SEPARATOR = '\u001f';
/** Of so many suspected duplicates the suspicion is checked exactly at the end. */
const MAX_CHECKED_SUSPECTS = 10_000;
const MAX_RAW_CHARACTERS = 2000;

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
  const file = context.files.open(revision.fileId);
  const rows = readRows(file, revision.dialect, { maxUnpackedBytes: context.config.maxUnpackedBytes });
  const reader = compileMapping(revision.mapping, revision.columns, revision.dialect);
  const source = reader.newRow();
  const takeEntryId = entryIdSource(context);
  const keys = keyGuard(revision.mapping.keyColumn !== null, counts);
  const prefix = `${revision.groupId}\t${revision.id}\t`;
  let chunk = '';
  for await (const batch of rows) {
    for (let i = 0; i < batch.lines.length; i += 1) {
      const cells = batch.cells[i] ?? null;
      const raw = batch.raws[i] ?? '';
      counts.rowsRead += 1;
      const refusal = reader.read(cells, raw, batch.lines[i] ?? 0, batch.firstRow + i, source) ?? keys(source, raw);
      if (refusal !== null || cells === null) {
        if (refusal !== null) await setAside(input, refusal);
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
    await run.report(counts.rowsRead, estimateRows(counts.rowsRead, file.bytesRead, imported.sizeBytes), 'Reading rows');
  }
  if (chunk !== '') yield chunk;
}

async function setAside(input: Import, row: SetAsideRow): Promise<void> {
  input.counts.setAside += 1;
  input.counts.firstReason ??= row.message;
  await input.setAside(row);
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
function keyGuard(ownKeys: boolean, counts: ImportCounts) {
  const seen = new KeyFilter();
  return (source: UnderstoodRow, raw: string): SetAsideRow | null => {
    if (!seen.addAndTest(source.key)) return null;
    if (!ownKeys) {
      source.key = `${source.key} (line ${source.line})`;
      seen.addAndTest(source.key);
      return null;
    }
    if (counts.suspectKeys.length < MAX_CHECKED_SUSPECTS) counts.suspectKeys.push(source.key);
    return {
      line: source.line,
      column: null,
      code: 'duplicate-key',
      message: `The key “${source.key}” stands in an earlier row already.`,
      raw: raw.slice(0, MAX_RAW_CHARACTERS),
    };
  };
}

const orNull = (value: number | null): number | '\\N' => value ?? '\\N';

function sourceLine(rowNo: number, entryId: number, s: UnderstoodRow, cells: readonly string[]): string {
  return (
    `${rowNo}\t${entryId}\t${copyTextEscape(s.key)}\t${copyTextEscape(s.names[0] ?? s.key)}\t${s.raDeg}\t${s.decDeg}\t` +
    `${orNull(s.errMajArcsec)}\t${orNull(s.errMinArcsec)}\t${orNull(s.errPaDeg)}\t` +
    `${orNull(s.pmRaMasYr)}\t${orNull(s.pmDecMasYr)}\t${copyTextEscape(cells.join(CELL_SEPARATOR))}\n`
  );
}
