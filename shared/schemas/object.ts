import { z } from 'zod';
import { ALIAS_ORIGINS } from '../words';
import { catalogueLabel } from './catalogue';
import { instant, pageOf, pageQuery, rowId } from './page';
import { candidateSide, verdictInForce } from './run';

export const objectNumber = z.number().int().positive();
export const objectNumberParam = z.coerce.number().int().positive();

export const objectSummary = z.strictObject({
  number: objectNumber,
  name: z.string(),
  raDeg: z.number(),
  decDeg: z.number(),
  errArcsec: z.number().nullable(),
  entries: z.number().int(),
  /** Labels of the catalogues it stands in. */
  catalogues: z.array(catalogueLabel),
  /** Distance from the centre of a cone search; null otherwise. */
  sepArcsec: z.number().nullable(),
});
export type ObjectSummary = z.infer<typeof objectSummary>;
export const objectPage = pageOf(objectSummary);

export const objectQuery = pageQuery.extend({
  sort: z.enum(['number', 'name', 'ra', 'dec', 'entries']).default('number'),
  order: z.enum(['asc', 'desc']).default('asc'),
  /** Part of a name, matched on the name key of any alias. */
  name: z.string().max(200).optional(),
  ra: z.coerce.number().min(0).max(360).optional(),
  dec: z.coerce.number().min(-90).max(90).optional(),
  radiusArcsec: z.coerce.number().positive().max(36000).optional(),
  /** Only objects with at least this many entries. */
  minEntries: z.coerce.number().int().min(1).max(100).optional(),
  catalogue: catalogueLabel.optional(),
});

export const alias = z.strictObject({
  id: rowId,
  name: z.string(),
  origin: z.enum(ALIAS_ORIGINS),
  /** Catalogue and row for an entry's name; the person's name otherwise. */
  from: z.string(),
  catalogue: catalogueLabel.nullable(),
  entryId: rowId.nullable(),
  at: instant,
  retiredAt: instant.nullable(),
  /** Another live object also bears this name. */
  contested: z.boolean(),
});
export type Alias = z.infer<typeof alias>;

export const newAlias = z.strictObject({ name: z.string().trim().min(1).max(200) });

export const measurement = z.strictObject({
  quantity: z.string(),
  value: z.string(),
  error: z.string().nullable(),
  unit: z.string(),
});

export const objectMember = candidateSide.extend({
  revision: z.number().int(),
  epochYear: z.number().nullable(),
  pmRaMasYr: z.number().nullable(),
  pmDecMasYr: z.number().nullable(),
  /** Distance from the object's position, arcsec. */
  sepArcsec: z.number(),
  measurements: z.array(measurement),
  columns: z.array(z.strictObject({ name: z.string(), cell: z.string() })),
});
export type ObjectMember = z.infer<typeof objectMember>;

export const note = z.strictObject({
  id: rowId,
  body: z.string(),
  by: z.string(),
  personId: z.number().int(),
  at: instant,
  editedAt: instant.nullable(),
  /** The number the note was written on; differs from the object's after a merge. */
  writtenOn: objectNumber,
});
export type Note = z.infer<typeof note>;
export const noteText = z.strictObject({
  body: z.string().trim().min(1, { error: 'Write something first.' }).max(20000),
});

export const historyEvent = z.strictObject({
  at: instant,
  by: z.string(),
  what: z.string(),
  detail: z.string(),
});

export const objectDetail = z.strictObject({
  number: objectNumber,
  version: z.number().int(),
  name: z.string(),
  raDeg: z.number(),
  decDeg: z.number(),
  errArcsec: z.number().nullable(),
  members: z.array(objectMember),
  aliases: z.array(alias),
  notes: z.array(note),
  /** Numbers that forward to this one. */
  formerNumbers: z.array(objectNumber),
  verdicts: z.array(
    verdictInForce.extend({ entryA: rowId, entryB: rowId, designationA: z.string(), designationB: z.string() }),
  ),
  conflicts: z.number().int(),
  history: z.array(historyEvent),
});
export type ObjectDetail = z.infer<typeof objectDetail>;

/** What an object number answers: the object, or where it went. */
export const objectAnswer = z.discriminatedUnion('state', [
  z.strictObject({ state: z.literal('live'), object: objectDetail }),
  z.strictObject({ state: z.literal('forwarded'), number: objectNumber, forwardsTo: objectNumber }),
]);
export type ObjectAnswer = z.infer<typeof objectAnswer>;

export const objectChange = z.strictObject({ name: z.string().trim().min(1).max(200) });

export const mergeObjects = z.strictObject({
  numbers: z.array(objectNumber).min(2).max(50),
  remark: z.string().trim().max(2000).default(''),
});
export const splitObject = z.strictObject({
  number: objectNumber,
  /** The entries that are taken out together. */
  entryIds: z.array(rowId).min(1).max(500),
  remark: z.string().trim().max(2000).default(''),
});
export const registryChange = z.strictObject({
  /** Live numbers of everything that was touched. */
  numbers: z.array(objectNumber),
  conflicts: z.number().int(),
});

/** Sources and objects around an object, for its finding chart. */
export const objectField = z.strictObject({
  radiusArcsec: z.number(),
  sources: z.array(
    candidateSide.extend({
      pmRaMasYr: z.number().nullable(),
      pmDecMasYr: z.number().nullable(),
      epochYear: z.number().nullable(),
      sepArcsec: z.number(),
      member: z.boolean(),
    }),
  ),
  /** The k nearest sources that are not members, across all catalogues. */
  nearest: z.array(candidateSide.extend({ sepArcsec: z.number() })),
});
export type ObjectField = z.infer<typeof objectField>;

/** What a note said before its edits, the latest first. */
export const noteVersions = z.strictObject({
  items: z.array(z.strictObject({ body: z.string(), replacedAt: instant, replacedBy: z.string() })),
});
