import { sql, type SQL } from 'drizzle-orm';
import { z } from 'zod';
import { inTransaction, type Tx } from '../../db/client';
import type { ObjectSummary } from '../../shared/schemas/object';
import type { Context, GroupActor } from '../context';
import { decodeCursor, encodeCursor } from './cursor';
import { objectsInCone, type Cone } from './object-cone';
import { coneOf, filtersOf, type ObjectQuery } from './object-filters';
import { OBJECT_COLUMNS, summaries, type ObjectRow } from './object-summaries';

/** Above this many objects a filtered list is not counted: counting would cost more than the page. */
const MAX_COUNTED = 100_000;

interface ObjectList {
  items: ObjectSummary[];
  next: string | null;
  total: number | null;
}

/** Live objects of the group: filtered, sorted, a keyset page at a time; a cone gives the nearest first. */
export async function listObjects(
  context: Context,
  actor: GroupActor,
  query: ObjectQuery,
): Promise<ObjectList> {
  return inTransaction(context.database, actor, async (tx) => {
    const { filters, countable } = await filtersOf(tx, actor, query);
    const cone = coneOf(query);
    if (cone !== null) return conePage(tx, cone, filters, query);
    const page = await sortedPage(tx, filters, query);
    // Who turns the pages has seen the number on the first one.
    const counted = countable && query.after === undefined;
    return { ...page, total: counted ? await countUpTo(tx, filters, query) : null };
  });
}

const coneCursor = z.tuple([z.number(), z.number()]);

async function conePage(
  tx: Tx,
  cone: Cone,
  filters: readonly SQL[],
  query: ObjectQuery,
): Promise<ObjectList> {
  const all = await objectsInCone(tx, cone, filters);
  const after = query.after === undefined ? null : decodeCursor(coneCursor, query.after);
  const rest =
    after === null
      ? all
      : all.filter(
          (row) => row.sepArcsec > after[0] || (row.sepArcsec === after[0] && row.number > after[1]),
        );
  const shown = rest.slice(0, query.limit);
  const last = shown.at(-1);
  return {
    items: await summaries(tx, shown),
    next:
      rest.length > query.limit && last !== undefined ? encodeCursor([last.sepArcsec, last.number]) : null,
    total: all.length,
  };
}

const SORTS = {
  number: { expression: sql`o.number`, type: sql`bigint`, value: z.number().int() },
  name: { expression: sql`o.name`, type: sql`text`, value: z.string() },
  ra: { expression: sql`o.ra_deg`, type: sql`double precision`, value: z.number() },
  dec: { expression: sql`o.dec_deg`, type: sql`double precision`, value: z.number() },
  entries: { expression: sql`o.entries`, type: sql`integer`, value: z.number().int() },
} as const;

async function sortedPage(tx: Tx, filters: readonly SQL[], query: ObjectQuery) {
  const { expression, type, value } = SORTS[query.sort];
  const direction = query.order === 'asc' ? sql`asc` : sql`desc`;
  const beyond = query.order === 'asc' ? sql`>` : sql`<`;
  const after =
    query.after === undefined ? null : decodeCursor(z.tuple([value, z.number().int()]), query.after);
  const paged =
    after === null
      ? filters
      : [...filters, sql`(${expression}, o.number) ${beyond} (${after[0]}::${type}, ${after[1]}::bigint)`];
  const { rows } = await tx.execute<ObjectRow & { sortValue: string | number }>(sql`
    select ${OBJECT_COLUMNS}, ${expression} as "sortValue" from object o
    where ${sql.join([...paged], sql` and `)}
    order by ${expression} ${direction}, o.number ${direction} limit ${query.limit + 1}`);
  const shown = rows.slice(0, query.limit);
  const last = shown.at(-1);
  return {
    items: await summaries(
      tx,
      shown.map((row) => ({ ...row, sepArcsec: null })),
    ),
    next:
      rows.length > query.limit && last !== undefined ? encodeCursor([last.sortValue, last.number]) : null,
  };
}

/** Objects under the filters; null when a filter leaves more than can be counted in the time of a page. */
async function countUpTo(tx: Tx, filters: readonly SQL[], query: ObjectQuery): Promise<number | null> {
  const isFiltered = [query.name, query.catalogue, query.minEntries].some((one) => one !== undefined);
  const { rows } = await tx.execute<{ n: number }>(sql`
    select count(*) as n from (select 1 from object o where ${sql.join([...filters], sql` and `)}
      ${isFiltered ? sql`limit ${MAX_COUNTED + 1}` : sql``}) as counted`);
  const n = Number(rows[0]?.n ?? 0);
  return isFiltered && n > MAX_COUNTED ? null : n;
}
