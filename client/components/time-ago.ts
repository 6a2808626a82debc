const WORDS = new Intl.RelativeTimeFormat('en-GB', { numeric: 'auto' });
const STEPS = [
  { unit: 'minute', ms: 60_000 },
  { unit: 'hour', ms: 3_600_000 },
  { unit: 'day', ms: 86_400_000 },
] as const;
const DAYS_IN_WORDS = 30;

/** A moment (ms since 1970) as seen from `nowMs`: 'just now', '5 minutes ago', 'yesterday'; a date beyond 30 days. */
export function timeAgo(atMs: number, nowMs: number): string {
  if (!Number.isFinite(atMs)) return '–';
  const agoMs = nowMs - atMs;
  if (Math.abs(agoMs) < 60_000) return 'just now';
  if (Math.abs(agoMs) > DAYS_IN_WORDS * 86_400_000) return new Date(atMs).toISOString().slice(0, 10);
  const step = STEPS.findLast(({ ms }) => Math.abs(agoMs) >= ms) ?? STEPS[0];
  return WORDS.format(-Math.trunc(agoMs / step.ms), step.unit);
}
