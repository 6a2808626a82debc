import { sql, type SQL } from 'drizzle-orm';
import type { Tx } from '../../db/client';
import type { FindAnswer } from '../../shared/schemas/find';
import type { GroupActor } from '../context';
import { liveIdOf } from './live-object';
import { difference, inTurns, oneSlipAway, splitKey, type Difference } from './near-names';

/** Behind every text that begins alike: the last code point that a text of PostgreSQL can hold. */
const LAST_CHARACTER = '\u{10ffff}';
const MOST_PER_WAY = 120;
const MOST_ACRONYMS = 300;
const NEIGHBOURS = 40;
/** Groups with more names than this are not searched by trigrams, because that has to compare every name. */
const MOST_FOR_TRIGRAMS = 60_000;
/** Share of common trigrams from which a name counts as near; below, lists are mostly noise (common practice, no source). */
const NEAR_SIMILARITY = 0.45;

interface Named {
  alias: string;
  key: string;
  objectId: number;
  [key: string]: unknown;
}
type Near = Named & { difference: Difference };

/**
 * Names that could have been meant by a key nobody bears, at most `limit`, each with what differs. Looked up by equality and by ranges of
 * the key index, whatever the size of the group: under row-level security PostgreSQL uses neither LIKE nor trigram
 * indexes, because their operators are not leakproof (measured on 1.2 million names: seconds instead of milliseconds).
 */
export async function nearMisses(
  tx: Tx,
  actor: GroupActor,
  key: string,
  limit: number,
): Promise<FindAnswer['nearMisses']> {
  const { acronym, rest } = splitKey(key);
  const acronyms = rest === '' ? [] : await knownAcronyms(tx, actor);
  const others = acronyms.filter((one) => one !== acronym).map((one) => one + rest);
  const direct = [
    ...(await namesWithKeys(tx, actor, [...oneSlipAway(key), ...withoutComponent(key)])),
    ...(await namesWithKeys(tx, actor, others)),
    ...(await namesGoingOn(tx, actor, key)),
  ];
  const named = direct.length > 0 ? direct : await furtherOff(tx, actor, key);
  const near = distinct(named).map((one) => ({ ...one, difference: difference(key, one.key) }));
  return describe(tx, inOrder(near).slice(0, limit));
}

const withoutComponent = (key: string) => [key.replace(/(\d)[a-z]{1,2}$/, '$1')].filter((one) => one !== key);

const namesOfGroup = (actor: GroupActor, where: SQL) => sql`
  select a.name as alias, a.key, a.object_id as "objectId" from alias a
  where a.group_id = ${actor.groupId} and a.retired_at is null and ${where}`;

async function namesWithKeys(tx: Tx, actor: GroupActor, keys: readonly string[]): Promise<Named[]> {
  if (keys.length === 0) return [];
  const { rows } = await tx.execute<Named>(sql`
    ${namesOfGroup(actor, sql`a.key = any(${sql.param([...keys])}::text[])`)} order by a.key, a.id limit ${MOST_PER_WAY}`);
  return rows;
}

async function namesGoingOn(tx: Tx, actor: GroupActor, key: string): Promise<Named[]> {
  const { rows } = await tx.execute<Named>(sql`
    ${namesOfGroup(actor, sql`a.key > ${key} and a.key < ${key + LAST_CHARACTER}`)}
    order by a.key, a.id limit ${NEIGHBOURS}`);
  return rows;
}

/** The beginnings of the group's keys before the first digit, found by jumping over the index from one to the next. */
async function knownAcronyms(tx: Tx, actor: GroupActor): Promise<string[]> {
  const next = (beyond: SQL) => sql`
    select substring(a.key from '^\\D*') from alias a where a.group_id = ${actor.groupId} and ${beyond}
    order by a.key limit 1`;
  const { rows } = await tx.execute<{ acronym: string }>(sql`
    with recursive jump (acronym) as (
      (${next(sql`true`)})
      union all
      select (${next(sql`a.key > jump.acronym || ${LAST_CHARACTER}`)}) from jump where jump.acronym is not null)
    select acronym from jump where acronym is not null limit ${MOST_ACRONYMS}`);
  return rows.map((row) => row.acronym);
}

/** Names more than one slip away: the neighbours in the order of keys, and in smaller groups those with like trigrams. */
async function furtherOff(tx: Tx, actor: GroupActor, key: string): Promise<Named[]> {
  const before = await tx.execute<Named>(sql`
    ${namesOfGroup(actor, sql`a.key < ${key}`)} order by a.key desc, a.id limit ${NEIGHBOURS}`);
  const behind = await tx.execute<Named>(sql`
    ${namesOfGroup(actor, sql`a.key > ${key}`)} order by a.key, a.id limit ${NEIGHBOURS}`);
  // A quarter of the characters may differ: of more, a person would not say that the name is meant.
  const most = Math.max(2, Math.floor(key.length / 4));
  const neighbours = [...before.rows, ...behind.rows].filter((one) => difference(key, one.key).steps <= most);
  return [...neighbours, ...(await withLikeTrigrams(tx, actor, key))];
}

async function withLikeTrigrams(tx: Tx, actor: GroupActor, key: string): Promise<Named[]> {
  const { rows: counted } = await tx.execute<{ n: number }>(sql`
    select count(*) as n from (select 1 from alias where group_id = ${actor.groupId} limit ${MOST_FOR_TRIGRAMS + 1}) names`);
  if (Number(counted[0]?.n) > MOST_FOR_TRIGRAMS) return [];
  const { rows } = await tx.execute<Named>(sql`
    ${namesOfGroup(actor, sql`similarity(a.key, ${key}) >= ${NEAR_SIMILARITY}`)}
    order by similarity(a.key, ${key}) desc, a.id limit ${MOST_PER_WAY}`);
  return rows;
}

function distinct(named: readonly Named[]): Named[] {
  return [...new Map(named.map((one) => [`${one.objectId} ${one.alias}`, one])).values()];
}

/** Component letters and acronyms are likelier than longer names and slips, but every kind gets its turn. */
function inOrder(near: readonly Near[]): Near[] {
  const kinds = ['component', 'acronym', 'longer', 'slip'] as const;
  const sorted = near.toSorted(
    (a, b) => a.difference.steps - b.difference.steps || (a.key < b.key ? -1 : a.key > b.key ? 1 : a.objectId - b.objectId),
  );
  return inTurns(kinds.map((kind) => sorted.filter((one) => one.difference.kind === kind)));
}

async function describe(tx: Tx, near: readonly Near[]): Promise<FindAnswer['nearMisses']> {
  const ids = `{${near.map((one) => one.objectId).join(',')}}`;
  const { rows } = await tx.execute<{ id: number; number: number; name: string }>(sql`
    select b.id, l.number, l.name from object b join object l on l.id = ${liveIdOf('b')} where b.id = any(${ids}::bigint[])`);
  const live = new Map(rows.map((row) => [row.id, row]));
  return near.flatMap((one) => {
    const object = live.get(one.objectId);
    if (object === undefined) return [];
    return [{ alias: one.alias, number: object.number, name: object.name, reason: one.difference.words }];
  });
}
