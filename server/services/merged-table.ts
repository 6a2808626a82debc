import { sql, type SQL } from 'drizzle-orm';
import { inTransaction, type Tx } from '../../db/client';
import type { ExportOptions, ExportPreview, ExportRecipe } from '../../shared/schemas/export';
import type { Context, GroupActor } from '../context';
import { csvLine } from '../formats/csv-writer';
import { MergedRowWriter, type MergedMember, type MergedObject, type MergedParts } from './merged-row';
import { currentRevisionIds } from './near-sources';
import { bornInto } from './objects';
import { bigintArray } from './verdict-log';

const PAGE_OBJECTS = 2000;
const PREVIEW_ROWS = 20;

interface TableCatalogue {
  label: string;
  title: string;
  ordinal: number;
  catalogueId: number;
  columns: { name: string }[];
  [key: string]: unknown;
}

/** The catalogues that are ready, with the columns of their newest revision. */
async function tableCatalogues(tx: Tx, actor: GroupActor): Promise<TableCatalogue[]> {
  const revisionIds = await currentRevisionIds(tx, actor);
  const { rows } = await tx.execute<TableCatalogue>(sql`
    select c.label, c.title, c.ordinal, c.id as "catalogueId", r.columns
    from catalogue_revision r join catalogue c on c.id = r.catalogue_id
    where r.id = any(${sql.param(revisionIds)}::int[]) order by c.ordinal`);
  return rows;
}

const liveObjects = (actor: GroupActor) => sql`o.group_id = ${actor.groupId} and o.merged_into is null`;

/** Which catalogues and columns a merged table can have. */
export async function exportOptions(context: Context, actor: GroupActor): Promise<ExportOptions> {
  return inTransaction(context.database, actor, async (tx) => {
    const catalogues = await tableCatalogues(tx, actor);
    return {
      objects: await countObjects(tx, liveObjects(actor)),
      catalogues: catalogues.map(({ label, title, ordinal, columns }) => ({
        label,
        title,
        ordinal,
        columns: columns.map(({ name }, index) => ({ index, name })),
      })),
    };
  });
}

async function countObjects(tx: Tx, filter: SQL): Promise<number> {
  const { rows } = await tx.execute<{ n: number }>(sql`select count(*) as n from object o where ${filter}`);
  return Number(rows[0]?.n ?? 0);
}

/** Which objects stand in the table. */
function objectFilter(actor: GroupActor, recipe: ExportRecipe, catalogues: readonly TableCatalogue[]): SQL {
  const filters = [liveObjects(actor), sql`o.entries >= ${recipe.minEntries}`];
  for (const label of recipe.standingIn) {
    const id = catalogues.find((one) => one.label.toLowerCase() === label.toLowerCase())?.catalogueId ?? 0;
    filters.push(sql`o.id in (select coalesce(b.merged_into, b.id) from entry e join object b on b.id = e.id
      where e.catalogue_id = ${id})`);
  }
  return sql.join(filters, sql` and `);
}

/** The header, the number of rows, and the first rows. */
export async function exportPreview(context: Context, actor: GroupActor, recipe: ExportRecipe): Promise<ExportPreview> {
  return inTransaction(context.database, actor, async (tx) => {
    const catalogues = await tableCatalogues(tx, actor);
    const writer = new MergedRowWriter(recipe, catalogues);
    const filter = objectFilter(actor, recipe, catalogues);
    const rows = await pageOfRows(tx, actor, writer, filter, 0, PREVIEW_ROWS);
    return {
      rows: await countObjects(tx, filter),
      header: writer.header(),
      sample: rows.cells.map((cells) => cells.map((cell) => (cell === null ? '' : String(cell)))),
    };
  });
}

/**
 * The merged table as CSV text, page by page under one snapshot: rows do not change while it is read, and memory
 * does not grow with it. The transaction ends when the reader stops, for whatever reason.
 */
export async function* mergedTableCsv(context: Context, actor: GroupActor, recipe: ExportRecipe): AsyncGenerator<string> {
  const pages = pagesInTransaction(context, actor, recipe);
  try {
    yield* pages.chunks;
  } finally {
    await pages.stop();
  }
}

