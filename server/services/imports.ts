import { createReadStream, createWriteStream, type WriteStream } from 'node:fs';
import { mkdir, rm } from 'node:fs/promises';
import path from 'node:path';
import { Readable } from 'node:stream';
import { finished, pipeline } from 'node:stream/promises';
import { and, eq, sql } from 'drizzle-orm';
import { from as copyFrom } from 'pg-copy-streams';
import { z } from 'zod';
import { inTransaction, type Tx } from '../../db/client';
import { catalogue, catalogueRevision, storedFile } from '../../db/schema/catalogue';
import { job } from '../../db/schema/job';
import type { SetAsideRow } from '../../shared/schemas/mapping';
import type { Context, GroupActor } from '../context';
import { found, refuse } from '../errors';
import { copyTextEscape } from '../formats/copy-text';
import { UnreadableFile } from '../formats/unreadable-file';
import { sourceLines, type ImportCounts } from './source-lines';
import { coveragePicture } from './coverage';
import type { JobRun } from './jobs';
import { registerRevision } from './registration';
import { buildRevisionIndex } from './revision-index';

const importPayload = z.object({ revisionId: z.number().int() });
/** Above this, the median error is taken from an even sample of about so many rows. */
const MEDIAN_SAMPLE_ROWS = 50_000;

const SOURCE_COLUMNS = `group_id, revision_id, row_no, entry_id, key, designation, ra_deg, dec_deg,
  err_maj_arcsec, err_min_arcsec, err_pa_deg, pm_ra_mas_yr, pm_dec_mas_yr, cells`;

async function selectRevision(tx: Tx, actor: GroupActor, revisionId: number) {
  const [row] = await tx
    .select({ revision: catalogueRevision, label: catalogue.label, sizeBytes: storedFile.sizeBytes })
    .from(catalogueRevision)
    .innerJoin(catalogue, eq(catalogue.id, catalogueRevision.catalogueId))
    .innerJoin(storedFile, eq(storedFile.id, catalogueRevision.fileId))
    .where(and(eq(catalogueRevision.id, revisionId), eq(catalogueRevision.groupId, actor.groupId)));
  return found(row, 'revision');
}

export type ImportedRevision = Awaited<ReturnType<typeof selectRevision>>;

/**
 * The import job: file -> sources in one transaction, then numbers and aliases in a second one. Started again
 * after a crash it goes on with whatever of the two is missing.
 */
export async function importCatalogue(context: Context, run: JobRun): Promise<void> {
  const { revisionId } = importPayload.parse(run.payload);
  const { actor } = run;
  const imported = await inTransaction(context.database, actor, (tx) => selectRevision(tx, actor, revisionId));
  let { sources } = imported.revision;
  if (imported.revision.state === 'importing') {
    const counts = await loadSources(context, run, imported);
    sources = counts.sources;
  }
  await run.report(sources, sources, 'Making the position index');
  const positions = await buildRevisionIndex(context, actor, revisionId);
  await inTransaction(context.database, actor, (tx) =>
    tx
      .update(catalogueRevision)
      .set({ coverage: coveragePicture(positions.raDeg, positions.decDeg) })
      .where(eq(catalogueRevision.id, revisionId)),
  );
  const { label, revision } = imported;
  await registerRevision(context, actor, { revisionId, label, mapping: revision.mapping }, (done) =>
    run.report(done, sources, 'Registering objects and names'),
  );
  run.finish(sources, `${sources} sources imported.`);
}

/** Reads the file and leaves its sources, entries and set-aside rows, or nothing at all. */
async function loadSources(context: Context, run: JobRun, imported: ImportedRevision): Promise<ImportCounts> {
  const { actor } = run;
  const { revision } = imported;
  const spool = await openSpool(context, run.id);
  try {
    return await inTransaction(context.database, actor, async (tx) => {
      const { rows } = await tx.execute<{ part: string }>(sql`select open_partition('source', ${revision.id}) as part`);
      const part = found(rows[0], 'partition').part;
      const counts: ImportCounts = { rowsRead: 0, sources: 0, setAside: 0, suspectKeys: [] };
      const lines = sourceLines({ context, run, imported, counts, setAside: (row) => spool.write(row) });
      // The part was made in this transaction, so its rows may be written frozen: no later pass over them.
      const into = tx.$client.query(copyFrom(`copy ${part} (${SOURCE_COLUMNS}) from stdin with (freeze)`));
      await pipeline(Readable.from(lines), into);
      await run.report(counts.sources, counts.sources, 'Indexing');
      if (counts.sources === 0) refuseEmpty(counts);
      await tx.execute(sql`select attach_partition('source', ${revision.id})`);
      await spool.close();
      await insertSetAside(tx, actor, revision.id, spool.path, counts.setAside);
      await insertEntries(tx, actor, revision);
      await checkSuspects(tx, revision.id, counts.suspectKeys);
      await tx
        .update(catalogueRevision)
        .set({
          state: 'ready',
          rowsRead: counts.rowsRead,
          sources: counts.sources,
          setAside: counts.setAside,
          medianErrArcsec: await medianError(tx, revision.id, counts.sources),
        })
        .where(eq(catalogueRevision.id, revision.id));
      return counts;
    });
  } catch (error) {
    if (error instanceof UnreadableFile) refuse('file-unreadable', error.message, { hint: error.hint });
    throw error;
  } finally {
    await spool.remove();
  }
}

function refuseEmpty(counts: ImportCounts): never {
  refuse(
    'no-sources',
    counts.rowsRead === 0
      ? 'The file holds no rows.'
      : `None of the ${counts.rowsRead} rows could be read as a source; the first reason: ${counts.firstReason ?? 'unknown'}`,
  );
}

