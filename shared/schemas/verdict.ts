import { z } from 'zod';
import { FLAGS, GRADES, VERDICT_VALUES } from '../words';
import { rowId } from './page';
import { verdictInForce } from './run';

export const newVerdict = z
  .strictObject({
    entryA: rowId,
    entryB: rowId,
    value: z.enum(VERDICT_VALUES),
    grade: z.enum(GRADES).nullable().default(null),
    flags: z.array(z.enum(FLAGS)).max(FLAGS.length).default([]),
    remark: z.string().trim().max(2000).default(''),
    /** The run on whose candidate the verdict was given, if any. */
    run: z.number().int().nullable().default(null),
  })
  .refine((v) => v.entryA !== v.entryB, { error: 'A source cannot be compared with itself.', path: ['entryB'] });
export type NewVerdict = z.infer<typeof newVerdict>;

/** What a verdict did to the registry. */
export const verdictResult = z.strictObject({
  /** Null after taking back the only verdict of a pair. */
  verdict: verdictInForce.nullable(),
  /** Live object numbers of the two entries afterwards. */
  objectA: z.number().int(),
  objectB: z.number().int(),
  /** True when a 'same' verdict could not be carried out because a 'different' one forbids it. */
  conflict: z.boolean(),
});
export type VerdictResult = z.infer<typeof verdictResult>;

const chainLink = z.strictObject({
  entryId: rowId,
  catalogue: z.string(),
  designation: z.string(),
});

/** A 'same' verdict that is not carried out: which chain would join, and which verdict forbids it. */
export const conflict = z.strictObject({
  sameVerdictId: rowId,
  a: chainLink,
  b: chainLink,
  forbiddenA: chainLink,
  forbiddenB: chainLink,
  differentVerdictId: rowId,
  chain: z.array(chainLink),
  objectNumbers: z.array(z.number().int()),
});
export type Conflict = z.infer<typeof conflict>;
export const conflictList = z.strictObject({ items: z.array(conflict), total: z.number().int() });
