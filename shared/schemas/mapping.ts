import { z } from 'zod';
import { ERROR_MEANINGS } from '../words';

/**
 * How the columns of an uploaded table become the fields of a source. Columns are named by their index
 * in the file (0 = first), because headers may be missing or repeated.
 */
const columnIndex = z.number().int().min(0).max(1999);

/** How a right ascension is written. 'sexagesimal-hours' covers '12:34:56.7', '12 34 56.7' and '12h34m56.7s'. */
export const raNotation = z.enum(['degrees', 'hours', 'sexagesimal-hours', 'sexagesimal-degrees']);
export const decNotation = z.enum(['degrees', 'sexagesimal-degrees']);
export const angleUnit = z.enum(['deg', 'arcmin', 'arcsec', 'mas']);
export const errorMeaning = z.enum(ERROR_MEANINGS);

export const positionMapping = z.discriminatedUnion('kind', [
  z.strictObject({
    kind: z.literal('two-columns'),
    raColumn: columnIndex,
    decColumn: columnIndex,
    raNotation,
    decNotation,
  }),
  /** RA and Dec in one cell, e.g. '12 34 56.7 -01 02 03' or '188.73 -1.034'. */
  z.strictObject({ kind: z.literal('one-column'), column: columnIndex, raNotation, decNotation }),
]);

/** One column that holds a name, or several names split by `separator`. */
export const nameMapping = z.strictObject({
  column: columnIndex,
  separator: z.string().min(1).max(3).nullable(),
});

/** Positional error. What is stored is one sigma per axis in arcsec; `meaning` tells what the file states. */
export const errorMapping = z.discriminatedUnion('kind', [
  z.strictObject({ kind: z.literal('constant'), valueArcsec: z.number().positive().max(3600), meaning: errorMeaning }),
  z.strictObject({ kind: z.literal('circle'), column: columnIndex, unit: angleUnit, meaning: errorMeaning }),
  z.strictObject({
    kind: z.literal('axes'),
    raColumn: columnIndex,
    decColumn: columnIndex,
    /** 'time-second': the RA error is given in seconds of time, without cos Dec (x 15 cos Dec). */
    raUnit: z.enum([...angleUnit.options, 'time-second']),
    decUnit: angleUnit,
    meaning: errorMeaning,
  }),
  z.strictObject({
    kind: z.literal('ellipse'),
    majorColumn: columnIndex,
    minorColumn: columnIndex,
    /** Degrees, east of north; null when the file states none (then 0). */
    paColumn: columnIndex.nullable(),
    unit: angleUnit,
    meaning: errorMeaning,
  }),
]);

export const properMotionMapping = z.strictObject({
  raColumn: columnIndex,
  decColumn: columnIndex,
  unit: z.enum(['mas/yr', 'arcsec/yr']),
  /** true: the column is mu_alpha* = mu_alpha cos Dec; false: mu_alpha. */
  raIncludesCosDec: z.boolean(),
});

export const photometryMapping = z.strictObject({
  column: columnIndex,
  errorColumn: columnIndex.nullable(),
  kind: z.enum(['magnitude', 'flux']),
  band: z.string().trim().min(1).max(30),
  unit: z.string().trim().min(1).max(30),
});

export const redshiftMapping = z.strictObject({
  column: columnIndex,
  errorColumn: columnIndex.nullable(),
  kind: z.enum(['redshift', 'velocity-km-s']),
});

export const columnMapping = z.strictObject({
  position: positionMapping,
  /** The catalogue's own key of a row; null: the first name, or the row number when there is none. */
  keyColumn: columnIndex.nullable(),
  names: z.array(nameMapping).max(20),
  error: errorMapping.nullable(),
  properMotion: properMotionMapping.nullable(),
  photometry: z.array(photometryMapping).max(40),
  redshift: redshiftMapping.nullable(),
});
export type ColumnMapping = z.infer<typeof columnMapping>;

/** How the bytes of a text table are read. */
export const textDialect = z.strictObject({
  compression: z.enum(['none', 'gzip']),
  encoding: z.enum(['utf-8', 'latin1']),
  /** 'spaces': any run of blanks separates two cells. */
  delimiter: z.enum([',', '\t', ';', '|', 'spaces']),
  quoted: z.boolean(),
  header: z.boolean(),
  /** Lines that begin with this are skipped; null: there are none. */
  commentPrefix: z.string().min(1).max(2).nullable(),
  decimalComma: z.boolean(),
});
export type TextDialect = z.infer<typeof textDialect>;

export const fileColumn = z.strictObject({
  name: z.string(),
  kind: z.enum(['number', 'text', 'sexagesimal', 'empty']),
  /** The first values that are not empty, as written. */
  examples: z.array(z.string()).max(5),
});
export type FileColumn = z.infer<typeof fileColumn>;

/** Reasons why a row is set aside instead of becoming a source. */
export const SET_ASIDE_CODES = [
  'no-position',
  'ra-out-of-range',
  'dec-out-of-range',
  'unreadable-number',
  'unreadable-angle',
  'duplicate-key',
  'no-key',
  'too-few-cells',
  'too-many-cells',
  'cell-too-long',
  'name-too-long',
  'control-character',
  'bad-quoting',
  'negative-error',
] as const;
export const setAsideCode = z.enum(SET_ASIDE_CODES);
export type SetAsideCode = z.infer<typeof setAsideCode>;

export const setAsideRow = z.strictObject({
  line: z.number().int(),
  column: z.string().nullable(),
  code: setAsideCode,
  message: z.string(),
  raw: z.string(),
});
export type SetAsideRow = z.infer<typeof setAsideRow>;

/** One row as it will be understood under a mapping. Angles in degrees, errors one sigma per axis in arcsec. */
export const understoodRow = z.strictObject({
  line: z.number().int(),
  key: z.string(),
  names: z.array(z.string()),
  raDeg: z.number(),
  decDeg: z.number(),
  errMajArcsec: z.number().nullable(),
  errMinArcsec: z.number().nullable(),
  errPaDeg: z.number().nullable(),
  pmRaMasYr: z.number().nullable(),
  pmDecMasYr: z.number().nullable(),
  photometry: z.array(z.strictObject({ band: z.string(), value: z.number().nullable(), error: z.number().nullable() })),
  redshift: z.number().nullable(),
});
export type UnderstoodRow = z.infer<typeof understoodRow>;

export const mappingPreview = z.strictObject({
  rows: z.array(understoodRow),
  setAside: z.array(setAsideRow),
});

export type MappingPreview = z.infer<typeof mappingPreview>;

/** What looking at the beginning of an uploaded file tells. */
export const fileInspection = z.strictObject({
  dialect: textDialect,
  columns: z.array(fileColumn).max(2000),
  /** Data rows in the part that was looked at (the whole file when it is small). */
  rowsSeen: z.number().int(),
  wholeFileSeen: z.boolean(),
  /** Null when no pair of columns looks like a position; the person then has to choose. */
  suggestedMapping: columnMapping.nullable(),
  /** First cells as written, at most 20 rows. */
  sample: z.array(z.array(z.string())).max(20),
});
export type FileInspection = z.infer<typeof fileInspection>;

/** A file that can't be read at all: one code, one sentence, and where. */
export const UNREADABLE_FILE_CODES = [
  'file-empty',
  'file-binary',
  'file-header-only',
  'file-too-many-columns',
  'file-row-too-long',
  'file-encoding',
  'file-gzip-broken',
  'file-gzip-bomb',
  'file-one-column',
] as const;
export type UnreadableFileCode = (typeof UNREADABLE_FILE_CODES)[number];
