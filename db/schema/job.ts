import { bigint, index, integer, jsonb, pgTable, text, uuid } from 'drizzle-orm/pg-core';
import { JOB_KINDS, JOB_STATES } from '../../shared/words';
import { createdAt, instantColumn } from './columns';

/** What a person sees of background work; the queue itself is graphile-worker's. */
export const job = pgTable(
  'job',
  {
    id: uuid('id').primaryKey(),
    groupId: integer('group_id').notNull(),
    kind: text('kind', { enum: JOB_KINDS }).notNull(),
    title: text('title').notNull(),
    state: text('state', { enum: JOB_STATES }).notNull().default('queued'),
    payload: jsonb('payload').$type<Record<string, unknown>>().notNull(),
    done: bigint('done', { mode: 'number' }).notNull().default(0),
    total: bigint('total', { mode: 'number' }),
    message: text('message'),
    error: jsonb('error').$type<{ code: string; detail: string; hint: string | null }>(),
    link: text('link'),
    cancelRequestedAt: instantColumn('cancel_requested_at'),
    createdBy: integer('created_by').notNull(),
    createdAt: createdAt(),
    startedAt: instantColumn('started_at'),
    finishedAt: instantColumn('finished_at'),
    progressAt: instantColumn('progress_at'),
  },
  (t) => [index('job_group_created').on(t.groupId, t.createdAt)],
);

/** Signs of life of worker processes; the jobs of a silent one are handed to others. Not owned by a group. */
export const workerHeartbeat = pgTable('worker_heartbeat', {
  workerId: text('worker_id').primaryKey(),
  host: text('host').notNull(),
  pid: integer('pid').notNull(),
  beatAt: instantColumn('beat_at').notNull().defaultNow(),
});
