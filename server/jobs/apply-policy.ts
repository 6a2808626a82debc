import type { JobKindWork } from '../services/jobs';
import { unwindPolicy, workOnPolicy } from '../services/policy-work';

/** Applies a policy to a run, or takes an applied one back as a whole. */
export const applyPolicyJob: JobKindWork = { work: workOnPolicy, unwind: unwindPolicy };
