import { z } from 'zod';

/** A keyset page: `next` is handed back as `after` to get the following page; null at the end. */
export function pageOf<T extends z.ZodType>(item: T) {
  return z.strictObject({
    items: z.array(item),
    next: z.string().nullable(),
    /** Rows in the whole list under the same filter; null where counting would cost more than the page. */
    total: z.number().int().nullable(),
  });
}

export const pageQuery = z.strictObject({
  limit: z.coerce.number().int().min(1).max(500).default(100),
  after: z.string().max(2000).optional(),
});

export const instant = z.iso.datetime({ offset: true });
/** Row ids of 64-bit columns travel as numbers; they stay below 2^53 by a database check. */
export const rowId = z.number().int().positive();
export const rowIdParam = z.coerce.number().int().positive();
