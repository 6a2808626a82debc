import { z } from 'zod';

/** RFC 9457 problem details, with a stable `code` and a `hint` that says what to do. */
export const problem = z.object({
  type: z.string(),
  title: z.string(),
  status: z.number().int(),
  code: z.string(),
  detail: z.string(),
  hint: z.string().optional(),
  errors: z
    .array(
      z.object({
        path: z.string(),
        message: z.string(),
        line: z.number().int().optional(),
        column: z.string().optional(),
      }),
    )
    .optional(),
});
export type Problem = z.infer<typeof problem>;
