import { sql, type SQL } from 'drizzle-orm';
import { z } from 'zod';
import { inTransaction, type Tx } from '../../db/client';
import { nameKey } from '../../shared/astro/designations';
import { raHalfWidthDeg, separationArcsec, wrapRaDeg } from '../../shared/astro/sphere';
import type { ObjectSummary, objectQuery } from '../../shared/schemas/object';
import type { Context, GroupActor } from '../context';
import { refuse } from '../errors';
import { decodeCursor, encodeCursor } from './cursor';
import { bigintArray } from './verdict-log';

type ObjectQuery = z.output<typeof objectQuery>;

/** What a cone over the registry may hold; beyond it the person is asked for a smaller radius. */
const MAX_CONE_OBJECTS = 10_000;
/** Lists are counted up to here; longer ones are told without a number. */
const MAX_COUNTED = 1_000_000;
const ZONES_PER_DEG = 10;
const ARCSEC_PER_DEG = 3600;
/** The window is this much wider than the cone; the separation decides. */
const WINDOW_PAD = 1 + 1e-9;

export interface ObjectRow {
  id: number;
  number: number;
  name: string;
  raDeg: number;
  decDeg: number;
  errArcsec: number | null;
  entries: number;
  [key: string]: unknown;
}

export const OBJECT_COLUMNS = sql`o.id, o.number, o.name, o.ra_deg as "raDeg", o.dec_deg as "decDeg",
  o.err_arcsec as "errArcsec", o.entries`;

/** Live objects of the group: filtered, sorted, a keyset page at a time; a cone gives the nearest first. */
export async function listObjects(
  context: Context,
  actor: GroupActor,
  query: ObjectQuery,
): Promise<{ items: ObjectSummary[]; next: string | null; total: number | null }> {
  return inTransaction(context.database, actor, async (tx) => {
    const filters = filtersOf(actor, query);
    if (query.ra !== undefined && query.dec !== undefined && query.radiusArcsec !== undefined) {
      return conePage(tx, { raDeg: query.ra, decDeg: query.dec, radiusArcsec: query.radiusArcsec }, filters, query);
    }
    return sortedPage(tx, filters, query);
  });
}

function filtersOf(actor: GroupActor, query: ObjectQuery): SQL[] {
  const filters = [sql`o.group_id = ${actor.groupId}`, sql`o.merged_into is null`];
  if (query.minEntries !== undefined) filters.push(sql`o.entries >= ${query.minEntries}`);
  const key = query.name === undefined ? '' : nameKey(query.name);
  if (key !== '') {
    const pattern = `%${key.replace(/[\\%_]/g, '\\$&')}%`;
    filters.push(sql`o.id in (select coalesce(b.merged_into, b.id) from alias a join object b on b.id = a.object_id
      where a.group_id = ${actor.groupId} and a.retired_at is null and a.key like ${pattern})`);
  }
  if (query.catalogue !== undefined) {
    filters.push(sql`o.id in (select coalesce(b.merged_into, b.id) from entry e join object b on b.id = e.id
      where e.catalogue_id = (select id from catalogue where group_id = ${actor.groupId} and label = ${query.catalogue}))`);
  }
  return filters;
}

/** Live objects within a cone, the nearest first, all of them; refuses a cone that holds too many. */
export async function objectsInCone(
  tx: Tx,
  centre: { raDeg: number; decDeg: number; radiusArcsec: number },
  filters: readonly SQL[],
): Promise<(ObjectRow & { sepArcsec: number })[]> {
  const { rows } = await tx.execute<ObjectRow>(sql`
    select ${OBJECT_COLUMNS} from object o
    where ${sql.join([...filters, ...windowOf(centre)], sql` and `)} limit ${MAX_CONE_OBJECTS + 1}`);
  if (rows.length > MAX_CONE_OBJECTS) {
    refuse('bad-request', `More than ${MAX_CONE_OBJECTS} objects lie around that position.`, {
      hint: 'Choose a smaller radius.',
    });
  }
  return rows
    .map((row) => ({ ...row, sepArcsec: separationArcsec(centre.raDeg, centre.decDeg, row.raDeg, row.decDeg) }))
    .filter((row) => row.sepArcsec <= centre.radiusArcsec)
    .sort((a, b) => a.sepArcsec - b.sepArcsec || a.number - b.number);
}

/**
 * The box around a cone: declination zones first (Gray, Nieto-Santisteban & Szalay 2006), then a window in right
 * ascension, in two parts across 0/360, and all of it where the cone touches a pole.
 */
