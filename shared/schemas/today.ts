import { z } from 'zod';
import { job } from './job';
import { instant } from './page';

export const today = z.strictObject({
  catalogues: z.number().int(),
  sources: z.number().int(),
  setAsideRows: z.number().int(),
  objects: z.number().int(),
  mergedObjects: z.number().int(),
  undecided: z.array(
    z.strictObject({ run: z.number().int(), title: z.string(), undecided: z.number().int(), crowded: z.number().int() }),
  ),
  conflicts: z.number().int(),
  contestedNames: z.number().int(),
  jobs: z.array(job),
  recent: z.array(z.strictObject({ at: instant, by: z.string(), what: z.string(), link: z.string().nullable() })),
});
export type Today = z.infer<typeof today>;
