import { and, desc, eq, ne, sql } from 'drizzle-orm';
import { inTransaction, type Tx } from '../../db/client';
import { auditEvent, membership, researchGroup } from '../../db/schema/group';
import { catalogue, catalogueRevision, storedFile } from '../../db/schema/catalogue';
import { object } from '../../db/schema/object';
import { person } from '../../db/schema/person';
import type { GroupDetail, Member, NewMember } from '../../shared/schemas/group';
import type { Role } from '../../shared/words';
import type { Context, GroupActor, PersonActor } from '../context';
import { found, refuse } from '../errors';
import { recordEvent } from './audit';
import { hashPassword } from './sessions';

const MAX_SLUG_LENGTH = 40;

/** 'The Lantern Field' -> 'the-lantern-field'; 'group' when nothing is left. */
export function slugOf(name: string): string {
  const slug = name
    .normalize('NFKD')
    .replace(/[\u0300-\u036f]/g, '')
    .toLowerCase()
    .replace(/[^a-z0-9]+/g, '-')
    .replace(/^-+|-+$/g, '')
    .slice(0, MAX_SLUG_LENGTH)
    .replace(/-+$/, '');
  return slug === '' ? 'group' : slug;
}

/** Founds a group with `personId` as owner; a taken slug gets a number behind it. */
export async function insertGroup(tx: Tx, personId: number, name: string): Promise<string> {
  const ids = await tx.execute<{ id: number }>(
    sql`select nextval(pg_get_serial_sequence('research_group', 'id'))::int as id`,
  );
  const id = found(ids.rows[0], 'group id').id;
  await tx.execute(
    sql`select set_config('idem.group_id', ${String(id)}, true), set_config('idem.person_id', ${String(personId)}, true)`,
  );
  const slug = slugOf(name);
  const [group] = await tx
    .insert(researchGroup)
    .overridingSystemValue()
    .values({ id, slug, name })
    .onConflictDoNothing()
    .returning({ slug: researchGroup.slug });
  const taken = group === undefined;
  const unique = taken ? `${slug}-${id}` : slug;
  if (taken) await tx.insert(researchGroup).overridingSystemValue().values({ id, slug: unique, name });
  await tx.insert(membership).values({ groupId: id, personId, role: 'owner' });
  await recordEvent(tx, { groupId: id, personId }, 'group founded', `group ${unique}`, { name });
  return unique;
}

export async function createGroup(context: Context, who: PersonActor, name: string): Promise<string> {
  return inTransaction(context.database, { groupId: null, personId: who.personId }, (tx) =>
    insertGroup(tx, who.personId, name),
  );
}

/** Name, role and sizes of the acting group. */
export async function groupDetail(context: Context, actor: GroupActor): Promise<GroupDetail> {
  return inTransaction(context.database, actor, async (tx) => {
    const [row] = await tx.select().from(researchGroup).where(eq(researchGroup.id, actor.groupId));
    const group = found(row, 'group');
    const [sizes] = await tx
      .select({
        sources: sql<number>`coalesce(sum(${catalogueRevision.sources}), 0)::bigint`.mapWith(Number),
      })
      .from(catalogueRevision)
      .where(and(eq(catalogueRevision.groupId, actor.groupId), eq(catalogueRevision.state, 'ready')));
    const [files] = await tx
      .select({ bytes: sql<number>`coalesce(sum(${storedFile.sizeBytes}), 0)::bigint`.mapWith(Number) })
      .from(storedFile)
      .where(eq(storedFile.groupId, actor.groupId));
    return {
      group: group.slug,
      name: group.name,
      role: actor.role,
      createdAt: group.createdAt.toISOString(),
      catalogues: await tx.$count(catalogue, eq(catalogue.groupId, actor.groupId)),
      sources: sizes?.sources ?? 0,
      objects: await tx.$count(object, and(eq(object.groupId, actor.groupId), sql`${object.mergedInto} is null`)),
      storedBytes: files?.bytes ?? 0,
    };
  });
}

export async function renameGroup(context: Context, actor: GroupActor, name: string): Promise<void> {
  await inTransaction(context.database, actor, async (tx) => {
    await tx.update(researchGroup).set({ name }).where(eq(researchGroup.id, actor.groupId));
    await recordEvent(tx, actor, 'group renamed', `group ${actor.group}`, { name });
  });
}

