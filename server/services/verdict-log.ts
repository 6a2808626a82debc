import { sql, type SQL } from 'drizzle-orm';
import type { Tx } from '../../db/client';
import { verdict } from '../../db/schema/verdict';
import type { VerdictInForce } from '../../shared/schemas/run';
import type { Flag, Grade, VerdictValue } from '../../shared/words';
import type { GroupActor } from '../context';

/** A verdict of a person, before it is written; the pair in any order. */
export interface SpokenVerdict {
  entryA: number;
  entryB: number;
  value: VerdictValue;
  grade: Grade | null;
  flags: Flag[];
  remark: string;
  runId: number | null;
}

/** A JavaScript list of whole numbers as one PostgreSQL array parameter; lists of a million pass in one piece. */
export function bigintArray(values: Iterable<number>): SQL {
  return sql`${`{${[...values].join(',')}}`}::bigint[]`;
}

/** Appends verdicts of a person in the order given and puts them in force; returns their ids in that order. */
export async function appendVerdicts(
  tx: Tx,
  actor: GroupActor,
  spoken: readonly SpokenVerdict[],
): Promise<number[]> {
  if (spoken.length === 0) return [];
  const rows = await tx
    .insert(verdict)
    .values(
      spoken.map(({ entryA, entryB, ...rest }) => ({
        ...rest,
        groupId: actor.groupId,
        entryA: Math.min(entryA, entryB),
        entryB: Math.max(entryA, entryB),
        personId: actor.personId,
      })),
    )
    .returning({ id: verdict.id });
  const ids = rows.map((row) => row.id);
  await refreshInForce(
    tx,
    actor,
    sql`select entry_a, entry_b from verdict where id = any(${bigintArray(ids)})`,
  );
  return ids;
}

/** Appends rows that take the verdicts with these ids back (none of them taken back before), and refreshes what is in force. */
export async function takeBack(tx: Tx, actor: GroupActor, verdictIds: readonly number[]): Promise<void> {
  const ids = bigintArray(verdictIds);
  await tx.execute(sql`
    insert into verdict (group_id, entry_a, entry_b, person_id, takes_back)
    select group_id, entry_a, entry_b, ${actor.personId}::int, id from verdict
    where group_id = ${actor.groupId} and id = any(${ids}) order by id`);
  await refreshInForce(tx, actor, sql`select entry_a, entry_b from verdict where id = any(${ids})`);
}

/**
 * Brings `verdict_in_force` up to date for the pairs that a query names (the few of an act of a person): the latest
 * verdict that was not taken back counts; a pair without one has no row.
 */
async function refreshInForce(tx: Tx, actor: GroupActor, pairs: SQL): Promise<void> {
  await tx.execute(sql`
    with pair as materialized (select distinct entry_a, entry_b from (${pairs}) named),
    latest as (
      select distinct on (v.entry_a, v.entry_b) v.* from pair p
      join verdict v on v.group_id = ${actor.groupId} and v.entry_a = p.entry_a and v.entry_b = p.entry_b
      where v.value is not null and not exists (select 1 from verdict t where t.takes_back = v.id)
      order by v.entry_a, v.entry_b, v.id desc),
    gone as (
      delete from verdict_in_force f using pair p
      where f.group_id = ${actor.groupId} and f.entry_a = p.entry_a and f.entry_b = p.entry_b
        and not exists (select 1 from latest l where l.entry_a = p.entry_a and l.entry_b = p.entry_b))
    insert into verdict_in_force (group_id, entry_a, entry_b, verdict_id, value, grade, policy_id)
    select group_id, entry_a, entry_b, id, value, grade, policy_id from latest
    on conflict (entry_a, entry_b) do update set verdict_id = excluded.verdict_id, value = excluded.value,
      grade = excluded.grade, policy_id = excluded.policy_id
    where verdict_in_force.verdict_id <> excluded.verdict_id`);
}

/** The verdict `v` by person `p` as JSON in the shape of the contract; null where there is none. */
export const verdictJson = sql`case when v.id is not null then json_build_object(
  'id', v.id, 'value', v.value, 'grade', v.grade, 'flags', v.flags, 'remark', v.remark,
  'origin', case when v.policy_id is null then 'person' else 'policy' end, 'by', p.name,
  'at', to_char(v.at at time zone 'UTC', 'YYYY-MM-DD"T"HH24:MI:SS.MS"Z"')) end`;

/** The verdict in force on a pair, as people see it. */
export async function verdictOnPair(
  tx: Tx,
  actor: GroupActor,
  entryA: number,
  entryB: number,
): Promise<VerdictInForce | null> {
  const { rows } = await tx.execute<{ verdict: VerdictInForce }>(sql`
    select ${verdictJson} as verdict from verdict_in_force f
    join verdict v on v.id = f.verdict_id
    join person p on p.id = v.person_id
    where f.group_id = ${actor.groupId}
      and f.entry_a = ${Math.min(entryA, entryB)} and f.entry_b = ${Math.max(entryA, entryB)}`);
  return rows[0]?.verdict ?? null;
}

/** Every verdict that was given on a pair, the latest first, and whether it was taken back. */
export async function verdictsOnPair(
  tx: Tx,
  actor: GroupActor,
  entryA: number,
  entryB: number,
): Promise<(VerdictInForce & { takenBack: boolean })[]> {
  const { rows } = await tx.execute<{ verdict: VerdictInForce; takenBack: boolean }>(sql`
    select ${verdictJson} as verdict, exists (select 1 from verdict t where t.takes_back = v.id) as "takenBack"
    from verdict v join person p on p.id = v.person_id
    where v.group_id = ${actor.groupId} and v.value is not null
      and v.entry_a = ${Math.min(entryA, entryB)} and v.entry_b = ${Math.max(entryA, entryB)}
    order by v.id desc limit 200`);
  return rows.map(({ verdict, takenBack }) => ({ ...verdict, takenBack }));
}
