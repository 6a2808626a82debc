import { sql, type SQL } from 'drizzle-orm';
import { z } from 'zod';
import { inTransaction, type Tx } from '../../db/client';
import type { Source, sourceQuery } from '../../shared/schemas/catalogue';
import type { Context, GroupActor } from '../context';
import { refuse } from '../errors';
import { catalogueByLabel } from './catalogues';
import { decodeCursor, encodeCursor } from './cursor';
import { liveIdOf } from './live-object';
import { rowsInCone } from './revision-index';

type SourceQuery = z.output<typeof sourceQuery>;
interface SourcePage {
  items: Source[];
  next: string | null;
  total: number | null;
}

/** What a cone list may hold; beyond it the person is asked for a smaller radius. */
const MAX_CONE_ROWS = 10_000;

const sortCursor = z.tuple([z.union([z.string(), z.number(), z.null()]), z.number().int()]);

/** Rows of a catalogue's newest revision: sorted and filtered by the server, a keyset page at a time. */
export async function listSources(
  context: Context,
  actor: GroupActor,
  label: string,
  query: SourceQuery,
): Promise<SourcePage> {
  return inTransaction(context.database, actor, async (tx) => {
    const { revision } = await catalogueByLabel(tx, actor, label);
    if (revision.state !== 'ready') return { items: [], next: null, total: 0 };
    const rowNumbers = await rowsOfCone(context, actor, revision.id, query);
    const key = sortKey(query.sort, revision.columns);
    const filters = [
      sql`s.revision_id = ${revision.id}`,
      sql`s.group_id = ${actor.groupId}`,
      ...(rowNumbers === null ? [] : [sql`s.row_no = any(${sql.param(rowNumbers)}::int[])`]),
      ...(query.text === undefined || query.text === '' ? [] : [containsText(query.text)]),
    ];
    const paged = query.after === undefined ? filters : [...filters, afterCursor(key, query, query.after)];
    const items = await selectPage(tx, paged, key, query);
    const shown = items.slice(0, query.limit);
    const last = shown.at(-1);
    return {
      items: shown.map(({ sortValue: _sortValue, cells, ...row }) => ({ ...row, cells: cells.split('\u001f') })),
      next: items.length > query.limit && last !== undefined ? encodeCursor([last.sortValue, last.rowNo]) : null,
      total: filters.length === 2 ? revision.sources : await countRows(tx, filters),
    };
  });
}

async function rowsOfCone(
  context: Context,
  actor: GroupActor,
  revisionId: number,
  query: SourceQuery,
): Promise<number[] | null> {
  if (query.ra === undefined || query.dec === undefined || query.radiusArcsec === undefined) return null;
  const centre = { raDeg: query.ra, decDeg: query.dec, radiusArcsec: query.radiusArcsec };
  const hits = await rowsInCone(context, actor, [revisionId], centre, MAX_CONE_ROWS + 1);
  if (hits.length > MAX_CONE_ROWS) {
    refuse('bad-request', `More than ${MAX_CONE_ROWS} sources lie within that radius.`, {
      hint: 'Choose a smaller radius.',
    });
  }
  return hits.map((hit) => hit.rowNo);
}

interface SortKey {
  expression: SQL;
  type: SQL;
}

/** The expression of a sort; a column of numbers is sorted by value, any other as text. */
function sortKey(sort: string, columns: readonly { kind: string }[]): SortKey {
  const text = sql`text`;
  const number = sql`double precision`;
  const original = /^c(\d+)$/.exec(sort)?.[1];
  if (original !== undefined) {
    const index = Number(original);
    const column = columns[index];
    if (column === undefined) refuse('bad-request', `The catalogue has no column ${index + 1}.`);
    const cell = sql`split_part(s.cells, chr(31), ${index + 1}::int)`;
    return column.kind === 'number' ? { expression: sql`cell_number(${cell})`, type: number } : { expression: cell, type: text };
  }
  if (sort === 'designation') return { expression: sql`s.designation`, type: text };
  if (sort === 'ra') return { expression: sql`s.ra_deg`, type: number };
  if (sort === 'dec') return { expression: sql`s.dec_deg`, type: number };
  if (sort === 'error') return { expression: sql`s.err_maj_arcsec::double precision`, type: number };
  return { expression: sql`s.row_no::double precision`, type: number };
}

function containsText(text: string): SQL {
  const pattern = `%${text.toLowerCase().replace(/[\\%_]/g, '\\$&')}%`;
  return sql`(lower(s.designation) like ${pattern} or lower(s.cells) like ${pattern})`;
}

/** Missing values come last whichever way the list is sorted; the row number makes the order total. */
function afterCursor(key: SortKey, { sort, order }: SourceQuery, after: string): SQL {
  const [value, rowNo] = decodeCursor(sortCursor, after);
  if (sort === 'row') return order === 'asc' ? sql`s.row_no > ${rowNo}` : sql`s.row_no < ${rowNo}`;
  const k = key.expression;
  if (value === null) return sql`(${k} is null and s.row_no > ${rowNo})`;
  const v = sql`${value}::${key.type}`;
  const beyond = order === 'asc' ? sql`${k} > ${v}` : sql`${k} < ${v}`;
  return sql`(${beyond} or (${k} = ${v} and s.row_no > ${rowNo}) or ${k} is null)`;
}

interface PageRow extends Omit<Source, 'cells'> {
  cells: string;
  sortValue: string | number | null;
  [key: string]: unknown;
}

async function selectPage(tx: Tx, filters: SQL[], key: SortKey, query: SourceQuery): Promise<PageRow[]> {
  const direction = query.order === 'asc' ? sql`asc` : sql`desc`;
  // By row number the primary key gives the order; the sort expression would hide that from the planner.
  const order =
    query.sort === 'row' ? sql`s.row_no ${direction}` : sql`${key.expression} ${direction} nulls last, s.row_no`;
  const { rows } = await tx.execute<PageRow>(sql`
    with page as (
      select s.*, ${key.expression} as sort_value from source s
      where ${sql.join(filters, sql` and `)} order by ${order} limit ${query.limit + 1})
    select s.entry_id as "entryId", s.row_no as "rowNo", s.designation, s.ra_deg as "raDeg", s.dec_deg as "decDeg",
      s.err_maj_arcsec as "errMajArcsec", s.err_min_arcsec as "errMinArcsec", s.err_pa_deg as "errPaDeg",
      s.pm_ra_mas_yr as "pmRaMasYr", s.pm_dec_mas_yr as "pmDecMasYr", s.cells, live.number as "objectNumber",
      s.sort_value as "sortValue"
    from page s
    left join object o on o.id = s.entry_id
    left join object live on live.id = ${liveIdOf('o')}
    order by s.sort_value ${direction} nulls last, s.row_no`);
  return rows;
}

async function countRows(tx: Tx, filters: SQL[]): Promise<number> {
  const { rows } = await tx.execute<{ n: number }>(
    sql`select count(*) as n from source s where ${sql.join(filters, sql` and `)}`,
  );
  return Number(rows[0]?.n ?? 0);
}
