import type { PolicyRule, RunSummary } from '../../shared/schemas/run';
import { formatSepArcsec } from './quantities';

/** Below this many pairs a median or a share says little. */
export const FEW_PAIRS = 50;

/** 'Cross-match 3: optical × X-ray', or the number alone. */
export function runName({ run, title }: Pick<RunSummary, 'run' | 'title'>): string {
  return title === '' ? `Cross-match ${run}` : `Cross-match ${run}: ${title}`;
}

/** Two labels as the API and the address name them. */
export function pairId(pair: { a: string; b: string }): string {
  return `${pair.a},${pair.b}`;
}

/** 'A × B' for the screen. */
export function pairName(pair: { a: string; b: string }): string {
  return `${pair.a} × ${pair.b}`;
}

export function epochText(epochYear: number | null): string {
  return epochYear === null ? 'not stated' : `J${epochYear.toFixed(1)}`;
}

/** A rule in words: 'separation below 1.200″, mutual best, no rival: same (certain)'. */
export function ruleText(rule: PolicyRule): string {
  const parts = [
    `separation below ${formatSepArcsec(rule.maxSepArcsec)}`,
    ...(rule.mutualBest ? ['mutual best'] : []),
    ...(rule.noRival ? ['no rival'] : []),
  ];
  return `${parts.join(', ')}: same, ${rule.grade}`;
}

/** The place, below the group, of a new cross-match with the settings of this one. */
export function againAddress({ catalogues, radiusArcsec, title }: RunSummary): string {
  const search = new URLSearchParams({
    catalogues: catalogues.map(({ label }) => label).join(','),
    radius: String(radiusArcsec),
    title,
  });
  return `cross-match/new?${search.toString()}`;
}
