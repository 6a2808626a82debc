import { z } from 'zod';
import { FLAGS, GRADES, JOB_STATES, VERDICT_ORIGINS, VERDICT_VALUES } from '../words';
import { catalogueLabel } from './catalogue';
import { instant, pageOf, pageQuery, rowId } from './page';

export const MIN_RADIUS_ARCSEC = 0.01;
export const MAX_RADIUS_ARCSEC = 3600;

export const newRun = z.strictObject({
  catalogues: z
    .array(catalogueLabel)
    .min(2, { error: 'Choose at least two catalogues.' })
    .max(12)
    .refine((labels) => new Set(labels).size === labels.length, { error: 'A catalogue is named twice.' }),
  radiusArcsec: z
    .number({ error: 'Write a number of arcseconds.' })
    .min(MIN_RADIUS_ARCSEC, { error: `The radius is at least ${MIN_RADIUS_ARCSEC} arcsec.` })
    .max(MAX_RADIUS_ARCSEC, { error: `The radius is at most ${MAX_RADIUS_ARCSEC} arcsec (1 degree).` }),
  title: z.string().trim().max(200).default(''),
});
export type NewRun = z.infer<typeof newRun>;
export const runAccepted = z.strictObject({ run: z.number().int(), jobId: z.uuid() });

export const runCatalogue = z.strictObject({
  label: catalogueLabel,
  ordinal: z.number().int(),
  revision: z.number().int(),
  sources: z.number().int(),
  epochYear: z.number().nullable(),
});

/** Counts by separation; `chance` is measured by shifting the first catalogue and joining again. */
export const separationHistogram = z.strictObject({
  edgesArcsec: z.array(z.number()),
  counts: z.array(z.number().int()),
  chance: z.array(z.number()),
});

/** Per pair of catalogues: what the run found. */
export const pairStatistics = z.strictObject({
  a: catalogueLabel,
  b: catalogueLabel,
  candidates: z.number().int(),
  mutualBest: z.number().int(),
  /** Candidates with more than one partner inside the radius on either side. */
  crowded: z.number().int(),
  sourcesAWithCandidate: z.number().int(),
  sourcesBWithCandidate: z.number().int(),
  /** Median separation of mutual-best pairs, arcsec. */
  medianSepArcsec: z.number().nullable(),
  /** Median offset of B minus A over mutual-best pairs, arcsec, east and north. */
  medianOffsetEastArcsec: z.number().nullable(),
  medianOffsetNorthArcsec: z.number().nullable(),
  chancePairs: z.number(),
  histogram: separationHistogram,
});
export type PairStatistics = z.infer<typeof pairStatistics>;

export const verdictCounts = z.strictObject({
  same: z.number().int(),
  different: z.number().int(),
  unsure: z.number().int(),
  undecided: z.number().int(),
  automatic: z.number().int(),
});

export const runSummary = z.strictObject({
  run: z.number().int(),
  title: z.string(),
  catalogues: z.array(runCatalogue),
  radiusArcsec: z.number(),
  state: z.enum(JOB_STATES),
  candidates: z.number().int(),
  createdBy: z.string(),
  createdAt: instant,
  jobId: z.uuid(),
});
export type RunSummary = z.infer<typeof runSummary>;
export const runList = z.strictObject({ items: z.array(runSummary) });

/** Verdicts by rule for clear cases; every one is shown as automatic and can be taken back as a whole. */
export const policyRule = z.strictObject({
  /** Separation below this, arcsec. */
  maxSepArcsec: z.number().positive().max(MAX_RADIUS_ARCSEC),
  mutualBest: z.boolean(),
  /** No other candidate of either source inside the run's radius. */
  noRival: z.boolean(),
  grade: z.enum(GRADES),
});
export type PolicyRule = z.infer<typeof policyRule>;

