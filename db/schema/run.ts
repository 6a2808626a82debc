import {
  bigint,
  boolean,
  doublePrecision,
  index,
  integer,
  jsonb,
  pgTable,
  primaryKey,
  text,
  unique,
  uuid,
} from 'drizzle-orm/pg-core';
import type { PairStatistics, PolicyRule } from '../../shared/schemas/run';
import { createdAt, instantColumn } from './columns';

/** One execution of a cross-match; `plan` holds its settings as they were. */
export const matchRun = pgTable(
  'match_run',
  {
    id: integer('id').primaryKey().generatedAlwaysAsIdentity(),
    groupId: integer('group_id').notNull(),
    number: integer('number').notNull(),
    title: text('title').notNull(),
    /** Revisions in the order of the plan. */
    revisionIds: integer('revision_ids').array().notNull(),
    radiusArcsec: doublePrecision('radius_arcsec').notNull(),
    candidates: bigint('candidates', { mode: 'number' }).notNull().default(0),
    pairs: jsonb('pairs').$type<PairStatistics[]>().notNull().default([]),
    softwareVersion: text('software_version').notNull(),
    jobId: uuid('job_id').notNull(),
    createdBy: integer('created_by').notNull(),
    createdAt: createdAt(),
  },
  (t) => [unique('match_run_number_unique').on(t.groupId, t.number)],
);

/** A pair of sources inside the radius; A belongs to the catalogue named earlier in the plan. `seq` follows the separation. */
export const candidate = pgTable(
  'candidate',
  {
    groupId: integer('group_id').notNull(),
    runId: integer('run_id').notNull(),
    seq: integer('seq').notNull(),
    entryA: bigint('entry_a', { mode: 'number' }).notNull(),
    entryB: bigint('entry_b', { mode: 'number' }).notNull(),
    revisionA: integer('revision_a').notNull(),
    revisionB: integer('revision_b').notNull(),
    rowA: integer('row_a').notNull(),
    rowB: integer('row_b').notNull(),
    sepArcsec: doublePrecision('sep_arcsec').notNull(),
    paDeg: doublePrecision('pa_deg'),
    rankA: integer('rank_a').notNull(),
    rankB: integer('rank_b').notNull(),
    rivalsA: integer('rivals_a').notNull(),
    rivalsB: integer('rivals_b').notNull(),
    mutualBest: boolean('mutual_best').notNull(),
  },
  (t) => [
    primaryKey({ columns: [t.runId, t.seq] }),
    index('candidate_entry_a').on(t.runId, t.entryA),
    index('candidate_entry_b').on(t.runId, t.entryB),
  ],
);

/** A rule as it was applied to a run; `takenBackAt` says that all its verdicts were taken back. */
export const appliedPolicy = pgTable('applied_policy', {
  id: integer('id').primaryKey().generatedAlwaysAsIdentity(),
  groupId: integer('group_id').notNull(),
  runId: integer('run_id').notNull(),
  rule: jsonb('rule').$type<PolicyRule>().notNull(),
  verdicts: bigint('verdicts', { mode: 'number' }).notNull().default(0),
  createdBy: integer('created_by').notNull(),
  createdAt: createdAt(),
  takenBackAt: instantColumn('taken_back_at'),
});
