import { sql, type SQL } from 'drizzle-orm';
import type { z } from 'zod';
import type { Tx } from '../../db/client';
import { nameKey } from '../../shared/astro/designations';
import type { objectQuery } from '../../shared/schemas/object';
import type { GroupActor } from '../context';
import { found, refuse } from '../errors';
import { liveIdOf } from './live-object';
import type { Cone } from './object-cone';
import { bigintArray } from './verdict-log';

export type ObjectQuery = z.output<typeof objectQuery>;

/** A filter that fits more than this many objects is wide: a list under it is not counted, and read row by row. */
const WIDE = 10_000;

/** Live objects of a group, as `o`. */
export function liveObjectsOf(actor: GroupActor): SQL[] {
  return [sql`o.group_id = ${actor.groupId}`, sql`o.merged_into is null`];
}

/** The cone of a query; null without one. Refuses a cone of which a part is missing. */
export function coneOf({ ra, dec, radiusArcsec }: ObjectQuery): Cone | null {
  if (ra !== undefined && dec !== undefined && radiusArcsec !== undefined)
    return { raDeg: ra, decDeg: dec, radiusArcsec };
  const parts = Object.entries({ ra, dec, radiusArcsec });
  const missing = parts.filter(([, value]) => value === undefined);
  if (missing.length === parts.length) return null;
  refuse('bad-request', 'A cone needs a right ascension, a declination and a radius.', {
    errors: missing.map(([path]) => ({ path, message: 'is missing' })),
  });
}

/**
 * A condition on `o` in two forms that mean the same: `each` asks every object for itself, so that few rows (a cone, a
 * page in the order of an index) are answered at once; `all` makes the set first, for whole lists.
 */
interface Condition {
  each: SQL;
  all: SQL;
  wide: boolean;
}

/** The conditions of a query on live objects `o`, and whether they leave few enough to be counted. */
export async function filtersOf(
  tx: Tx,
  actor: GroupActor,
  query: ObjectQuery,
): Promise<{ filters: SQL[]; countable: boolean }> {
  const conditions: Condition[] = [];
  if (query.name !== undefined && query.name.trim() !== '') {
    conditions.push(await bearsPartOfName(tx, actor, nameKey(query.name)));
  }
  if (query.catalogue !== undefined) conditions.push(await standsIn(tx, actor, query.catalogue));
  const few = coneOf(query) !== null;
  const pick = ({ each, all, wide }: Condition) => (few || (wide && query.sort === 'number') ? each : all);
  const atLeast = query.minEntries === undefined ? [] : [sql`o.entries >= ${query.minEntries}`];
  return {
    filters: [...liveObjectsOf(actor), ...atLeast, ...conditions.map(pick)],
    countable: conditions.every((one) => !one.wide),
  };
}

async function bearsPartOfName(tx: Tx, actor: GroupActor, key: string): Promise<Condition> {
  if (key === '') return { each: sql`false`, all: sql`false`, wide: false };
  const pattern = `%${key.replace(/[\\%_]/g, '\\$&')}%`;
  const bearing = sql`a.group_id = ${actor.groupId} and a.retired_at is null and a.key like ${pattern}`;
  const { rows } = await tx.execute<{ live: number }>(sql`
    select ${liveIdOf('b')} as live from (select a.object_id from alias a where ${bearing} limit ${WIDE + 1}) named
    join object b on b.id = named.object_id`);
  if (rows.length <= WIDE) {
    const listed = sql`o.id = any(${bigintArray(new Set(rows.map((row) => row.live)))})`;
    return { each: listed, all: listed, wide: false };
  }
  return {
    each: sql`(select count(*) from object b join alias a on a.object_id = b.id
      where (b.id = o.id or b.merged_into = o.id) and ${bearing}) > 0`,
    all: sql`o.id in (select ${liveIdOf('b')} from alias a join object b on b.id = a.object_id where ${bearing})`,
    wide: true,
  };
}

async function standsIn(tx: Tx, actor: GroupActor, label: string): Promise<Condition> {
  const { rows } = await tx.execute<{ id: number; sources: number | null }>(sql`
    select c.id, (select r.sources from catalogue_revision r where r.catalogue_id = c.id order by r.number desc limit 1) as sources
    from catalogue c where c.group_id = ${actor.groupId} and c.label = ${label}`);
  const { id, sources } = found(rows[0], `catalogue ${label}`);
  return { each: hasEntryIn(id), all: amongThoseIn(id), wide: (sources ?? 0) > WIDE };
}

/** That the live object `o` has an entry of a catalogue, asked object by object. */
export function hasEntryIn(catalogueId: number): SQL {
  return sql`(select count(*) from object b join entry e on e.id = b.id and e.catalogue_id = ${catalogueId}
    where b.id = o.id or b.merged_into = o.id) > 0`;
}

/** The same, asked of the catalogue as a whole. */
export function amongThoseIn(catalogueId: number): SQL {
  return sql`o.id in (select ${liveIdOf('b')} from entry e join object b on b.id = e.id where e.catalogue_id = ${catalogueId})`;
}
