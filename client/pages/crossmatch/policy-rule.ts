import {
  MAX_RADIUS_ARCSEC,
  policyRule,
  type PairStatistics,
  type PolicyRule,
} from '../../../shared/schemas/run';
import { radiusOfShareArcsec, sigmaOfShareArcsec } from '../../../shared/astro/errors';
import type { Grade } from '../../../shared/words';

/** A rule while it is being typed. */
export interface RuleDraft {
  /** As typed, arcsec. */
  maxSepText: string;
  mutualBest: boolean;
  noRival: boolean;
  grade: Grade;
}

/** Share of the true pairs that the first proposal of a rule takes in. */
const PROPOSED_SHARE = 0.99;

/**
 * A separation (arcsec) to begin a rule with: it holds 99 % of the true pairs if their separations are those of
 * circular normal errors with the measured median; half of the run's radius where no median is known. Of several
 * pairs of catalogues the widest counts; never beyond the radius.
 */
export function proposedSepArcsec(
  pairs: readonly Pick<PairStatistics, 'medianSepArcsec'>[],
  radiusArcsec: number,
): number {
  const medians = pairs.flatMap(({ medianSepArcsec: m }) => (m !== null && m > 0 ? [m] : []));
  if (medians.length === 0) return roundedSep(radiusArcsec / 2);
  const sigmaArcsec = sigmaOfShareArcsec(Math.max(...medians), 0.5);
  return roundedSep(Math.min(radiusArcsec, radiusOfShareArcsec(PROPOSED_SHARE, sigmaArcsec)));
}

/** Three significant digits: a limit that a person can say aloud. */
export function roundedSep(sepArcsec: number): number {
  return Number(sepArcsec.toPrecision(3));
}

/** The typed separation in arcsec; null when it is not a number the rule can take. */
export function draftSepArcsec(draft: Pick<RuleDraft, 'maxSepText'>): number | null {
  const text = draft.maxSepText.trim();
  const value = text === '' ? NaN : Number(text);
  return value > 0 && value <= MAX_RADIUS_ARCSEC ? value : null;
}

/** The rule as the API takes it; null while the draft is not one. */
export function ruleOfDraft(draft: RuleDraft): PolicyRule | null {
  const { mutualBest, noRival, grade } = draft;
  const parsed = policyRule.safeParse({ maxSepArcsec: draftSepArcsec(draft), mutualBest, noRival, grade });
  return parsed.success ? parsed.data : null;
}
