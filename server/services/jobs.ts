import { and, desc, eq, inArray, isNull, sql } from 'drizzle-orm';
import { inTransaction, type Scope, type Tx } from '../../db/client';
import { job } from '../../db/schema/job';
import type { Job } from '../../shared/schemas/job';
import type { JobKind } from '../../shared/words';
import type { Context, GroupActor } from '../context';
import { found, refuse, Refusal } from '../errors';
import { recordEvent } from './audit';

/** Channel on which every change of a job is announced, with the job's id as payload. */
export const JOB_CHANNEL = 'idem_job';
/** The one task name of the queue; the job row says what is to be done. */
export const QUEUE_TASK = 'idem';
const QUEUE_ATTEMPTS = 5;
const PROGRESS_EVERY_MS = 400;

/** Payload of the queue: enough to open the job row under its group's lock. */
export interface QueuePayload {
  jobId: string;
  groupId: number;
}

interface NewJob {
  kind: JobKind;
  title: string;
  payload: Record<string, unknown>;
  link: string | null;
  /** Given when other rows of the same transaction name the job. */
  id?: string;
}

/** Puts a job into the queue inside the caller's transaction: it starts only if that commits. */
export async function enqueueJob(tx: Tx, actor: GroupActor, input: NewJob): Promise<string> {
  const id = input.id ?? crypto.randomUUID();
  await tx.insert(job).values({
    id,
    groupId: actor.groupId,
    kind: input.kind,
    title: input.title,
    payload: input.payload,
    link: input.link,
    createdBy: actor.personId,
  });
  const payload: QueuePayload = { jobId: id, groupId: actor.groupId };
  await tx.execute(
    sql`select graphile_worker.add_job(${QUEUE_TASK}, ${JSON.stringify(payload)}::json, job_key := ${id}, max_attempts := ${QUEUE_ATTEMPTS})`,
  );
  await announce(tx, id);
  return id;
}

async function announce(tx: Tx, id: string): Promise<void> {
  await tx.execute(sql`select pg_notify(${JOB_CHANNEL}, ${id})`);
}

type JobRow = typeof job.$inferSelect;

function present(row: JobRow): Job {
  const end = row.finishedAt ?? row.progressAt;
  const seconds = row.startedAt === null || end === null ? 0 : (end.getTime() - row.startedAt.getTime()) / 1000;
  return {
    id: row.id,
    kind: row.kind,
    title: row.title,
    state: row.state,
    done: row.done,
    total: row.total,
    ratePerSecond: seconds > 0 && row.done > 0 ? row.done / seconds : null,
    message: row.message,
    error: row.error,
    link: row.link,
    createdAt: row.createdAt.toISOString(),
    startedAt: row.startedAt?.toISOString() ?? null,
    finishedAt: row.finishedAt?.toISOString() ?? null,
  };
}

async function selectJob(tx: Tx, groupId: number, id: string): Promise<JobRow> {
  const [row] = await tx
    .select()
    .from(job)
    .where(and(eq(job.id, id), eq(job.groupId, groupId)));
  return found(row, 'job');
}

export async function getJob(context: Context, actor: GroupActor, id: string): Promise<Job> {
  return inTransaction(context.database, actor, async (tx) => present(await selectJob(tx, actor.groupId, id)));
}

/** The newest jobs of the group; with `open`, only those that wait or run. */
export async function listJobs(context: Context, actor: GroupActor, which: 'open' | 'all', limit: number): Promise<Job[]> {
  return inTransaction(context.database, actor, async (tx) => {
    const rows = await tx
      .select()
      .from(job)
      .where(and(eq(job.groupId, actor.groupId), which === 'open' ? inArray(job.state, ['queued', 'running']) : undefined))
      .orderBy(desc(job.createdAt), job.id)
      .limit(limit);
    return rows.map(present);
  });
}

/** Asks a job to stop: one that waits ends at once, one that runs at its next progress report. */
export async function cancelJob(context: Context, actor: GroupActor, id: string): Promise<Job> {
  return inTransaction(context.database, actor, async (tx) => {
    const [row] = await tx
      .select()
      .from(job)
      .where(and(eq(job.id, id), eq(job.groupId, actor.groupId)))
      .for('update');
    const seen = found(row, 'job');
    if (seen.state !== 'queued' && seen.state !== 'running') {
      refuse('already-finished', `The job is ${seen.state} already.`);
    }
    await tx
      .update(job)
      .set({ cancelRequestedAt: sql`now()` })
      .where(eq(job.id, id));
    await recordEvent(tx, actor, 'job cancelled', `job ${id}`, { title: seen.title });
    await announce(tx, id);
    return present(await selectJob(tx, actor.groupId, id));
  });
}

/** What a job's work gets: where it says how far it is, and how it hears that it should stop. */
export interface JobRun {
  id: string;
  actor: GroupActor;
  payload: Record<string, unknown>;
  /**
   * Reports progress and throws JobCancelled when a person asked to stop. Written at most a few times a second,
   * unless it is to be written 'now', as at the beginning of a new stage.
   */
  report(done: number, total: number | null, message: string, when?: 'soon' | 'now'): Promise<void>;
  /** Puts the final count and sentence; written when the job is done. */
  finish(done: number, message: string): void;
}

