import { sql } from 'drizzle-orm';
import type { Tx } from '../../db/client';
import type { GroupActor } from '../context';
import { partitionEntries } from '../engine/partition';
import { selectConnected, selectEdges, selectMoved, type IdentityEdges } from './identity-edges';
import { writeComponents, type Written } from './identity-write';
import { liveIdOf } from './live-object';
import { lockRegistry } from './registry-lock';
import { bigintArray } from './verdict-log';

/** A 'same' verdict that is not carried out, with the pair that forbids it and the chain between. */
export type Refused = ReturnType<typeof partitionEntries>['refused'][number];

/** What a pass looks at: everything connected with some entries, or the whole group. */
export type IdentityScope = { entries: readonly number[] } | 'group';

export interface IdentityOutcome extends Written {
  /** 'same' verdicts in the scope that are not carried out, in the order of verdict id. */
  refused: Refused[];
  edges: IdentityEdges;
}

/**
 * Brings the objects in scope to what the verdicts in force say: the only writer of identity.
 *
 * The rule: 'same' verdicts are taken in the order of their ids; one that would put a pair with a 'different'
 * verdict into one component is not carried out. The live object of a component is the one with the lowest number.
 * The partition runs inside the transaction although engine work otherwise does not: it must see exactly the
 * verdicts that the registry lock protects.
 */
export async function applyIdentity(
  tx: Tx,
  actor: GroupActor,
  scope: IdentityScope,
): Promise<IdentityOutcome> {
  await lockRegistry(tx, actor);
  const whole = scope === 'group';
  const entries = whole ? await selectMoved(tx, actor) : await selectConnected(tx, actor, scope.entries);
  const edges = await selectEdges(tx, actor, whole ? null : entries);
  const { components, refused } = partitionEntries(edges);
  const written = await writeComponents(tx, actor, withSingles(components, entries));
  return { ...written, refused, edges };
}

/** The partition knows only entries that stand in a deciding verdict; every other one is a component by itself. */
function withSingles(components: readonly number[][], entries: readonly number[]): number[][] {
  const placed = new Set(components.flat());
  const singles = entries.filter((id) => !placed.has(id)).map((id) => [id]);
  return [...components, ...singles];
}

/** Numbers of the live objects of entries, in the order given; null for an entry without an object. */
export async function liveNumbers(
  tx: Tx,
  actor: GroupActor,
  entries: readonly number[],
): Promise<(number | null)[]> {
  const { rows } = await tx.execute<{ id: number; number: number }>(sql`
    select o.id, live.number from object o join object live on live.id = ${liveIdOf('o')}
    where o.group_id = ${actor.groupId} and o.id = any(${bigintArray(entries)})`);
  const numberOf = new Map(rows.map((row) => [row.id, row.number]));
  return entries.map((entry) => numberOf.get(entry) ?? null);
}
