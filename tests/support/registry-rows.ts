import { inArray } from 'drizzle-orm';
import { inTransaction } from '../../db/client';
import { object } from '../../db/schema/object';
import type { World } from './world';

export type ObjectRow = typeof object.$inferSelect;

/** Rows of objects by the entries they were born with, in the order given. */
export async function objectRows(world: World, entries: readonly number[]): Promise<ObjectRow[]> {
  const rows = await inTransaction(world.context.database, world.actors.owner, (tx) =>
    tx
      .select()
      .from(object)
      .where(inArray(object.id, [...entries])),
  );
  return entries.flatMap((entry) => rows.filter((row) => row.id === entry));
}
