import { z } from 'zod';
import { JOB_KINDS, JOB_STATES } from '../words';
import { instant } from './page';

export const job = z.strictObject({
  id: z.uuid(),
  kind: z.enum(JOB_KINDS),
  /** What the job works on, in words: 'Import of LAN-O', 'Cross-match 3'. */
  title: z.string(),
  state: z.enum(JOB_STATES),
  done: z.number().int(),
  total: z.number().int().nullable(),
  ratePerSecond: z.number().nullable(),
  message: z.string().nullable(),
  error: z.strictObject({ code: z.string(), detail: z.string(), hint: z.string().nullable() }).nullable(),
  /** Where the result is seen in the client, below /g/:group/. */
  link: z.string().nullable(),
  createdAt: instant,
  startedAt: instant.nullable(),
  finishedAt: instant.nullable(),
});
export type Job = z.infer<typeof job>;
export const jobList = z.strictObject({ items: z.array(job) });
export const jobAccepted = z.strictObject({ jobId: z.uuid() });
