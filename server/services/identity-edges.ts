import { sql, type SQL } from 'drizzle-orm';
import type { Tx } from '../../db/client';
import type { GroupActor } from '../context';
import { bigintArray } from './verdict-log';

export type Pair = [entryA: number, entryB: number];

/** The verdicts in force that decide identity: 'same' in the order of verdict id, 'different' in any order. */
export interface IdentityEdges {
  same: Pair[];
  different: Pair[];
  /** Verdict ids, index by index. */
  sameIds: number[];
  differentIds: number[];
}

export function pairKey([x, y]: readonly [number, number]): string {
  return x < y ? `${x}~${y}` : `${y}~${x}`;
}

/** A look-up from a pair to the verdict in force on it. */
export function verdictIdsByPair(edges: IdentityEdges): (pair: Pair) => number {
  const ids = new Map<string, number>();
  edges.same.forEach((pair, i) => ids.set(pairKey(pair), edges.sameIds[i] ?? 0));
  edges.different.forEach((pair, i) => ids.set(pairKey(pair), edges.differentIds[i] ?? 0));
  return (pair) => {
    const id = ids.get(pairKey(pair));
    if (id === undefined) throw new RangeError(`no verdict in force on the pair ${pairKey(pair)}`);
    return id;
  };
}

/**
 * The given entries and all that 'same' verdicts in force connect with them, ascending. A pass over this closure
 * gives the same answer as one over the whole group: no 'same' verdict leaves it.
 */
export async function selectConnected(
  tx: Tx,
  actor: GroupActor,
  entries: readonly number[],
): Promise<number[]> {
  return selectReachable(tx, actor, entries, null);
}

/** As `selectConnected`, with the candidates of a run that meet a condition (on `c`) as further links. */
export async function selectReachable(
  tx: Tx,
  actor: GroupActor,
  entries: readonly number[],
  candidates: { runId: number; condition: SQL } | null,
): Promise<number[]> {
  const same = sql`f.group_id = ${actor.groupId} and f.value = 'same'`;
  const links = [
    sql`select f.entry_b as id from verdict_in_force f where f.entry_a = r.id and ${same}`,
    sql`select f.entry_a from verdict_in_force f where f.entry_b = r.id and ${same}`,
  ];
  if (candidates !== null) {
    const fits = sql`c.run_id = ${candidates.runId} and ${candidates.condition}`;
    links.push(sql`select c.entry_b from candidate c where c.entry_a = r.id and ${fits}`);
    links.push(sql`select c.entry_a from candidate c where c.entry_b = r.id and ${fits}`);
  }
  const { rows } = await tx.execute<{ id: number }>(sql`
    with recursive reached (id) as (
      select * from unnest(${bigintArray(entries)}) as seed (id)
      union
      select next.id from reached r cross join lateral (${sql.join(links, sql` union all `)}) as next)
    select id from reached order by id`);
  return rows.map((row) => row.id);
}

/** Entries whose objects are not as they were born: those that forward, or hold other entries. */
export async function selectMoved(tx: Tx, actor: GroupActor): Promise<number[]> {
  const { rows } = await tx.execute<{ id: number }>(sql`
    select id from object where group_id = ${actor.groupId} and (merged_into is not null or entries <> 1)
    order by id`);
  return rows.map((row) => row.id);
}

/** Entries that a 'different' verdict in force names: only around them can there be conflicts. */
export async function selectKeptApart(tx: Tx, actor: GroupActor): Promise<number[]> {
  const { rows } = await tx.execute<{ id: number }>(sql`
    select entry_a as id from verdict_in_force where group_id = ${actor.groupId} and value = 'different'
    union select entry_b from verdict_in_force where group_id = ${actor.groupId} and value = 'different'
    order by id`);
  return rows.map((row) => row.id);
}

/** The deciding verdicts in force among a closure of entries; all of the group when null. */
export async function selectEdges(
  tx: Tx,
  actor: GroupActor,
  entries: readonly number[] | null,
): Promise<IdentityEdges> {
  const edges: IdentityEdges = { same: [], different: [], sameIds: [], differentIds: [] };
  const deciding = sql`f.group_id = ${actor.groupId} and f.value in ('same', 'different')`;
  const from =
    entries === null
      ? sql`verdict_in_force f where ${deciding}`
      : sql`member x join verdict_in_force f on f.entry_a = x.id join member y on y.id = f.entry_b where ${deciding}`;
  const { rows } = await tx.execute<{ a: number; b: number; id: number; value: 'same' | 'different' }>(sql`
    with member as materialized (select id from unnest(${bigintArray(entries ?? [])}) as m (id))
    select f.entry_a as a, f.entry_b as b, f.verdict_id as id, f.value from ${from}
    order by f.verdict_id`);
  for (const row of rows) {
    edges[row.value].push([row.a, row.b]);
    (row.value === 'same' ? edges.sameIds : edges.differentIds).push(row.id);
  }
  return edges;
}
