import { sql, type SQL } from 'drizzle-orm';
import { z } from 'zod';
import { inTransaction, type Tx } from '../../db/client';
import { nameKey } from '../../shared/astro/designations';
import { raHalfWidthDeg, separationArcsec, wrapRaDeg } from '../../shared/astro/sphere';
import type { ObjectSummary, objectQuery } from '../../shared/schemas/object';
import type { Context, GroupActor } from '../context';
import { found, refuse } from '../errors';
import { decodeCursor, encodeCursor } from './cursor';
import { liveIdOf } from './live-object';
import { bigintArray } from './verdict-log';

type ObjectQuery = z.output<typeof objectQuery>;

/** What a cone over the registry may hold; beyond it the person is asked for a smaller radius. */
const MAX_CONE_OBJECTS = 10_000;
/** Above this many objects a filtered list is not counted: counting would cost more than the page. */
const MAX_COUNTED = 100_000;
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
    const filters = await filtersOf(tx, actor, query);
    const cone = coneOf(query);
    return cone === null ? sortedPage(tx, filters, query) : conePage(tx, cone, filters, query);
  });
}

function coneOf({ ra, dec, radiusArcsec }: ObjectQuery): Cone | null {
  if (ra !== undefined && dec !== undefined && radiusArcsec !== undefined) return { raDeg: ra, decDeg: dec, radiusArcsec };
  const given = { ra, dec, radiusArcsec };
  const missing = Object.entries(given).filter(([, value]) => value === undefined);
  if (missing.length === Object.keys(given).length) return null;
  refuse('bad-request', 'A cone needs a right ascension, a declination and a radius.', {
    errors: missing.map(([path]) => ({ path, message: 'is missing' })),
  });
}

/** Live objects of a group, as `o`. */
export function liveObjectsOf(actor: GroupActor): SQL[] {
  return [sql`o.group_id = ${actor.groupId}`, sql`o.merged_into is null`];
}

async function filtersOf(tx: Tx, actor: GroupActor, query: ObjectQuery): Promise<SQL[]> {
  const filters = liveObjectsOf(actor);
  if (query.minEntries !== undefined) filters.push(sql`o.entries >= ${query.minEntries}`);
  if (query.name !== undefined && query.name.trim() !== '') filters.push(bearsPartOfName(actor, nameKey(query.name)));
  if (query.catalogue !== undefined) {
    const { rows } = await tx.execute<{ id: number }>(
      sql`select id from catalogue where group_id = ${actor.groupId} and label = ${query.catalogue}`,
    );
    filters.push(standsIn(found(rows[0], `catalogue ${query.catalogue}`).id));
  }
  return filters;
}

function bearsPartOfName(actor: GroupActor, key: string): SQL {
  if (key === '') return sql`false`;
  const pattern = `%${key.replace(/[\\%_]/g, '\\$&')}%`;
  return sql`o.id in (select ${liveIdOf('b')} from alias a join object b on b.id = a.object_id
    where a.group_id = ${actor.groupId} and a.retired_at is null and a.key like ${pattern})`;
}

/** That a live object `o` has an entry of a catalogue: looked up from the object, so that a page can stop at its last row. */
export function standsIn(catalogueId: number): SQL {
  return sql`(exists (select 1 from entry e where e.id = o.id and e.catalogue_id = ${catalogueId})
    or exists (select 1 from object b join entry e on e.id = b.id and e.catalogue_id = ${catalogueId}
      where b.merged_into = o.id))`;
}

interface Cone {
  raDeg: number;
  decDeg: number;
  radiusArcsec: number;
}

/** Live objects within a cone, the nearest first, all of them; refuses a cone that holds too many. */
export async function objectsInCone(
  tx: Tx,
  centre: Cone,
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
function windowOf({ raDeg, decDeg, radiusArcsec }: Cone): SQL[] {
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
  centre: Cone,
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
    // Who turns the pages has seen the number on the first one.
    total: after === null ? await countUpTo(tx, filters, query) : null,
  };
}

/** Objects under the filters; null when a filter leaves more than can be counted in the time of a page. */
async function countUpTo(tx: Tx, filters: readonly SQL[], query: ObjectQuery): Promise<number | null> {
  const isFiltered = (query.name ?? query.catalogue ?? query.minEntries) !== undefined;
  const { rows } = await tx.execute<{ n: number }>(sql`
    select count(*) as n from (select 1 from object o where ${sql.join([...filters], sql` and `)}
      ${isFiltered ? sql`limit ${MAX_COUNTED + 1}` : sql``}) as counted`);
  const n = Number(rows[0]?.n ?? 0);
  return isFiltered && n > MAX_COUNTED ? null : n;
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
