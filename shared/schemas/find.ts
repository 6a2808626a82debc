import { z } from 'zod';
import { objectNumber, objectSummary } from './object';

export const findQuery = z.strictObject({
  q: z.string().trim().min(1).max(300),
  radiusArcsec: z.coerce.number().positive().max(36000).default(10),
  limit: z.coerce.number().int().min(1).max(50).default(10),
});

/** How the text was read. Near misses are offered beside it, never taken. */
export const findAnswer = z.strictObject({
  q: z.string(),
  read: z.enum(['number', 'position', 'name']),
  position: z.strictObject({ raDeg: z.number(), decDeg: z.number(), radiusArcsec: z.number() }).nullable(),
  /** Objects that are exactly meant: the number, the cone (nearest first), or the name key. */
  exact: z.array(objectSummary.extend({ alias: z.string().nullable() })),
  nearMisses: z.array(
    z.strictObject({ alias: z.string(), number: objectNumber, name: z.string(), reason: z.string() }),
  ),
  forwardedFrom: objectNumber.nullable(),
});
export type FindAnswer = z.infer<typeof findAnswer>;