/** Set-aside rows wait in a file of their own while the connection is busy with the COPY of the sources. */
async function openSpool(context: Context, jobId: string) {
  await mkdir(context.config.filesDir, { recursive: true });
  const spoolPath = path.join(context.config.filesDir, `set-aside-${jobId}.part`);
  const stream: WriteStream = createWriteStream(spoolPath);
  let seq = 0;
  return {
    path: spoolPath,
    async write(row: SetAsideRow): Promise<void> {
      const fields = [seq, row.line, row.column === null ? '\\N' : copyTextEscape(row.column), row.code];
      seq += 1;
      const line = `${fields.join('\t')}\t${copyTextEscape(row.message)}\t${copyTextEscape(row.raw)}\n`;
      if (!stream.write(line)) await new Promise<void>((resolve) => stream.once('drain', () => resolve()));
    },
    async close(): Promise<void> {
      stream.end();
      await finished(stream);
    },
    async remove(): Promise<void> {
      stream.destroy();
      await rm(spoolPath, { force: true });
    },
  };
}

async function insertSetAside(
  tx: Tx,
  actor: GroupActor,
  revisionId: number,
  spoolPath: string,
  count: number,
): Promise<void> {
  if (count === 0) return;
  await tx.execute(sql`create temp table set_aside_load
    (seq integer, line integer, "column" text, code text, message text, raw text) on commit drop`);
  await pipeline(createReadStream(spoolPath), tx.$client.query(copyFrom('copy set_aside_load from stdin')));
  await tx.execute(sql`
    insert into set_aside_row (group_id, revision_id, seq, line, "column", code, message, raw)
    select ${actor.groupId}::int, ${revisionId}::int, seq, line, "column", code, message, raw from set_aside_load`);
}

/**
 * New keys become entries; a key that the catalogue had in an earlier revision keeps its entry. The entries of a first
 * revision are loaded before they are indexed, which takes a fraction of the time.
 */
async function insertEntries(
  tx: Tx,
  actor: GroupActor,
  revision: { id: number; catalogueId: number; number: number },
): Promise<void> {
  const rows = sql`select s.entry_id, ${actor.groupId}::int, ${revision.catalogueId}::int, s.key from source s
    where s.revision_id = ${revision.id}`;
  if (revision.number === 1) {
    const opened = await tx.execute<{ part: string }>(
      sql`select open_partition('entry', ${revision.catalogueId}) as part`,
    );
    const { part } = found(opened.rows[0], 'partition');
    await tx.execute(sql`insert into ${sql.raw(part)} (id, group_id, catalogue_id, key) ${rows}`);
    await tx.execute(sql`select attach_partition('entry', ${revision.catalogueId})`);
    return;
  }
  await tx.execute(sql`insert into entry (id, group_id, catalogue_id, key) ${rows}
    on conflict (catalogue_id, key) do nothing`);
  await tx.execute(sql`
    update source s set entry_id = e.id from entry e
    where s.revision_id = ${revision.id} and e.catalogue_id = ${revision.catalogueId} and e.key = s.key
      and s.entry_id <> e.id`);
}

/** A row is set aside as a duplicate by a fingerprint of its key; here the suspicion is checked exactly. */
async function checkSuspects(tx: Tx, revisionId: number, keys: readonly string[]): Promise<void> {
  if (keys.length === 0) return;
  const { rows } = await tx.execute<{ key: string }>(sql`
    select k.key from unnest(${sql.param([...keys])}::text[]) as k (key)
    where not exists (select 1 from source s where s.revision_id = ${revisionId} and s.key = k.key) limit 1`);
  const wrong = rows[0];
  if (wrong !== undefined) {
    throw new Error(`fingerprint collision: a row was taken for a duplicate of ${JSON.stringify(wrong.key)}`);
  }
}

async function medianError(tx: Tx, revisionId: number, sources: number): Promise<number | null> {
  const every = Math.max(1, Math.floor(sources / MEDIAN_SAMPLE_ROWS));
  const { rows } = await tx.execute<{ median: number | null }>(sql`
    select percentile_cont(0.5) within group (order by sqrt(err_maj_arcsec::float8 * err_min_arcsec)) as median
    from source where revision_id = ${revisionId} and row_no % ${every} = 0`);
  return rows[0]?.median ?? null;
}

/**
 * A first import that failed or was cancelled leaves no catalogue. The uploaded file stays after a failure, so that
 * the columns can be chosen again; after a cancel it goes too.
 */
export async function markImportEnded(
  context: Context,
  tx: Tx,
  run: Pick<JobRun, 'id' | 'payload' | 'actor'>,
  state: 'failed' | 'cancelled',
): Promise<(() => Promise<void>) | null> {
  const { revisionId } = importPayload.parse(run.payload);
  const [ended] = await tx
    .delete(catalogueRevision)
    .where(and(eq(catalogueRevision.id, revisionId), eq(catalogueRevision.state, 'importing')))
    .returning();
  if (ended === undefined) return null;
  await tx.delete(catalogue).where(
    and(
      eq(catalogue.id, ended.catalogueId),
      sql`not exists (select 1 from catalogue_revision r where r.catalogue_id = ${ended.catalogueId})`,
    ),
  );
  const link = state === 'failed' ? `catalogues/new?file=${ended.fileId}` : null;
  await tx.update(job).set({ link }).where(eq(job.id, run.id));
  if (state === 'failed') return null;
  const [dropped] = await tx
    .delete(storedFile)
    .where(
      and(
        eq(storedFile.id, ended.fileId),
        sql`not exists (select 1 from catalogue_revision r where r.file_id = ${ended.fileId})`,
      ),
    )
    .returning({ id: storedFile.id });
  return dropped === undefined ? null : () => context.files.remove(dropped.id);
}
