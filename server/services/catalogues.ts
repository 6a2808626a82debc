import { and, eq, max, sql } from 'drizzle-orm';
import { inTransaction, type Tx } from '../../db/client';
import { catalogue, catalogueRevision, setAsideRow, storedFile } from '../../db/schema/catalogue';
import { researchGroup } from '../../db/schema/group';
import { person } from '../../db/schema/person';
import type { CatalogueCitation, CatalogueDetail, CatalogueSummary, Coverage, NewCatalogue } from '../../shared/schemas/catalogue';
import type { SetAsideRow } from '../../shared/schemas/mapping';
import { setAsideCode } from '../../shared/schemas/mapping';
import type { Context, GroupActor } from '../context';
import { found, refuse } from '../errors';
import { columnRoles } from '../formats/column-roles';
import { recordEvent } from './audit';
import { columnsUnder, storedFileOf } from './files';
import { enqueueJob } from './jobs';
import { refuseColumnsBeyond } from './mapping-check';

/** Makes the catalogue and its first revision and queues the import of the file. */
export async function createCatalogue(
  context: Context,
  actor: GroupActor,
  input: NewCatalogue,
): Promise<{ label: string; revision: number; jobId: string }> {
  await storedFileOf(context, actor, input.fileId);
  const columns = (await columnsUnder(context, input.fileId, input.dialect)).map(({ name, kind }) => ({ name, kind }));
  refuseColumnsBeyond(input.mapping, columns.length);
  return inTransaction(context.database, actor, async (tx) => {
    // One catalogue after the other: the order of arrival decides the stamp.
    await tx.select().from(researchGroup).where(eq(researchGroup.id, actor.groupId)).for('update');
    const catalogueId = await insertCatalogue(tx, actor, input);
    const jobId = crypto.randomUUID();
    const [revision] = await tx
      .insert(catalogueRevision)
      .values({
        groupId: actor.groupId,
        catalogueId,
        number: 1,
        fileId: input.fileId,
        dialect: input.dialect,
        mapping: input.mapping,
        columns,
        frame: input.frame,
        epochYear: input.epochYear,
        jobId,
        createdBy: actor.personId,
      })
      .returning();
    const made = found(revision, 'revision');
    await enqueueJob(tx, actor, {
      id: jobId,
      kind: 'import',
      title: `Import of ${input.label}`,
      payload: { revisionId: made.id },
      link: `catalogues/${input.label}`,
    });
    await recordEvent(tx, actor, 'catalogue added', `catalogue ${input.label}`, { fileId: input.fileId });
    return { label: input.label, revision: made.number, jobId };
  });
}

async function insertCatalogue(tx: Tx, actor: GroupActor, input: NewCatalogue): Promise<number> {
  const [last] = await tx
    .select({ ordinal: max(catalogue.ordinal) })
    .from(catalogue)
    .where(eq(catalogue.groupId, actor.groupId));
  const [row] = await tx
    .insert(catalogue)
    .values({
      groupId: actor.groupId,
      label: input.label,
      title: input.title,
      description: input.description,
      band: input.band,
      citation: input.citation,
      ordinal: (last?.ordinal ?? -1) + 1,
      createdBy: actor.personId,
    })
    .onConflictDoNothing({ target: [catalogue.groupId, catalogue.label] })
    .returning({ id: catalogue.id });
  if (row === undefined) {
    refuse('label-taken', `A catalogue with the label ${input.label} exists already.`, {
      errors: [{ path: 'label', message: 'in use' }],
    });
  }
  return row.id;
}

const newestRevision = sql`${catalogueRevision.number} = (
  select max(r.number) from catalogue_revision r where r.catalogue_id = ${catalogue.id})`;

async function selectCatalogues(tx: Tx, actor: GroupActor, label: string | null) {
  return tx
    .select({ catalogue, revision: catalogueRevision, file: storedFile, importedBy: person.name })
    .from(catalogue)
    .innerJoin(catalogueRevision, and(eq(catalogueRevision.catalogueId, catalogue.id), newestRevision))
    .innerJoin(storedFile, eq(storedFile.id, catalogueRevision.fileId))
    .innerJoin(person, eq(person.id, catalogueRevision.createdBy))
    .where(and(eq(catalogue.groupId, actor.groupId), label === null ? undefined : eq(catalogue.label, label)))
    .orderBy(catalogue.ordinal);
}

