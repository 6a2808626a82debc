import {
  bigint,
  boolean,
  doublePrecision,
  index,
  integer,
  pgTable,
  smallint,
  text,
  uniqueIndex,
} from 'drizzle-orm/pg-core';
import { sql } from 'drizzle-orm';
import { ALIAS_ORIGINS } from '../../shared/words';
import { createdAt, instantColumn } from './columns';

/**
 * Every entry is born as an object of its own, with a permanent number and the entry's id; merging lets it
 * forward. `mergedInto` always names the live object itself, never another forwarding one. So an entry
 * belongs to exactly one live object by construction, and a split gives each part its old number back.
 */
export const object = pgTable(
  'object',
  {
    /** The id of the entry it was born with. */
    id: bigint('id', { mode: 'number' }).primaryKey(),
    groupId: integer('group_id').notNull(),
    number: bigint('number', { mode: 'number' }).notNull(),
    mergedInto: bigint('merged_into', { mode: 'number' }),
    /** Merged position, ICRS; of a live object only. */
    raDeg: doublePrecision('ra_deg').notNull(),
    decDeg: doublePrecision('dec_deg').notNull(),
    /** One sigma per axis of the merged position; null when no member states an error. */
    errArcsec: doublePrecision('err_arcsec'),
    /** Declination zone of 0.1 degree, the first key of cone searches. */
    zone: smallint('zone')
      .notNull()
      .generatedAlwaysAs(sql`floor((dec_deg + 90) * 10)::smallint`),
    name: text('name').notNull(),
    /** True when a person chose the preferred name. */
    nameChosen: boolean('name_chosen').notNull().default(false),
    entries: integer('entries').notNull().default(1),
    version: integer('version').notNull().default(1),
  },
  (t) => [
    uniqueIndex('object_number_unique').on(t.groupId, t.number),
    index('object_sky').on(t.groupId, t.zone, t.raDeg).where(sql`merged_into is null`),
    index('object_merged_into').on(t.mergedInto).where(sql`merged_into is not null`),
  ],
);

/** A name of an object. `objectId` is the object it was given on; the live one follows by forwarding. */
export const alias = pgTable(
  'alias',
  {
    id: bigint('id', { mode: 'number' }).primaryKey().generatedAlwaysAsIdentity(),
    groupId: integer('group_id').notNull(),
    objectId: bigint('object_id', { mode: 'number' }).notNull(),
    name: text('name').notNull(),
    key: text('key').notNull(),
    origin: text('origin', { enum: ALIAS_ORIGINS }).notNull(),
    personId: integer('person_id'),
    at: instantColumn('at').notNull().defaultNow(),
    retiredAt: instantColumn('retired_at'),
  },
  (t) => [
    index('alias_key').on(t.groupId, t.key),
    index('alias_object').on(t.objectId),
    index('alias_key_trgm').using('gin', sql`${t.key} gin_trgm_ops`),
  ],
);

/** A remark on an object, in Markdown. `objectId` as for aliases. */
export const note = pgTable(
  'note',
  {
    id: bigint('id', { mode: 'number' }).primaryKey().generatedAlwaysAsIdentity(),
    groupId: integer('group_id').notNull(),
    objectId: bigint('object_id', { mode: 'number' }).notNull(),
    body: text('body').notNull(),
    personId: integer('person_id').notNull(),
    createdAt: createdAt(),
    editedAt: instantColumn('edited_at'),
    deletedAt: instantColumn('deleted_at'),
  },
  (t) => [index('note_object').on(t.objectId)],
);

/** What a note said before it was edited. */
export const noteVersion = pgTable(
  'note_version',
  {
    id: bigint('id', { mode: 'number' }).primaryKey().generatedAlwaysAsIdentity(),
    groupId: integer('group_id').notNull(),
    noteId: bigint('note_id', { mode: 'number' })
      .notNull()
      .references(() => note.id, { onDelete: 'cascade' }),
    body: text('body').notNull(),
    replacedAt: instantColumn('replaced_at').notNull().defaultNow(),
    personId: integer('person_id').notNull(),
  },
  (t) => [index('note_version_note').on(t.noteId)],
);