/** A transaction that hands out text while it is open: the reader asks for a chunk, the transaction makes it. */
function pagesInTransaction(context: Context, actor: GroupActor, recipe: ExportRecipe) {
  let offer: (chunk: IteratorResult<string, undefined>) => void = () => undefined;
  let fail: (error: unknown) => void = () => undefined;
  let wanted: () => void = () => undefined;
  let stopped = false;
  let demand = new Promise<void>((resolve) => (wanted = resolve));
  const give = async (text: string) => {
    await demand;
    if (stopped) throw new ReaderStopped();
    demand = new Promise<void>((resolve) => (wanted = resolve));
    offer({ done: false, value: text });
  };
  const work = inTransaction(context.database, actor, (tx) => writePages(tx, actor, recipe, give), 'repeatable read').then(
    async () => {
      await demand;
      offer({ done: true, value: undefined });
    },
    (error: unknown) => {
      if (!(error instanceof ReaderStopped)) fail(error);
    },
  );
  const next = () =>
    new Promise<IteratorResult<string, undefined>>((resolve, reject) => {
      offer = resolve;
      fail = reject;
      wanted();
    });
  return {
    chunks: { [Symbol.asyncIterator]: () => ({ next }) },
    async stop() {
      stopped = true;
      wanted();
      await work;
    },
  };
}

/** Unwinds the transaction of a reader who went away. */
class ReaderStopped extends Error {}

async function writePages(
  tx: Tx,
  actor: GroupActor,
  recipe: ExportRecipe,
  give: (text: string) => Promise<void>,
): Promise<void> {
  const catalogues = await tableCatalogues(tx, actor);
  const writer = new MergedRowWriter(recipe, catalogues);
  const filter = objectFilter(actor, recipe, catalogues);
  await give(csvLine(writer.header()));
  let after = 0;
  for (;;) {
    const page = await pageOfRows(tx, actor, writer, filter, after, PAGE_OBJECTS);
    if (page.cells.length > 0) await give(page.cells.map(csvLine).join(''));
    if (page.cells.length < PAGE_OBJECTS) return;
    after = page.last;
  }
}

/** One page of rows behind an object number, each query over the whole page. */
async function pageOfRows(
  tx: Tx,
  actor: GroupActor,
  writer: MergedRowWriter,
  filter: SQL,
  after: number,
  limit: number,
): Promise<{ cells: (string | number | null)[][]; last: number }> {
  const { rows: objects } = await tx.execute<MergedObject & Record<string, unknown>>(sql`
    select o.id, o.number, o.name, o.ra_deg as "raDeg", o.dec_deg as "decDeg", o.err_arcsec as "errArcsec", o.entries
    from object o where ${filter} and o.number > ${after} order by o.number limit ${limit}`);
  if (objects.length === 0) return { cells: [], last: after };
  const parts = await partsOf(tx, actor, objects.map((one) => one.id));
  return { cells: writer.rows(objects, parts), last: objects.at(-1)?.number ?? after };
}

/**
 * Members, names and verdicts of live objects. Each is looked up by its own index from a plain list of ids and put
 * together here: joins over a list whose length the planner cannot know end in plans that take the square of the time.
 */
async function partsOf(tx: Tx, actor: GroupActor, liveIds: readonly number[]): Promise<MergedParts> {
  const born = await bornInto(tx, liveIds);
  const ids = bigintArray(born.keys());
  const liveOf = (entryId: number) => born.get(entryId) ?? 0;
  const revisionIds = await currentRevisionIds(tx, actor);
  const members = await tx.execute<Omit<MergedMember, 'live'> & { entryId: number }>(sql`
    select s.entry_id as "entryId", c.label, s.ra_deg as "raDeg", s.dec_deg as "decDeg", s.cells
    from source s
    join catalogue_revision r on r.id = s.revision_id
    join catalogue c on c.id = r.catalogue_id
    where s.entry_id = any(${ids}) and s.revision_id = any(${sql.param(revisionIds)}::int[])
    order by c.ordinal, s.row_no`);
  const labelOf = new Map(members.rows.map((member) => [member.entryId, member.label]));
  const names = await tx.execute<{ entryId: number; byPerson: boolean; name: string }>(sql`
    select object_id as "entryId", origin = 'person' as "byPerson", name from alias
    where object_id = any(${ids}) and retired_at is null order by object_id, id`);
  const verdicts = await tx.execute<{ a: number; b: number; grade: string | null }>(sql`
    select entry_a as a, entry_b as b, grade from verdict_in_force where entry_a = any(${ids}) and value = 'same'`);
  return {
    members: members.rows.map(({ entryId, ...member }) => ({ ...member, live: liveOf(entryId) })),
    names: names.rows.map(({ entryId, byPerson, name }) => ({
      live: liveOf(entryId),
      label: byPerson ? null : (labelOf.get(entryId) ?? null),
      name,
    })),
    // A verdict that leads out of the object was not carried out and does not hold it together.
    grades: verdicts.rows
      .filter((one) => liveOf(one.a) === liveOf(one.b))
      .map((one) => ({ live: liveOf(one.a), grade: one.grade })),
  };
}
