import { bigint, check, index, integer, jsonb, pgTable, primaryKey, text } from 'drizzle-orm/pg-core';
import { sql } from 'drizzle-orm';
import { ROLES } from '../../shared/words';
import { createdAt, instantColumn } from './columns';
import { person } from './person';

/** The tenant. */
export const researchGroup = pgTable('research_group', {
  id: integer('id').primaryKey().generatedAlwaysAsIdentity(),
  slug: text('slug').notNull().unique('research_group_slug_unique'),
  name: text('name').notNull(),
  /** Number of the next object; numbers are never reused. */
  nextObjectNumber: bigint('next_object_number', { mode: 'number' }).notNull().default(1),
  nextRunNumber: integer('next_run_number').notNull().default(1),
  createdAt: createdAt(),
});

export const membership = pgTable(
  'membership',
  {
    groupId: integer('group_id')
      .notNull()
      .references(() => researchGroup.id, { onDelete: 'cascade' }),
    personId: integer('person_id')
      .notNull()
      .references(() => person.id, { onDelete: 'cascade' }),
    role: text('role', { enum: ROLES }).notNull(),
    createdAt: createdAt(),
  },
  (t) => [
    primaryKey({ columns: [t.groupId, t.personId] }),
    index('membership_person').on(t.personId),
    check('membership_role_known', sql`${t.role} in ('reader', 'contributor', 'curator', 'owner')`),
  ],
);

/** Who did what; rows are never changed (trigger). */
export const auditEvent = pgTable(
  'audit_event',
  {
    id: bigint('id', { mode: 'number' }).primaryKey().generatedAlwaysAsIdentity(),
    groupId: integer('group_id').notNull(),
    personId: integer('person_id'),
    at: instantColumn('at').notNull().defaultNow(),
    action: text('action').notNull(),
    /** What it was done to, e.g. 'object 12', 'catalogue LAN-O'. */
    subject: text('subject').notNull(),
    detail: jsonb('detail').$type<Record<string, unknown>>().notNull().default({}),
  },
  (t) => [index('audit_event_group').on(t.groupId, t.id), index('audit_event_subject').on(t.groupId, t.subject)],
);
