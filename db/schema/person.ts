import { index, integer, pgTable, text, uuid } from 'drizzle-orm/pg-core';
import { citext, createdAt, instantColumn } from './columns';

/** A human being with an account. Not owned by a group. */
export const person = pgTable('person', {
  id: integer('id').primaryKey().generatedAlwaysAsIdentity(),
  email: citext('email').notNull().unique('person_email_unique'),
  name: text('name').notNull(),
  passwordHash: text('password_hash').notNull(),
  createdAt: createdAt(),
});

/** One sign-in; the cookie's token is bound to it, so that signing out ends it at once. */
export const loginSession = pgTable(
  'login_session',
  {
    id: uuid('id').primaryKey().defaultRandom(),
    personId: integer('person_id')
      .notNull()
      .references(() => person.id, { onDelete: 'cascade' }),
    createdAt: createdAt(),
    lastSeenAt: instantColumn('last_seen_at').notNull().defaultNow(),
    expiresAt: instantColumn('expires_at').notNull(),
    revokedAt: instantColumn('revoked_at'),
    userAgent: text('user_agent').notNull(),
  },
  (t) => [index('login_session_person').on(t.personId)],
);
