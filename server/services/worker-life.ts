import { hostname } from 'node:os';
import { inArray, sql } from 'drizzle-orm';
import { inTransaction, type Scope } from '../../db/client';
import { workerHeartbeat } from '../../db/schema/job';
import type { Context } from '../context';

/** The queue holds a dead worker's jobs for hours; signs of life tell much sooner that it is gone. */
const SILENT_AFTER_SECONDS = 20;
const EVERYBODY: Scope = { groupId: null, personId: null };

/** Notes that these queue workers of this process live. */
export async function beat(context: Context, workerIds: readonly string[]): Promise<void> {
  if (workerIds.length === 0) return;
  await inTransaction(context.database, EVERYBODY, (tx) =>
    tx
      .insert(workerHeartbeat)
      .values(workerIds.map((workerId) => ({ workerId, host: hostname(), pid: process.pid })))
      .onConflictDoUpdate({ target: workerHeartbeat.workerId, set: { beatAt: sql`now()` } }),
  );
}

function isAlive(pid: number): boolean {
  try {
    process.kill(pid, 0);
    return true;
  } catch (error) {
    return error instanceof Error && 'code' in error && error.code === 'EPERM';
  }
}

/**
 * Hands the jobs of dead workers back to the queue: workers that have been silent for a while, and workers of
 * this host whose process is gone. Returns the ids of the dead.
 */
export async function reapDeadWorkers(context: Context): Promise<string[]> {
  return inTransaction(context.database, EVERYBODY, async (tx) => {
    const rows = await tx
      .select({
        workerId: workerHeartbeat.workerId,
        host: workerHeartbeat.host,
        pid: workerHeartbeat.pid,
        silent: sql<boolean>`${workerHeartbeat.beatAt} < now() - make_interval(secs => ${SILENT_AFTER_SECONDS})`,
      })
      .from(workerHeartbeat)
      .orderBy(workerHeartbeat.workerId)
      .for('update', { skipLocked: true });
    const dead = rows
      .filter((row) => row.silent || (row.host === hostname() && !isAlive(row.pid)))
      .map((row) => row.workerId);
    if (dead.length === 0) return dead;
    await tx.execute(sql`select graphile_worker.force_unlock_workers(${sql.param(dead)}::text[])`);
    await tx.delete(workerHeartbeat).where(inArray(workerHeartbeat.workerId, dead));
    return dead;
  });
}
