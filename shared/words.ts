/** Closed vocabularies of the product: the same words in the database, the API and on the screen. */

/** Group roles, from the least to the most powerful. */
export const ROLES = ['reader', 'contributor', 'curator', 'owner'] as const;
export type Role = (typeof ROLES)[number];

/** True when `role` may do whatever `needed` may do. */
export function roleAtLeast(role: Role, needed: Role): boolean {
  return ROLES.indexOf(role) >= ROLES.indexOf(needed);
}

export const VERDICT_VALUES = ['same', 'different', 'unsure'] as const;
export type VerdictValue = (typeof VERDICT_VALUES)[number];

export const GRADES = ['certain', 'probable', 'possible'] as const;
export type Grade = (typeof GRADES)[number];

export const FLAGS = [
  'blend',
  'extended',
  'artefact',
  'variable',
  'high proper motion',
  'position doubtful',
] as const;
export type Flag = (typeof FLAGS)[number];

export const JOB_STATES = ['queued', 'running', 'done', 'failed', 'cancelled'] as const;
export type JobState = (typeof JOB_STATES)[number];

export const JOB_KINDS = ['import', 'run', 'policy'] as const;
export type JobKind = (typeof JOB_KINDS)[number];

/** How a catalogue states its circular positional errors; converted to one sigma per axis at import. */
export const ERROR_MEANINGS = ['sigma', 'r50', 'r68', 'r90', 'r95', 'r99'] as const;
export type ErrorMeaning = (typeof ERROR_MEANINGS)[number];

export const ALIAS_ORIGINS = ['entry', 'person'] as const;
export type AliasOrigin = (typeof ALIAS_ORIGINS)[number];

/** Who gave a verdict: a person, or a policy on a run. */
export const VERDICT_ORIGINS = ['person', 'policy'] as const;
export type VerdictOrigin = (typeof VERDICT_ORIGINS)[number];
