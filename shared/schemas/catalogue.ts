import { z } from 'zod';
import { columnMapping, setAsideRow, textDialect } from './mapping';
import { instant, pageOf, pageQuery, rowId } from './page';

/** A catalogue's acronym inside the group: the stamp, the column prefix and the URL use it. */
export const catalogueLabel = z
  .string()
  .trim()
  .regex(/^[A-Za-z][A-Za-z0-9_.-]{0,19}$/, {
    error: 'Use 1 to 20 letters, digits, "-", "_" or ".", beginning with a letter.',
  });

export const catalogueText = z.strictObject({
  title: z.string().trim().min(1, { error: 'Write a title.' }).max(200),
  description: z.string().trim().max(5000),
  band: z.string().trim().max(60),
  citation: z.string().trim().max(2000),
});

export const newCatalogue = catalogueText.extend({
  label: catalogueLabel,
  fileId: z.uuid(),
  dialect: textDialect,
  mapping: columnMapping,
  /** Positions are taken as ICRS; FK5 J2000 agrees with it within about 0.02 arcsec. */
  frame: z.literal('ICRS'),
  /** Julian epoch of the positions, e.g. 2016.0; null when unknown. */
  epochYear: z.number().min(1800).max(2100).nullable(),
});
export type NewCatalogue = z.infer<typeof newCatalogue>;
export const catalogueAccepted = z.strictObject({
  label: catalogueLabel,
  revision: z.number().int(),
  jobId: z.uuid(),
});
export const catalogueChange = catalogueText.partial();

export const revisionState = z.enum(['importing', 'ready', 'failed', 'cancelled']);

export const catalogueSummary = z.strictObject({
  label: catalogueLabel,
  title: z.string(),
  band: z.string(),
  /** Order of arrival in the group, from 0: decides the stamp. */
  ordinal: z.number().int(),
  revision: z.number().int(),
  state: revisionState,
  registered: z.boolean(),
  epochYear: z.number().nullable(),
  sources: z.number().int(),
  setAside: z.number().int(),
  createdAt: instant,
});
export type CatalogueSummary = z.infer<typeof catalogueSummary>;
export const catalogueList = z.strictObject({ items: z.array(catalogueSummary) });

export const catalogueColumn = z.strictObject({
  index: z.number().int(),
  name: z.string(),
  kind: z.enum(['number', 'text', 'sexagesimal', 'empty']),
  /** What the mapping makes of it, in words ('right ascension', 'name', 'kept as written'). */
  role: z.string(),
});

export const catalogueDetail = catalogueSummary.extend({
  description: z.string(),
  citation: z.string(),
  frame: z.string(),
  rowsRead: z.number().int(),
  fileName: z.string(),
  fileSizeBytes: z.number().int(),
  fileSha256: z.string(),
  importedBy: z.string(),
  dialect: textDialect,
  mapping: columnMapping,
  columns: z.array(catalogueColumn),
  /** Median one-sigma error per axis in arcsec; null when the catalogue states none. */
  medianErrArcsec: z.number().nullable(),
  jobId: z.uuid(),
});
export type CatalogueDetail = z.infer<typeof catalogueDetail>;

/** Density squares for the coverage picture: cell centres in degrees and the counts in them. */
export const coverage = z.strictObject({
  cellSizeDeg: z.number(),
  cells: z.array(z.strictObject({ raDeg: z.number(), decDeg: z.number(), count: z.number().int() })),
  areaDeg2: z.number(),
});
export type Coverage = z.infer<typeof coverage>;

export const source = z.strictObject({
  entryId: rowId,
  rowNo: z.number().int(),
  designation: z.string(),
  raDeg: z.number(),
  decDeg: z.number(),
  errMajArcsec: z.number().nullable(),
  errMinArcsec: z.number().nullable(),
  errPaDeg: z.number().nullable(),
  pmRaMasYr: z.number().nullable(),
  pmDecMasYr: z.number().nullable(),
  /** Every cell of the row as written, in the order of the catalogue's columns. */
  cells: z.array(z.string()),
  objectNumber: z.number().int().nullable(),
});
export type Source = z.infer<typeof source>;

export const sourcePage = pageOf(source);
export const sourceQuery = pageQuery.extend({
  /** 'row', 'designation', 'ra', 'dec', 'error' or 'c<index>' for an original column. */
  sort: z.string().regex(/^(row|designation|ra|dec|error|c\d{1,4})$/).default('row'),
  order: z.enum(['asc', 'desc']).default('asc'),
  /** Rows whose designation or any cell contains this text (case folded). */
  text: z.string().max(200).optional(),
  /** With ra, dec and radiusArcsec: only sources inside the cone. */
  ra: z.coerce.number().min(0).max(360).optional(),
  dec: z.coerce.number().min(-90).max(90).optional(),
  radiusArcsec: z.coerce.number().positive().max(36000).optional(),
});

export const setAsidePage = pageOf(setAsideRow);

/** A catalogue's citation and how many live objects have a source in it. */
export const catalogueCitation = z.strictObject({
  label: catalogueLabel,
  title: z.string(),
  ordinal: z.number().int(),
  citation: z.string(),
  objects: z.number().int(),
});
export type CatalogueCitation = z.infer<typeof catalogueCitation>;
export const citationList = z.strictObject({ items: z.array(catalogueCitation) });
