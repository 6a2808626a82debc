import { sql } from 'drizzle-orm';
import { inTransaction, type Database, type Scope, type Tx } from '../../db/client';
import { person } from '../../db/schema/person';
import { rebuildRegistry, type LoggedVerdict, type Rebuilt } from './registry-rebuild';

const MAX_REPORTED = 20;

/** What checking one group found. */
export interface RegistryReport {
  group: string;
  objects: number;
  liveObjects: number;
  verdictsInForce: number;
  conflicts: number;
  /** Sentences, the first `MAX_REPORTED` of all differences. */
  differences: string[];
  differenceCount: number;
}

interface StoredObject {
  id: number;
  number: number;
  mergedInto: number | null;
  entries: number;
}

interface StoredInForce {
  entryA: number;
  entryB: number;
  verdictId: number;
  value: string;
}

/** All groups of the installation; row-level security shows them only through their members. */
export async function everyGroup(database: Database): Promise<{ id: number; slug: string }[]> {
  const people = await inTransaction(database, { groupId: null, personId: null }, (tx) =>
    tx.select({ id: person.id }).from(person).orderBy(person.id),
  );
  const groups = new Map<number, string>();
  for (const { id: personId } of people) {
    const { rows } = await inTransaction(database, { groupId: null, personId }, (tx) =>
      tx.execute<{ id: number; slug: string }>(sql`select id, slug from research_group order by id`),
    );
    for (const { id, slug } of rows) groups.set(id, slug);
  }
  return [...groups].map(([id, slug]) => ({ id, slug })).sort((x, y) => x.id - y.id);
}

/** Rebuilds the registry of a group from its verdict log alone and compares it with what is stored. */
export async function checkRegistry(
  database: Database,
  group: { id: number; slug: string },
): Promise<RegistryReport> {
  const scope: Scope = { groupId: group.id, personId: null };
  return inTransaction(
    database,
    scope,
    async (tx) => {
      const log = await selectLog(tx, group.id);
      const objects = await selectObjects(tx, group.id);
      const stored = await selectInForce(tx, group.id);
      const rebuilt = rebuildRegistry(log);
      const all = [...compareInForce(rebuilt, stored), ...compareObjects(rebuilt, objects)];
      return {
        group: group.slug,
        objects: objects.length,
        liveObjects: objects.filter((object) => object.mergedInto === null).length,
        verdictsInForce: rebuilt.inForce.size,
        conflicts: rebuilt.refused.length,
        differences: all.slice(0, MAX_REPORTED),
        differenceCount: all.length,
      };
    },
    'repeatable read',
  );
}

async function selectLog(tx: Tx, groupId: number): Promise<LoggedVerdict[]> {
  const { rows } = await tx.execute<LoggedVerdict & { [key: string]: unknown }>(sql`
    select id, entry_a as "entryA", entry_b as "entryB", value, takes_back as "takesBack"
    from verdict where group_id = ${groupId} order by id`);
  return rows;
}

async function selectObjects(tx: Tx, groupId: number): Promise<StoredObject[]> {
  const { rows } = await tx.execute<StoredObject & { [key: string]: unknown }>(sql`
    select id, number, merged_into as "mergedInto", entries from object where group_id = ${groupId} order by number`);
  return rows;
}

async function selectInForce(tx: Tx, groupId: number): Promise<StoredInForce[]> {
  const { rows } = await tx.execute<StoredInForce & { [key: string]: unknown }>(sql`
    select entry_a as "entryA", entry_b as "entryB", verdict_id as "verdictId", value
    from verdict_in_force where group_id = ${groupId} order by entry_a, entry_b`);
  return rows;
}

function compareInForce({ inForce }: Rebuilt, stored: readonly StoredInForce[]): string[] {
  const differences: string[] = [];
  const left = new Map(inForce);
  for (const { entryA, entryB, verdictId, value } of stored) {
    const key = `${entryA} ${entryB}`;
    const rebuilt = left.get(key);
    left.delete(key);
    if (rebuilt?.id === verdictId && rebuilt.value === value) continue;
    const should =
      rebuilt === undefined ? 'nothing is in force' : `verdict ${rebuilt.id} (${rebuilt.value}) is`;
    differences.push(
      `pair ${entryA}, ${entryB}: stored verdict ${verdictId} (${value}), by the log ${should}`,
    );
  }
  for (const { entryA, entryB, id } of left.values()) {
    differences.push(`pair ${entryA}, ${entryB}: verdict ${id} is in force by the log, but not stored so`);
  }
  return differences;
}

/** `objects` come by number, so the first one seen of a component is its live one. */
function compareObjects({ componentOf }: Rebuilt, objects: readonly StoredObject[]): string[] {
  const differences: string[] = [];
  const liveOf = new Map<Set<number>, StoredObject>();
  const known = new Set<number>();
  for (const object of objects) {
    known.add(object.id);
    const component = componentOf.get(object.id);
    const live = component === undefined ? object : (liveOf.get(component) ?? object);
    if (component !== undefined) liveOf.set(component, live);
    const mergedInto = live === object ? null : live.id;
    const entries = live === object ? (component?.size ?? 1) : 0;
    if (object.mergedInto !== mergedInto) {
      differences.push(
        `object ${object.number}: ${forwards(object.mergedInto)}, by the log ${forwards(mergedInto)}`,
      );
    } else if (object.entries !== entries) {
      differences.push(`object ${object.number}: ${object.entries} entries, by the log ${entries}`);
    }
  }
  for (const entry of componentOf.keys()) {
    if (!known.has(entry)) differences.push(`entry ${entry}: stands in a verdict but has no object`);
  }
  return differences;
}

function forwards(mergedInto: number | null): string {
  return mergedInto === null ? 'is live' : `forwards to the object of entry ${mergedInto}`;
}
