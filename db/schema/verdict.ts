import { bigint, check, index, integer, pgTable, primaryKey, text } from 'drizzle-orm/pg-core';
import { sql } from 'drizzle-orm';
import { FLAGS, GRADES, VERDICT_VALUES } from '../../shared/words';
import { instantColumn } from './columns';

/**
 * What was said about a pair of entries (entryA < entryB). Append-only (trigger): a verdict is taken back
 * by a later row that names it in `takesBack` and carries no value.
 */
export const verdict = pgTable(
  'verdict',
  {
    id: bigint('id', { mode: 'number' }).primaryKey().generatedAlwaysAsIdentity(),
    groupId: integer('group_id').notNull(),
    entryA: bigint('entry_a', { mode: 'number' }).notNull(),
    entryB: bigint('entry_b', { mode: 'number' }).notNull(),
    value: text('value', { enum: VERDICT_VALUES }),
    grade: text('grade', { enum: GRADES }),
    flags: text('flags', { enum: FLAGS }).array().notNull().default(sql`'{}'`),
    remark: text('remark').notNull().default(''),
    personId: integer('person_id').notNull(),
    runId: integer('run_id'),
    /** Set when a policy gave it: the verdict is automatic, `personId` is who applied the policy. */
    policyId: integer('policy_id'),
    takesBack: bigint('takes_back', { mode: 'number' }),
    at: instantColumn('at').notNull().defaultNow(),
  },
  (t) => [
    index('verdict_pair').on(t.groupId, t.entryA, t.entryB),
    index('verdict_entry_b').on(t.entryB),
    index('verdict_policy').on(t.policyId),
    index('verdict_takes_back').on(t.takesBack),
    check('verdict_pair_ordered', sql`${t.entryA} < ${t.entryB}`),
    check('verdict_value_or_take_back', sql`(${t.value} is null) = (${t.takesBack} is not null)`),
  ],
);

/** The latest verdict of each pair that was not taken back; derived from `verdict` by services/verdicts only. */
export const verdictInForce = pgTable(
  'verdict_in_force',
  {
    groupId: integer('group_id').notNull(),
    entryA: bigint('entry_a', { mode: 'number' }).notNull(),
    entryB: bigint('entry_b', { mode: 'number' }).notNull(),
    verdictId: bigint('verdict_id', { mode: 'number' }).notNull(),
    value: text('value', { enum: VERDICT_VALUES }).notNull(),
    grade: text('grade', { enum: GRADES }),
    policyId: integer('policy_id'),
  },
  (t) => [
    primaryKey({ columns: [t.entryA, t.entryB] }),
    index('verdict_in_force_entry_b').on(t.entryB),
    index('verdict_in_force_group').on(t.groupId, t.value),
  ],
);