/** Thrown by `report` to unwind a job that a person cancelled; its transaction rolls back. */
export class JobCancelled extends Error {
  constructor() {
    super('cancelled by a person');
    this.name = 'JobCancelled';
  }
}

type Work = (context: Context, run: JobRun) => Promise<void>;
/**
 * Called in the closing transaction of a job that failed or was cancelled, to leave its noun in a clear state; what it
 * returns (if anything) is done after the commit, for what no transaction covers.
 */
type Unwind = (
  context: Context,
  tx: Tx,
  run: Pick<JobRun, 'id' | 'actor' | 'payload'>,
  state: 'failed' | 'cancelled',
) => Promise<(() => Promise<void>) | null>;

export interface JobKindWork {
  work: Work;
  unwind: Unwind;
}

/**
 * Carries out one job of the queue. Refusals and errors end it as failed with a sentence; only the death of the
 * process leaves it running, and then another worker starts it again from the beginning.
 */
export async function runJob(
  context: Context,
  payload: QueuePayload,
  kinds: Record<JobKind, JobKindWork>,
): Promise<void> {
  const scope: Scope = { groupId: payload.groupId, personId: null };
  const row = await inTransaction(context.database, scope, async (tx) => {
    const seen = await selectJob(tx, payload.groupId, payload.jobId);
    if (seen.state !== 'queued' && seen.state !== 'running') return null;
    await tx
      .update(job)
      .set({ state: 'running', startedAt: sql`now()`, progressAt: sql`now()`, done: 0 })
      .where(eq(job.id, payload.jobId));
    await announce(tx, payload.jobId);
    return seen;
  });
  if (row === null) return;
  const actor: GroupActor = { personId: row.createdBy, groupId: row.groupId, group: '', role: 'curator' };
  const kind = kinds[row.kind];
  let closing = { done: 0, message: null as string | null };
  let lastWrite = 0;
  const run: JobRun = {
    id: row.id,
    actor,
    payload: row.payload,
    async report(done, total, message, when = 'soon') {
      closing = { done, message };
      if (when === 'soon' && Date.now() - lastWrite < PROGRESS_EVERY_MS) return;
      lastWrite = Date.now();
      if (await writeProgress(context, scope, row.id, { done, total, message })) throw new JobCancelled();
    },
    finish(done, message) {
      closing = { done, message };
    },
  };
  try {
    if (row.cancelRequestedAt !== null) throw new JobCancelled();
    await kind.work(context, run);
    await close(context, scope, run, { state: 'done', ...closing });
  } catch (error) {
    await closeBroken(context, scope, run, kind, error);
  }
}

async function writeProgress(
  context: Context,
  scope: Scope,
  id: string,
  progress: { done: number; total: number | null; message: string },
): Promise<boolean> {
  return inTransaction(context.database, scope, async (tx) => {
    const [row] = await tx
      .update(job)
      .set({ ...progress, progressAt: sql`now()` })
      .where(eq(job.id, id))
      .returning({ cancelRequestedAt: job.cancelRequestedAt });
    await announce(tx, id);
    return row !== undefined && row.cancelRequestedAt !== null;
  });
}

type Closing = { state: 'done' | 'failed' | 'cancelled'; done?: number; message: string | null; error?: Job['error'] };

async function close(
  context: Context,
  scope: Scope,
  run: JobRun,
  closing: Closing,
  unwind?: (tx: Tx) => Promise<(() => Promise<void>) | null>,
): Promise<void> {
  const cleanUp = await inTransaction(context.database, scope, async (tx) => {
    await tx
      .update(job)
      .set({
        ...closing,
        ...(closing.state === 'done' ? { total: closing.done } : {}),
        finishedAt: sql`now()`,
        progressAt: sql`now()`,
      })
      .where(and(eq(job.id, run.id), isNull(job.finishedAt)));
    const after = await unwind?.(tx);
    await announce(tx, run.id);
    return after;
  });
  await cleanUp?.();
}

async function closeBroken(
  context: Context,
  scope: Scope,
  run: JobRun,
  kind: JobKindWork,
  error: unknown,
): Promise<void> {
  if (error instanceof JobCancelled) {
    const message = 'Cancelled; nothing was kept.';
    await close(context, scope, run, { state: 'cancelled', message }, (tx) =>
      kind.unwind(context, tx, run, 'cancelled'),
    );
    return;
  }
  const refusal =
    error instanceof Refusal ? error : new Refusal('internal', 'The job stopped on an unexpected error; nothing was kept.');
  if (!(error instanceof Refusal)) context.log.error({ err: error, job: run.id }, 'job failed');
  await close(
    context,
    scope,
    run,
    {
      state: 'failed',
      message: refusal.message,
      error: { code: refusal.code, detail: refusal.message, hint: refusal.hint },
    },
    (tx) => kind.unwind(context, tx, run, 'failed'),
  );
}
