import {
  bigint,
  check,
  doublePrecision,
  index,
  integer,
  jsonb,
  pgSequence,
  pgTable,
  primaryKey,
  real,
  text,
  unique,
  uuid,
} from 'drizzle-orm/pg-core';
import { sql } from 'drizzle-orm';
import type { Coverage } from '../../shared/schemas/catalogue';
import type { ColumnMapping, FileInspection, TextDialect } from '../../shared/schemas/mapping';
import { citext, createdAt, instantColumn } from './columns';

/** An uploaded file as it came; the bytes are in the file storage under `id`. */
export const storedFile = pgTable('stored_file', {
  id: uuid('id').primaryKey(),
  groupId: integer('group_id').notNull(),
  name: text('name').notNull(),
  sizeBytes: bigint('size_bytes', { mode: 'number' }).notNull(),
  sha256: text('sha256').notNull(),
  inspection: jsonb('inspection').$type<FileInspection>().notNull(),
  uploadedBy: integer('uploaded_by').notNull(),
  createdAt: createdAt(),
});

export const catalogue = pgTable(
  'catalogue',
  {
    id: integer('id').primaryKey().generatedAlwaysAsIdentity(),
    groupId: integer('group_id').notNull(),
    label: citext('label').notNull(),
    title: text('title').notNull(),
    description: text('description').notNull().default(''),
    band: text('band').notNull().default(''),
    citation: text('citation').notNull().default(''),
    /** Order of arrival in the group, from 0; decides the stamp. */
    ordinal: integer('ordinal').notNull(),
    createdBy: integer('created_by').notNull(),
    createdAt: createdAt(),
  },
  (t) => [unique('catalogue_label_unique').on(t.groupId, t.label), unique('catalogue_ordinal_unique').on(t.groupId, t.ordinal)],
);

export const catalogueRevision = pgTable(
  'catalogue_revision',
  {
    id: integer('id').primaryKey().generatedAlwaysAsIdentity(),
    groupId: integer('group_id').notNull(),
    catalogueId: integer('catalogue_id')
      .notNull()
      .references(() => catalogue.id, { onDelete: 'cascade' }),
    number: integer('number').notNull(),
    fileId: uuid('file_id')
      .notNull()
      .references(() => storedFile.id),
    dialect: jsonb('dialect').$type<TextDialect>().notNull(),
    mapping: jsonb('mapping').$type<ColumnMapping>().notNull(),
    columns: jsonb('columns').$type<{ name: string; kind: 'number' | 'text' | 'sexagesimal' | 'empty' }[]>().notNull(),
    frame: text('frame', { enum: ['ICRS'] }).notNull(),
    epochYear: doublePrecision('epoch_year'),
    state: text('state', { enum: ['importing', 'ready', 'failed', 'cancelled'] }).notNull().default('importing'),
    rowsRead: bigint('rows_read', { mode: 'number' }).notNull().default(0),
    sources: bigint('sources', { mode: 'number' }).notNull().default(0),
    setAside: bigint('set_aside', { mode: 'number' }).notNull().default(0),
    medianErrArcsec: doublePrecision('median_err_arcsec'),
    coverage: jsonb('coverage').$type<Coverage>(),
    /** When every entry has an object number and its aliases; null until then. */
    registeredAt: instantColumn('registered_at'),
    jobId: uuid('job_id').notNull(),
    createdBy: integer('created_by').notNull(),
    createdAt: createdAt(),
  },
  (t) => [unique('catalogue_revision_number_unique').on(t.catalogueId, t.number)],
);

/** Entry ids are taken from here in blocks, so that a stream of rows can carry them. */
export const entryIds = pgSequence('entry_id_seq', { startWith: 1, increment: 1 });

/**
 * What a source is across revisions: (catalogue, its own key). Verdicts and objects hold on to entries.
 * No foreign keys on the bulk tables (entry, source, candidate): they are written only by set-based jobs
 * inside one transaction, and a check per row would cost more than the load. Ids are unique over all partitions, because
 * they come from one sequence.
 */
export const entry = pgTable(
  'entry',
  {
    id: bigint('id', { mode: 'number' }).notNull(),
    groupId: integer('group_id').notNull(),
    catalogueId: integer('catalogue_id').notNull(),
    key: text('key').notNull(),
  },
  (t) => [
    primaryKey({ columns: [t.id, t.catalogueId] }),
    unique('entry_key_unique').on(t.catalogueId, t.key),
  ],
);

/** One row of a revision. */
export const source = pgTable(
  'source',
  {
    groupId: integer('group_id').notNull(),
    revisionId: integer('revision_id').notNull(),
    /** Order in the file among the rows that became sources, from 1. */
    rowNo: integer('row_no').notNull(),
    entryId: bigint('entry_id', { mode: 'number' }).notNull(),
    /** The catalogue's own key of the row. */
    key: text('key').notNull(),
    /** First name, or the key where there is none. */
    designation: text('designation').notNull(),
    raDeg: doublePrecision('ra_deg').notNull(),
    decDeg: doublePrecision('dec_deg').notNull(),
    /** One sigma per axis; null when the catalogue states none. */
    errMajArcsec: real('err_maj_arcsec'),
    errMinArcsec: real('err_min_arcsec'),
    errPaDeg: real('err_pa_deg'),
    pmRaMasYr: doublePrecision('pm_ra_mas_yr'),
    pmDecMasYr: doublePrecision('pm_dec_mas_yr'),
    /** All cells of the row as written, joined by U+001F, in the order of the revision's columns. */
    cells: text('cells').notNull(),
  },
  (t) => [primaryKey({ columns: [t.revisionId, t.rowNo] }), index('source_entry').on(t.entryId)],
);

export const setAsideRow = pgTable(
  'set_aside_row',
  {
    groupId: integer('group_id').notNull(),
    revisionId: integer('revision_id').notNull(),
    seq: integer('seq').notNull(),
    line: integer('line').notNull(),
    column: text('column'),
    code: text('code').notNull(),
    message: text('message').notNull(),
    raw: text('raw').notNull(),
  },
  (t) => [primaryKey({ columns: [t.revisionId, t.seq] }), check('set_aside_row_seq', sql`${t.seq} >= 0`)],
);