export const policyCount = z.strictObject({
  /** Candidates the rule would decide 'same'. */
  automatic: z.number().int(),
  /** Candidates that stay for people. */
  toReview: z.number().int(),
  /** Candidates left alone because a verdict is already in force. */
  alreadyDecided: z.number().int(),
  /** Candidates the rule fits that would join entries a 'different' verdict keeps apart. */
  conflicts: z.number().int(),
});
export type PolicyCount = z.infer<typeof policyCount>;

export const appliedPolicy = z.strictObject({
  id: z.number().int(),
  rule: policyRule,
  verdicts: z.number().int(),
  by: z.string(),
  at: instant,
  takenBackAt: instant.nullable(),
});

export const runDetail = runSummary.extend({
  pairs: z.array(pairStatistics),
  verdicts: verdictCounts,
  policies: z.array(appliedPolicy),
  finishedAt: instant.nullable(),
  softwareVersion: z.string(),
});
export type RunDetail = z.infer<typeof runDetail>;

export const verdictInForce = z.strictObject({
  id: rowId,
  value: z.enum(VERDICT_VALUES),
  grade: z.enum(GRADES).nullable(),
  flags: z.array(z.enum(FLAGS)),
  remark: z.string(),
  origin: z.enum(VERDICT_ORIGINS),
  by: z.string(),
  at: instant,
});
export type VerdictInForce = z.infer<typeof verdictInForce>;

/** One side of a candidate. */
export const candidateSide = z.strictObject({
  catalogue: catalogueLabel,
  ordinal: z.number().int(),
  entryId: rowId,
  rowNo: z.number().int(),
  designation: z.string(),
  raDeg: z.number(),
  decDeg: z.number(),
  errMajArcsec: z.number().nullable(),
  errMinArcsec: z.number().nullable(),
  errPaDeg: z.number().nullable(),
  objectNumber: z.number().int().nullable(),
});

export const candidate = z.strictObject({
  seq: z.number().int(),
  a: candidateSide,
  b: candidateSide,
  sepArcsec: z.number(),
  /** From A to B, degrees east of north; null where it is undefined (zero separation, pole). */
  paDeg: z.number().nullable(),
  /** 1 = B is the nearest candidate of A. */
  rankA: z.number().int(),
  rankB: z.number().int(),
  rivalsA: z.number().int(),
  rivalsB: z.number().int(),
  mutualBest: z.boolean(),
  verdict: verdictInForce.nullable(),
});
export type Candidate = z.infer<typeof candidate>;
export const candidatePage = pageOf(candidate);

export const candidateQuery = pageQuery.extend({
  sort: z.enum(['sep', 'sep-desc']).default('sep'),
  verdict: z.enum(['any', 'undecided', ...VERDICT_VALUES]).default('any'),
  /** 'clear': mutual best without rivals; 'crowded': the rest. */
  kind: z.enum(['any', 'clear', 'crowded']).default('any'),
  minSepArcsec: z.coerce.number().min(0).optional(),
  maxSepArcsec: z.coerce.number().min(0).optional(),
  /** Labels of two catalogues of the run with a comma between, in either order. */
  pair: z.string().max(50).optional(),
});

/** Everything the desk shows for one candidate. */
export const deskTask = z.strictObject({
  candidate,
  /** Other candidates of either side in the same run. */
  others: z.array(candidate),
  /** Sources of the run's catalogues in the field of the chart. */
  field: z.array(candidateSide.extend({ pmRaMasYr: z.number().nullable(), pmDecMasYr: z.number().nullable() })),
  fieldRadiusArcsec: z.number(),
  /** Original columns of both rows, name and cell as written. */
  rowA: z.array(z.strictObject({ name: z.string(), cell: z.string() })),
  rowB: z.array(z.strictObject({ name: z.string(), cell: z.string() })),
  /** Verdicts given on this pair so far, the latest first. */
  past: z.array(verdictInForce.extend({ takenBack: z.boolean() })),
  /** Positions in the queue under the same filter. */
  previousSeq: z.number().int().nullable(),
  nextSeq: z.number().int().nullable(),
  undecidedLeft: z.number().int(),
});
export type DeskTask = z.infer<typeof deskTask>;
