import { sql } from 'drizzle-orm';
import { inTransaction, type Tx } from '../../db/client';
import type { Conflict } from '../../shared/schemas/verdict';
import type { Context, GroupActor } from '../context';
import { partitionEntries } from '../engine/partition';
import { found } from '../errors';
import { liveNumbers, type Refused } from './identity';
import {
  verdictIdsByPair,
  selectConnected,
  selectEdges,
  selectKeptApart,
  type IdentityEdges,
} from './identity-edges';
import { bigintArray } from './verdict-log';

const MAX_LISTED = 200;

/** 'same' verdicts that are not carried out, in the order of their ids: which chain they would close, and what forbids it. */
export async function listConflicts(
  context: Context,
  actor: GroupActor,
): Promise<{ items: Conflict[]; total: number }> {
  return inTransaction(
    context.database,
    actor,
    async (tx) => {
      const { refused, edges } = await refusedAround(tx, actor, await selectKeptApart(tx, actor));
      return {
        items: await describeConflicts(tx, actor, refused.slice(0, MAX_LISTED), edges),
        total: refused.length,
      };
    },
    'repeatable read',
  );
}

/** Number of conflicts among entries and what is connected with them; over the whole group when null. */
export async function countConflicts(
  tx: Tx,
  actor: GroupActor,
  entries: readonly number[] | null,
): Promise<number> {
  const { refused } = await refusedAround(tx, actor, entries ?? (await selectKeptApart(tx, actor)));
  return refused.length;
}

async function refusedAround(
  tx: Tx,
  actor: GroupActor,
  entries: readonly number[],
): Promise<{ refused: Refused[]; edges: IdentityEdges }> {
  const edges = await selectEdges(tx, actor, await selectConnected(tx, actor, entries));
  return { refused: partitionEntries(edges).refused, edges };
}

type Link = Conflict['a'];

async function describeConflicts(
  tx: Tx,
  actor: GroupActor,
  refused: readonly Refused[],
  edges: IdentityEdges,
): Promise<Conflict[]> {
  const entries = [
    ...new Set(refused.flatMap(({ edge, forbidden, chain }) => [...edge, ...forbidden, ...chain])),
  ];
  const links = await selectLinks(tx, actor, entries);
  const numbers = await liveNumbers(tx, actor, entries);
  const numberOf = new Map(entries.map((entry, i) => [entry, numbers[i] ?? null]));
  const linkOf = (entry: number) => found(links.get(entry), `entry ${entry}`);
  const verdictOf = verdictIdsByPair(edges);
  return refused.map(({ edge, forbidden, chain }) => ({
    sameVerdictId: verdictOf(edge),
    a: linkOf(edge[0]),
    b: linkOf(edge[1]),
    forbiddenA: linkOf(forbidden[0]),
    forbiddenB: linkOf(forbidden[1]),
    differentVerdictId: verdictOf(forbidden),
    chain: chain.map(linkOf),
    objectNumbers: [...new Set(edge.map((entry) => found(numberOf.get(entry), 'object')))].sort(
      (x, y) => x - y,
    ),
  }));
}

/** What entries are called in the newest revision that has them, and in which catalogue they stand. */
async function selectLinks(
  tx: Tx,
  actor: GroupActor,
  entries: readonly number[],
): Promise<Map<number, Link>> {
  const { rows } = await tx.execute<Link & { [key: string]: unknown }>(sql`
    select distinct on (s.entry_id) s.entry_id as "entryId", c.label as catalogue, s.designation
    from source s
    join catalogue_revision r on r.id = s.revision_id
    join catalogue c on c.id = r.catalogue_id
    where s.group_id = ${actor.groupId} and s.entry_id = any(${bigintArray(entries)})
      and s.revision_id in (select id from catalogue_revision where group_id = ${actor.groupId} and state = 'ready')
    order by s.entry_id, s.revision_id desc`);
  return new Map(rows.map((row) => [row.entryId, row]));
}