function windowOf({ raDeg, decDeg, radiusArcsec }: { raDeg: number; decDeg: number; radiusArcsec: number }): SQL[] {
  const radiusDeg = (radiusArcsec * WINDOW_PAD) / ARCSEC_PER_DEG;
  const low = Math.max(-90, decDeg - radiusDeg);
  const high = Math.min(90, decDeg + radiusDeg);
  const zoneOf = (deg: number) => Math.floor((deg + 90) * ZONES_PER_DEG);
  // One zone more on either side: the database's floor may round the other way at a border.
  const zones = sql`o.zone between ${zoneOf(low) - 1} and ${zoneOf(high) + 1}`;
  const halfWidth = raHalfWidthDeg(radiusArcsec * WINDOW_PAD, decDeg);
  const decs = sql`o.dec_deg between ${low} and ${high}`;
  if (halfWidth >= 180) return [zones, decs];
  const from = wrapRaDeg(raDeg - halfWidth);
  const to = wrapRaDeg(raDeg + halfWidth);
  const ras =
    from <= to
      ? sql`o.ra_deg between ${from} and ${to}`
      : sql`(o.ra_deg >= ${from} or o.ra_deg <= ${to})`;
  return [zones, decs, ras];
}

const coneCursor = z.tuple([z.number(), z.number()]);

async function conePage(
  tx: Tx,
  centre: { raDeg: number; decDeg: number; radiusArcsec: number },
  filters: readonly SQL[],
  query: ObjectQuery,
) {
  const all = await objectsInCone(tx, centre, filters);
  const after = query.after === undefined ? null : decodeCursor(coneCursor, query.after);
  const rest =
    after === null
      ? all
      : all.filter((row) => row.sepArcsec > after[0] || (row.sepArcsec === after[0] && row.number > after[1]));
  const shown = rest.slice(0, query.limit);
  const last = shown.at(-1);
  return {
    items: await summaries(tx, shown),
    next: rest.length > query.limit && last !== undefined ? encodeCursor([last.sepArcsec, last.number]) : null,
    total: all.length,
  };
}

const SORTS = {
  number: { expression: sql`o.number`, type: sql`bigint` },
  name: { expression: sql`o.name`, type: sql`text` },
  ra: { expression: sql`o.ra_deg`, type: sql`double precision` },
  dec: { expression: sql`o.dec_deg`, type: sql`double precision` },
  entries: { expression: sql`o.entries`, type: sql`integer` },
} as const;

const sortCursor = z.tuple([z.union([z.string(), z.number()]), z.number()]);

async function sortedPage(tx: Tx, filters: readonly SQL[], query: ObjectQuery) {
  const { expression, type } = SORTS[query.sort];
  const direction = query.order === 'asc' ? sql`asc` : sql`desc`;
  const beyond = query.order === 'asc' ? sql`>` : sql`<`;
  const after = query.after === undefined ? null : decodeCursor(sortCursor, query.after);
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
    items: await summaries(tx, shown.map((row) => ({ ...row, sepArcsec: null }))),
    next: rows.length > query.limit && last !== undefined ? encodeCursor([last.sortValue, last.number]) : null,
    total: await countUpTo(tx, filters),
  };
}

async function countUpTo(tx: Tx, filters: readonly SQL[]): Promise<number | null> {
  const { rows } = await tx.execute<{ n: number }>(sql`
    select count(*) as n from (select 1 from object o where ${sql.join([...filters], sql` and `)}
      limit ${MAX_COUNTED + 1}) as counted`);
  const n = Number(rows[0]?.n ?? 0);
  return n > MAX_COUNTED ? null : n;
}

/** Adds to each object the labels of the catalogues it stands in. */
export async function summaries(
  tx: Tx,
  rows: readonly (ObjectRow & { sepArcsec: number | null })[],
): Promise<ObjectSummary[]> {
  const labels = await labelsOf(
    tx,
    rows.map((row) => row.id),
  );
  return rows.map((row) => ({
    number: row.number,
    name: row.name,
    raDeg: row.raDeg,
    decDeg: row.decDeg,
    errArcsec: row.errArcsec,
    entries: row.entries,
    catalogues: labels.get(row.id) ?? [],
    sepArcsec: row.sepArcsec,
  }));
}

/** The entries of live objects: entry id -> id of its live object. */
export async function bornInto(tx: Tx, liveIds: readonly number[]): Promise<Map<number, number>> {
  const list = bigintArray(liveIds);
  const { rows } = await tx.execute<{ id: number; live: number }>(sql`
    select id, id as live from object where id = any(${list})
    union all select id, merged_into from object where merged_into = any(${list})`);
  return new Map(rows.map((row) => [row.id, row.live]));
}

/** Labels of the catalogues that live objects stand in, in order of arrival. */
async function labelsOf(tx: Tx, ids: readonly number[]): Promise<Map<number, string[]>> {
  if (ids.length === 0) return new Map();
  const born = await bornInto(tx, ids);
  const { rows } = await tx.execute<{ id: number; label: string }>(sql`
    select e.id, c.label from entry e join catalogue c on c.id = e.catalogue_id
    where e.id = any(${bigintArray(born.keys())}) order by c.ordinal`);
  const labels = new Map<number, string[]>();
  for (const { id, label } of rows) {
    const live = born.get(id) ?? id;
    const known = labels.get(live);
    if (known === undefined) labels.set(live, [label]);
    else if (!known.includes(label)) known.push(label);
  }
  return labels;
}
