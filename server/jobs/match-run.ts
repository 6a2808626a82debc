import type { JobKindWork } from '../services/jobs';
import { unwindRun, workOnRun } from '../services/run-work';

/** Compares the catalogues of a run on the sphere and keeps its candidates. */
export const matchRunJob: JobKindWork = { work: workOnRun, unwind: unwindRun };
