import type { JobKindWork } from '../services/jobs';
import type { JobKind } from '../../shared/words';
import { applyPolicyJob } from './apply-policy';
import { importCatalogueJob } from './import-catalogue';
import { matchRunJob } from './match-run';

/** What a worker can do: one entry per kind of job. */
export const JOB_KIND_WORK: Record<JobKind, JobKindWork> = {
  import: importCatalogueJob,
  run: matchRunJob,
  policy: applyPolicyJob,
};
