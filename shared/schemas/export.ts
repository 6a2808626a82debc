import { z } from 'zod';
import { catalogueLabel } from './catalogue';

/** Columns of the merged table: one row per live object. */
export const exportRecipe = z.strictObject({
  /** 'one-cell': all aliases in one cell separated by '; '. 'per-catalogue': one name column per catalogue. */
  aliases: z.enum(['one-cell', 'per-catalogue']),
  position: z.enum(['degrees', 'sexagesimal', 'both']),
  /** Separation of each member from the object's position, arcsec, one column per catalogue. */
  separations: z.boolean(),
  /** Lowest grade of the 'same' verdicts that hold the object together, and the number of verdicts. */
  grades: z.boolean(),
  catalogues: z
    .array(z.strictObject({ label: catalogueLabel, columns: z.array(z.number().int().min(0).max(1999)).max(2000) }))
    .max(50),
  /** Only objects with at least this many entries. */
  minEntries: z.number().int().min(1).max(100).default(1),
  /** Only objects that stand in all of these catalogues. */
  standingIn: z.array(catalogueLabel).max(50).default([]),
});
export type ExportRecipe = z.infer<typeof exportRecipe>;

export const exportOptions = z.strictObject({
  objects: z.number().int(),
  catalogues: z.array(
    z.strictObject({
      label: catalogueLabel,
      title: z.string(),
      ordinal: z.number().int(),
      columns: z.array(z.strictObject({ index: z.number().int(), name: z.string() })),
    }),
  ),
});
export type ExportOptions = z.infer<typeof exportOptions>;

export const exportPreview = z.strictObject({
  rows: z.number().int(),
  header: z.array(z.string()),
  sample: z.array(z.array(z.string())),
});
export type ExportPreview = z.infer<typeof exportPreview>;

/** The recipe travels as JSON in the query, so that the download is a plain link a person can keep. */
export const exportQuery = z.strictObject({
  recipe: z
    .string()
    .max(20000)
    .transform((text, context) => {
      try {
        return JSON.parse(text) as unknown;
      } catch {
        context.addIssue({ code: 'custom', message: 'The recipe is not JSON.' });
        return z.NEVER;
      }
    })
    .pipe(exportRecipe),
});
