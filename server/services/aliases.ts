import { and, eq, sql } from 'drizzle-orm';
import { inTransaction, type Tx } from '../../db/client';
import { alias } from '../../db/schema/object';
import { nameKey } from '../../shared/astro/designations';
import { roleAtLeast } from '../../shared/words';
import type { Alias } from '../../shared/schemas/object';
import type { Context, GroupActor } from '../context';
import { found, refuse } from '../errors';
import { recordEvent } from './audit';
import { liveIdOf } from './live-object';
import { liveObject } from './object-page';
import { bigintArray } from './verdict-log';

interface AliasRow {
  id: number;
  objectId: number;
  name: string;
  origin: Alias['origin'];
  person: string | null;
  at: Date;
  retiredAt: Date | null;
  contested: boolean;
  [key: string]: unknown;
}

/** All names of a live object with where each came from; retired ones last. */
export async function aliasesOf(
  tx: Tx,
  actor: GroupActor,
  liveId: number,
  ids: readonly number[],
  members: readonly { entryId: number; catalogue: string; rowNo: number }[],
): Promise<Alias[]> {
  const { rows } = await tx.execute<AliasRow>(sql`
    select a.id, a.object_id as "objectId", a.name, a.origin, p.name as person, a.at, a.retired_at as "retiredAt",
      a.retired_at is null and exists (
        select 1 from alias x join object o on o.id = x.object_id
        where x.group_id = ${actor.groupId} and x.key = a.key and x.retired_at is null
          and coalesce(o.merged_into, o.id) <> ${liveId}) as contested
    from alias a left join person p on p.id = a.person_id
    where a.object_id = any(${bigintArray(ids)})
    order by a.retired_at nulls first, a.id`);
  const memberOf = new Map(members.map((member) => [member.entryId, member]));
  return rows.map((row) => {
    const member = row.origin === 'entry' ? memberOf.get(row.objectId) : undefined;
    return {
      id: row.id,
      name: row.name,
      origin: row.origin,
      from: member === undefined ? (row.person ?? 'an earlier revision') : `${member.catalogue} row ${member.rowNo}`,
      catalogue: member?.catalogue ?? null,
      entryId: row.origin === 'entry' ? row.objectId : null,
      at: new Date(row.at).toISOString(),
      retiredAt: row.retiredAt === null ? null : new Date(row.retiredAt).toISOString(),
      contested: row.contested,
    };
  });
}

/** Gives an object a further name, on a person's word. */
export async function addAlias(context: Context, actor: GroupActor, number: number, name: string): Promise<void> {
  const key = nameKey(name);
  if (key === '') {
    refuse('bad-request', 'The name holds no letter or digit.', { errors: [{ path: 'name', message: 'write a name' }] });
  }
  await inTransaction(context.database, actor, async (tx) => {
    const live = await liveObject(tx, actor, number);
    await tx
      .insert(alias)
      .values({ groupId: actor.groupId, objectId: live.id, name, key, origin: 'person', personId: actor.personId });
    await recordEvent(tx, actor, 'name added', `object ${live.number}`, { name });
  });
}

/** Retires a name: it is kept, but leads nowhere any more. Contributors retire their own, curators any. */
export async function retireAlias(context: Context, actor: GroupActor, aliasId: number): Promise<void> {
  await inTransaction(context.database, actor, async (tx) => {
    const [row] = await tx
      .select()
      .from(alias)
      .where(and(eq(alias.id, aliasId), eq(alias.groupId, actor.groupId)))
      .for('update');
    const name = found(row, 'name');
    if (name.personId !== actor.personId && !roleAtLeast(actor.role, 'curator')) {
      refuse('role-too-low', 'Only curators retire names that others gave.');
    }
    if (name.retiredAt !== null) refuse('already-taken-back', 'The name is retired already.');
    await tx.update(alias).set({ retiredAt: sql`now()` }).where(eq(alias.id, aliasId));
    const { rows } = await tx.execute<{ number: number }>(
      sql`select l.number from object o join object l on l.id = ${liveIdOf('o')} where o.id = ${name.objectId}`,
    );
    await recordEvent(tx, actor, 'name retired', `object ${rows[0]?.number ?? 0}`, { name: name.name });
  });
}
