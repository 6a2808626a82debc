import { and, desc, eq, isNull, sql } from 'drizzle-orm';
import { inTransaction, type Tx } from '../../db/client';
import { note, noteVersion, object } from '../../db/schema/object';
import { person } from '../../db/schema/person';
import { roleAtLeast } from '../../shared/words';
import type { Note } from '../../shared/schemas/object';
import type { Context, GroupActor } from '../context';
import { found, refuse } from '../errors';
import { recordEvent } from './audit';
import { liveObject } from './object-page';
import { bigintArray } from './verdict-log';

/** Notes written on these objects, the oldest first. */
export async function notesOf(tx: Tx, objectIds: readonly number[]): Promise<Note[]> {
  const rows = await tx
    .select({
      id: note.id,
      body: note.body,
      by: person.name,
      personId: note.personId,
      at: note.createdAt,
      editedAt: note.editedAt,
      writtenOn: object.number,
    })
    .from(note)
    .innerJoin(person, eq(person.id, note.personId))
    .innerJoin(object, eq(object.id, note.objectId))
    .where(and(sql`${note.objectId} = any(${bigintArray(objectIds)})`, isNull(note.deletedAt)))
    .orderBy(note.id);
  return rows.map((row) => ({ ...row, at: row.at.toISOString(), editedAt: row.editedAt?.toISOString() ?? null }));
}

export async function addNote(context: Context, actor: GroupActor, number: number, body: string): Promise<Note> {
  return inTransaction(context.database, actor, async (tx) => {
    const live = await liveObject(tx, actor, number);
    const [row] = await tx
      .insert(note)
      .values({ groupId: actor.groupId, objectId: live.id, body, personId: actor.personId })
      .returning({ id: note.id });
    await recordEvent(tx, actor, 'note written', `object ${live.number}`, {});
    const written = await notesOf(tx, [live.id]);
    return found(
      written.find((one) => one.id === row?.id),
      'note',
    );
  });
}

/** A note that the actor may change: one's own, or any for curators. */
async function lockNote(tx: Tx, actor: GroupActor, noteId: number) {
  const [row] = await tx
    .select()
    .from(note)
    .where(and(eq(note.id, noteId), eq(note.groupId, actor.groupId), isNull(note.deletedAt)))
    .for('update');
  const seen = found(row, 'note');
  if (seen.personId !== actor.personId && !roleAtLeast(actor.role, 'curator')) {
    refuse('role-too-low', 'Only its author and curators change a note.');
  }
  return seen;
}

/** Replaces the text; what it said before is kept. */
export async function editNote(context: Context, actor: GroupActor, noteId: number, body: string): Promise<void> {
  await inTransaction(context.database, actor, async (tx) => {
    const before = await lockNote(tx, actor, noteId);
    if (before.body === body) return;
    await tx
      .insert(noteVersion)
      .values({ groupId: actor.groupId, noteId, body: before.body, personId: actor.personId });
    await tx.update(note).set({ body, editedAt: sql`now()` }).where(eq(note.id, noteId));
  });
}

/** Takes a note out of sight; the row and its past versions stay. */
export async function deleteNote(context: Context, actor: GroupActor, noteId: number): Promise<void> {
  await inTransaction(context.database, actor, async (tx) => {
    const seen = await lockNote(tx, actor, noteId);
    await tx.update(note).set({ deletedAt: sql`now()` }).where(eq(note.id, noteId));
    await recordEvent(tx, actor, 'note deleted', `note ${noteId}`, { objectId: seen.objectId });
  });
}

/** What a note said before its edits, the latest first. */
export async function noteVersions(context: Context, actor: GroupActor, noteId: number) {
  return inTransaction(context.database, actor, async (tx) => {
    const [row] = await tx
      .select({ id: note.id })
      .from(note)
      .where(and(eq(note.id, noteId), eq(note.groupId, actor.groupId)));
    found(row, 'note');
    const versions = await tx
      .select({ body: noteVersion.body, replacedAt: noteVersion.replacedAt, replacedBy: person.name })
      .from(noteVersion)
      .innerJoin(person, eq(person.id, noteVersion.personId))
      .where(eq(noteVersion.noteId, noteId))
      .orderBy(desc(noteVersion.id));
    return versions.map((one) => ({ ...one, replacedAt: one.replacedAt.toISOString() }));
  });
}