type CatalogueRow = Awaited<ReturnType<typeof selectCatalogues>>[number];

function summaryOf({ catalogue: c, revision: r }: CatalogueRow): CatalogueSummary {
  return {
    label: c.label,
    title: c.title,
    band: c.band,
    ordinal: c.ordinal,
    revision: r.number,
    state: r.state,
    registered: r.registeredAt !== null,
    epochYear: r.epochYear,
    sources: r.sources,
    setAside: r.setAside,
    createdAt: c.createdAt.toISOString(),
  };
}

export async function listCatalogues(context: Context, actor: GroupActor): Promise<CatalogueSummary[]> {
  return inTransaction(context.database, actor, async (tx) =>
    (await selectCatalogues(tx, actor, null)).map(summaryOf),
  );
}

/** The newest revision of a catalogue by its label; refuses 'not-found'. */
export async function catalogueByLabel(tx: Tx, actor: GroupActor, label: string): Promise<CatalogueRow> {
  const [row] = await selectCatalogues(tx, actor, label);
  return found(row, 'catalogue');
}

export async function getCatalogue(context: Context, actor: GroupActor, label: string): Promise<CatalogueDetail> {
  return inTransaction(context.database, actor, async (tx) => {
    const row = await catalogueByLabel(tx, actor, label);
    const { catalogue: c, revision: r, file } = row;
    return {
      ...summaryOf(row),
      description: c.description,
      citation: c.citation,
      frame: r.frame,
      rowsRead: r.rowsRead,
      fileName: file.name,
      fileSizeBytes: file.sizeBytes,
      fileSha256: file.sha256,
      importedBy: row.importedBy,
      dialect: r.dialect,
      mapping: r.mapping,
      columns: columnRoles(r.columns, r.mapping),
      medianErrArcsec: r.medianErrArcsec,
      jobId: r.jobId,
    };
  });
}

export async function changeCatalogue(
  context: Context,
  actor: GroupActor,
  label: string,
  change: { title?: string; description?: string; band?: string; citation?: string },
): Promise<void> {
  await inTransaction(context.database, actor, async (tx) => {
    const row = await catalogueByLabel(tx, actor, label);
    if (Object.keys(change).length === 0) return;
    await tx.update(catalogue).set(change).where(eq(catalogue.id, row.catalogue.id));
    await recordEvent(tx, actor, 'catalogue described', `catalogue ${row.catalogue.label}`, change);
  });
}

/** The citation of every catalogue, with the number of live objects that have a source in it. */
export async function listCitations(context: Context, actor: GroupActor): Promise<CatalogueCitation[]> {
  return inTransaction(context.database, actor, async (tx) => {
    const { rows } = await tx.execute<CatalogueCitation & Record<string, unknown>>(sql`
      select c.label, c.title, c.ordinal, c.citation, (
        select count(distinct coalesce(o.merged_into, o.id)) from entry e join object o on o.id = e.id
        where e.catalogue_id = c.id) as objects
      from catalogue c where c.group_id = ${actor.groupId} order by c.ordinal`);
    return rows;
  });
}

/** Density squares of the newest ready revision. */
export async function catalogueCoverage(context: Context, actor: GroupActor, label: string): Promise<Coverage> {
  return inTransaction(context.database, actor, async (tx) => {
    const { revision } = await catalogueByLabel(tx, actor, label);
    if (revision.coverage === null) refuse('not-ready', 'The coverage picture is made when the import has finished.');
    return revision.coverage;
  });
}

/** Set-aside rows in the order of the file, from `afterSeq` on. */
export async function setAsideRows(
  context: Context,
  actor: GroupActor,
  label: string,
  afterSeq: number,
  limit: number,
): Promise<{ rows: (SetAsideRow & { seq: number })[]; total: number }> {
  return inTransaction(context.database, actor, async (tx) => {
    const { revision } = await catalogueByLabel(tx, actor, label);
    const rows = await tx
      .select()
      .from(setAsideRow)
      .where(and(eq(setAsideRow.revisionId, revision.id), sql`${setAsideRow.seq} > ${afterSeq}`))
      .orderBy(setAsideRow.seq)
      .limit(limit);
    return {
      total: revision.setAside,
      rows: rows.map((row) => ({
        seq: row.seq,
        line: row.line,
        column: row.column,
        code: setAsideCode.parse(row.code),
        message: row.message,
        raw: row.raw,
      })),
    };
  });
}
