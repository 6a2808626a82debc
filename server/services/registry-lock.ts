import pg from 'pg';
import { sql } from 'drizzle-orm';
import { inTransaction, type Tx } from '../../db/client';
import type { Context, GroupActor } from '../context';
import { refuse } from '../errors';

/** Any constant: the first half of the key of a group's registry lock. */
const REGISTRY_LOCK = 1_447_382_020;
/** How long a person waits for a job that is changing the registry before being told so. */
const PATIENCE_MS = 15_000;
const LOCK_NOT_AVAILABLE = '55P03';

/**
 * Takes the lock on a group's registry until the transaction ends. Whoever writes verdicts or identity holds it
 * from before the first write, so within a group the order of verdict ids is the order of commits.
 */
export async function lockRegistry(tx: Tx, actor: GroupActor): Promise<void> {
  await tx.execute(sql`select pg_advisory_xact_lock(${REGISTRY_LOCK}::int, ${actor.groupId}::int)`);
}

/** Runs one act of a person on the registry in a transaction that holds its lock; refuses 'not-ready' after a while. */
export async function changeRegistry<T>(
  context: Context,
  actor: GroupActor,
  work: (tx: Tx) => Promise<T>,
): Promise<T> {
  try {
    return await inTransaction(context.database, actor, async (tx) => {
      await tx.execute(sql`select set_config('lock_timeout', ${String(PATIENCE_MS)}, true)`);
      await lockRegistry(tx, actor);
      return work(tx);
    });
  } catch (error) {
    if (!isLockTimeout(error)) throw error;
    refuse('not-ready', 'A job is changing the registry of this group just now.', {
      hint: 'Try again when the job has finished.',
    });
  }
}

function isLockTimeout(error: unknown): boolean {
  const cause: unknown = error instanceof Error && error.cause !== undefined ? error.cause : error;
  return cause instanceof pg.DatabaseError && cause.code === LOCK_NOT_AVAILABLE;
}
