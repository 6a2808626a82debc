import { customType, timestamp } from 'drizzle-orm/pg-core';

/** Case-insensitive text (extension citext). */
export const citext = customType<{ data: string }>({ dataType: () => 'citext' });

/** Time of a row's birth, UTC. */
export const createdAt = () => timestamp('created_at', { withTimezone: true }).notNull().defaultNow();

export const instantColumn = (name: string) => timestamp(name, { withTimezone: true });
