import { sql } from 'drizzle-orm';
import type { Tx } from '../../db/client';
import type { GroupActor } from '../context';
import type { MergedMember, MergedParts } from './merged-row';
import { currentRevisionIds } from './near-sources';
import { bornInto } from './object-summaries';
import { bigintArray } from './verdict-log';

/**
 * Members, names and verdicts of live objects. Each is looked up by its own index from a plain list of ids and put
 * together here: joins over a list whose length the planner cannot know end in plans that take the square of the time.
 */
export async function mergedParts(
  tx: Tx,
  actor: GroupActor,
  objects: readonly { id: number }[],
): Promise<MergedParts> {
  const born = await bornInto(
    tx,
    objects.map((one) => one.id),
  );
  const ids = bigintArray(born.keys());
  const liveOf = (entryId: number) => born.get(entryId) ?? 0;
  const revisionIds = await currentRevisionIds(tx, actor);
  const members = await tx.execute<Omit<MergedMember, 'live'> & { entryId: number }>(sql`
    select s.entry_id as "entryId", c.label, s.ra_deg as "raDeg", s.dec_deg as "decDeg", s.cells
    from source s
    join catalogue_revision r on r.id = s.revision_id
    join catalogue c on c.id = r.catalogue_id
    where s.entry_id = any(${ids}) and s.revision_id = any(${sql.param(revisionIds)}::int[])
    order by c.ordinal, s.row_no`);
  const labelOf = new Map(members.rows.map((member) => [member.entryId, member.label]));
  const names = await tx.execute<{ entryId: number; byPerson: boolean; name: string }>(sql`
    select object_id as "entryId", origin = 'person' as "byPerson", name from alias
    where object_id = any(${ids}) and retired_at is null order by object_id, id`);
  const verdicts = await tx.execute<{ a: number; b: number; grade: string | null }>(sql`
    select entry_a as a, entry_b as b, grade from verdict_in_force where entry_a = any(${ids}) and value = 'same'`);
  return {
    members: members.rows.map(({ entryId, ...member }) => ({ ...member, live: liveOf(entryId) })),
    names: names.rows.map(({ entryId, byPerson, name }) => ({
      live: liveOf(entryId),
      label: byPerson ? null : (labelOf.get(entryId) ?? null),
      name,
    })),
    // A verdict that leads out of the object was not carried out and does not hold it together.
    grades: verdicts.rows
      .filter((one) => liveOf(one.a) === liveOf(one.b))
      .map((one) => ({ live: liveOf(one.a), grade: one.grade })),
  };
}
