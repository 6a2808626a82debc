import { Readable, type Writable } from 'node:stream';
import { pipeline } from 'node:stream/promises';
import { sql, type SQL } from 'drizzle-orm';
import { inTransaction, type Tx } from '../../db/client';
import type { ExportOptions, ExportPreview, ExportRecipe } from '../../shared/schemas/export';
import type { Context, GroupActor } from '../context';
import { refuse } from '../errors';
import { csvLine } from '../formats/csv-writer';
import { MergedRowWriter, type MergedObject } from './merged-row';
import { mergedParts } from './merged-parts';
import { currentRevisionIds } from './near-sources';
import { liveObjectsOf, standsIn } from './object-filters';
import { OBJECT_COLUMNS } from './object-summaries';

const PAGE_OBJECTS = 2000;
const PREVIEW_ROWS = 20;
/** Each download holds a connection; so many leave enough of them to everybody else. */
const MAX_DOWNLOADS = 4;

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

/** Which catalogues and columns a merged table can have. */
export async function exportOptions(context: Context, actor: GroupActor): Promise<ExportOptions> {
  return inTransaction(context.database, actor, async (tx) => {
    const catalogues = await tableCatalogues(tx, actor);
    return {
      objects: await countObjects(tx, liveObjectsOf(actor)),
      catalogues: catalogues.map(({ label, title, ordinal, columns }) => ({
        label,
        title,
        ordinal,
        columns: columns.map(({ name }, index) => ({ index, name })),
      })),
    };
  });
}

async function countObjects(tx: Tx, filters: readonly SQL[]): Promise<number> {
  const { rows } = await tx.execute<{ n: number }>(
    sql`select count(*) as n from object o where ${sql.join([...filters], sql` and `)}`,
  );
  return Number(rows[0]?.n ?? 0);
}

/** A recipe that was held against the group's catalogues. */
interface Table {
  writer: MergedRowWriter;
  /** Which objects stand in it: for its first rows, and for all of them. */
  first: SQL[];
  all: SQL[];
}

async function tableOf(tx: Tx, actor: GroupActor, recipe: ExportRecipe): Promise<Table> {
  const known = await tableCatalogues(tx, actor);
  checkRecipe(recipe, known);
  const live = [...liveObjectsOf(actor), sql`o.entries >= ${recipe.minEntries}`];
  const first = [...live];
  const all = [...live];
  for (const label of recipe.standingIn) {
    const condition = await standsIn(tx, actor, label);
    first.push(condition.wide ? condition.each : condition.all);
    all.push(condition.all);
  }
  return { writer: new MergedRowWriter(recipe, known), first, all };
}

/** Refuses a recipe that names what is not there: a kept link must not quietly give another table. */
function checkRecipe(recipe: ExportRecipe, known: readonly TableCatalogue[]): void {
  const columnsOf = (label: string) =>
    known.find((one) => one.label.toLowerCase() === label.toLowerCase())?.columns;
  const labels = [...recipe.catalogues.map((one) => one.label), ...recipe.standingIn];
  const missing = labels.find((label) => columnsOf(label) === undefined);
  if (missing !== undefined) {
    refuse('bad-request', `The recipe names the catalogue “${missing}”, which is not here or not ready.`, {
      errors: [{ path: 'recipe', message: `“${missing}” is no catalogue of this group` }],
    });
  }
  for (const { label, columns } of recipe.catalogues) {
    const beyond = columns.find((index) => index >= (columnsOf(label)?.length ?? 0));
    if (beyond === undefined) continue;
    refuse('bad-request', `The recipe names column ${beyond + 1} of ${label}, which has fewer columns.`, {
      errors: [{ path: 'recipe', message: `${label} has no column ${beyond + 1}` }],
    });
  }
}

const objectsInOrder = (filters: readonly SQL[]) => sql`
  select ${OBJECT_COLUMNS} from object o where ${sql.join([...filters], sql` and `)} order by o.number`;

/** The header, the number of rows, and the first rows. */
export async function exportPreview(
  context: Context,
  actor: GroupActor,
  recipe: ExportRecipe,
): Promise<ExportPreview> {
  return inTransaction(context.database, actor, async (tx) => {
    const { writer, first, all } = await tableOf(tx, actor, recipe);
    const { rows } = await tx.execute<MergedObject & Record<string, unknown>>(
      sql`${objectsInOrder(first)} limit ${PREVIEW_ROWS}`,
    );
    const sample = writer.rows(rows, await mergedParts(tx, actor, rows));
    return {
      rows: await countObjects(tx, all),
      header: writer.header(),
      sample: sample.map((cells) => cells.map((cell) => (cell === null ? '' : String(cell)))),
    };
  });
}

let downloads = 0;

/**
 * Writes the merged table as CSV into what `open` gives, under one snapshot: rows do not change while it is read, and
 * memory does not grow with it. `open` is called when nothing can be refused any more. The transaction ends with the
 * reader, also with one who goes away in the middle; an error behind the first byte destroys the output.
 */
export async function streamMergedTable(
  context: Context,
  actor: GroupActor,
  recipe: ExportRecipe,
  open: () => Writable,
): Promise<void> {
  if (downloads >= MAX_DOWNLOADS) {
    refuse('too-many-requests', `${MAX_DOWNLOADS} merged tables are being downloaded at this moment.`);
  }
  downloads += 1;
  try {
    await inTransaction(
      context.database,
      actor,
      async (tx) => {
        const chunks = csvChunks(tx, actor, await tableOf(tx, actor, recipe));
        try {
          await pipeline(Readable.from(chunks), open());
        } finally {
          // A page may still be on its way; the connection must not go to anybody else before it has come.
          await chunks.return(undefined);
        }
      },
      'repeatable read',
    );
  } finally {
    downloads -= 1;
  }
}

async function* csvChunks(tx: Tx, actor: GroupActor, { writer, all }: Table): AsyncGenerator<string, void> {
  yield csvLine(writer.header());
  await tx.execute(sql`declare merged_rows no scroll cursor for ${objectsInOrder(all)}`);
  for (;;) {
    const { rows } = await tx.execute<MergedObject & Record<string, unknown>>(
      sql`fetch ${sql.raw(String(PAGE_OBJECTS))} from merged_rows`,
    );
    if (rows.length === 0) return;
    const parts = await mergedParts(tx, actor, rows);
    yield writer.rows(rows, parts).map(csvLine).join('');
  }
}