export async function listMembers(context: Context, actor: GroupActor): Promise<Member[]> {
  return inTransaction(context.database, actor, async (tx) => {
    const rows = await tx
      .select({
        personId: person.id,
        name: person.name,
        email: person.email,
        role: membership.role,
        since: membership.createdAt,
      })
      .from(membership)
      .innerJoin(person, eq(person.id, membership.personId))
      .where(eq(membership.groupId, actor.groupId))
      .orderBy(person.name, person.id);
    return rows.map((row) => ({ ...row, since: row.since.toISOString() }));
  });
}

/** Adds a member; makes the account when nobody has the e-mail yet (then a first password is needed). */
export async function addMember(context: Context, actor: GroupActor, input: NewMember): Promise<Member> {
  const passwordHash = input.password === undefined ? null : await hashPassword(input.password);
  return inTransaction(context.database, actor, async (tx) => {
    const known = await tx.query.person.findFirst({ where: eq(person.email, input.email) });
    if (known === undefined && passwordHash === null) {
      refuse('account-missing', `Nobody with the e-mail ${input.email} has an account yet.`);
    }
    const [created] =
      known !== undefined || passwordHash === null
        ? [known]
        : await tx.insert(person).values({ email: input.email, name: input.name, passwordHash }).returning();
    const newcomer = found(created, 'account');
    const [row] = await tx
      .insert(membership)
      .values({ groupId: actor.groupId, personId: newcomer.id, role: input.role })
      .onConflictDoNothing()
      .returning();
    if (row === undefined) refuse('email-taken', `${newcomer.name} is already a member of this group.`);
    await recordEvent(tx, actor, 'member added', `person ${newcomer.id}`, { email: input.email, role: input.role });
    return {
      personId: newcomer.id,
      name: newcomer.name,
      email: newcomer.email,
      role: row.role,
      since: row.createdAt.toISOString(),
    };
  });
}

/** Changes a member's role; the last owner cannot step down. */
export async function changeMember(
  context: Context,
  actor: GroupActor,
  personId: number,
  role: Role,
): Promise<void> {
  await inTransaction(context.database, actor, async (tx) => {
    await lockMember(tx, actor, personId);
    if (role !== 'owner') await keepAnOwner(tx, actor, personId);
    await tx.update(membership).set({ role }).where(isMember(actor, personId));
    await recordEvent(tx, actor, 'role changed', `person ${personId}`, { role });
  });
}

export async function removeMember(context: Context, actor: GroupActor, personId: number): Promise<void> {
  await inTransaction(context.database, actor, async (tx) => {
    await lockMember(tx, actor, personId);
    await keepAnOwner(tx, actor, personId);
    await tx.delete(membership).where(isMember(actor, personId));
    await recordEvent(tx, actor, 'member removed', `person ${personId}`, {});
  });
}

function isMember(actor: GroupActor, personId: number) {
  return and(eq(membership.groupId, actor.groupId), eq(membership.personId, personId));
}

/** Locks the group's owners too, so that two owners cannot remove each other at once. */
async function lockMember(tx: Tx, actor: GroupActor, personId: number): Promise<void> {
  const rows = await tx
    .select({ personId: membership.personId })
    .from(membership)
    .where(eq(membership.groupId, actor.groupId))
    .orderBy(membership.personId)
    .for('update');
  found(
    rows.find((row) => row.personId === personId),
    'member',
  );
}

async function keepAnOwner(tx: Tx, actor: GroupActor, leaving: number): Promise<void> {
  const others = await tx.$count(
    membership,
    and(eq(membership.groupId, actor.groupId), eq(membership.role, 'owner'), ne(membership.personId, leaving)),
  );
  if (others === 0) refuse('last-owner', 'This person is the only owner of the group.');
}

/** The newest events of the group's audit trail. */
export async function listEvents(context: Context, actor: GroupActor, limit: number, before: number | null) {
  return inTransaction(context.database, actor, async (tx) => {
    const rows = await tx
      .select({
        id: auditEvent.id,
        at: auditEvent.at,
        person: person.name,
        action: auditEvent.action,
        subject: auditEvent.subject,
        detail: auditEvent.detail,
      })
      .from(auditEvent)
      .leftJoin(person, eq(person.id, auditEvent.personId))
      .where(
        and(eq(auditEvent.groupId, actor.groupId), before === null ? undefined : sql`${auditEvent.id} < ${before}`),
      )
      .orderBy(desc(auditEvent.id))
      .limit(limit + 1);
    const items = rows.slice(0, limit).map((row) => ({ ...row, at: row.at.toISOString() }));
    return { items, next: rows.length > limit ? String(items.at(-1)?.id) : null, total: null };
  });
}
