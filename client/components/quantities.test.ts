import { describe, expect, it } from 'vitest';
import { jobPace } from './job-pace';
import { numberOrNull } from './number-field-values';
import { formatBytes, formatCount, formatDuration, formatFixed, formatSepArcsec, plural } from './quantities';
import { secondsDigits } from './seconds-digits';
import { timeAgo } from './time-ago';

describe('quantities', () => {
  it('writes counts in groups of three', () => {
    expect(formatCount(1_234_567)).toBe('1,234,567');
    expect([plural(1, 'row', 'rows'), plural(0, 'row', 'rows')]).toEqual(['1 row', '0 rows']);
  });

  it('writes separations with the digits that their size deserves', () => {
    expect([0, 0.00012, 0.99996, 1, 59.9994, 60, 200, 7200].map(formatSepArcsec)).toEqual([
      '0.0000″',
      '0.0001″',
      '1.0000″',
      '1.000″',
      '59.999″',
      '1.00′',
      '3.33′',
      '2.000°',
    ]);
    expect(formatSepArcsec(NaN)).toBe('–');
  });

  it('has a real minus and no negative zero', () => {
    expect([formatFixed(-1.25, 1), formatFixed(-0.001, 2), formatFixed(Infinity, 1)]).toEqual([
      '−1.3',
      '0.00',
      '–',
    ]);
  });

  it('writes sizes and durations', () => {
    expect([0, 999, 13_400_000, 2e9].map(formatBytes)).toEqual([
      '0\u00a0B',
      '999\u00a0B',
      '13.4\u00a0MB',
      '2.0\u00a0GB',
    ]);
    expect([0.4, 59.6, 200, 3600, 90_061].map(formatDuration)).toEqual([
      '0 s',
      '1 min',
      '3 min 20 s',
      '1 h',
      '1 d 1 h',
    ]);
  });

  it('gives seconds as many decimals as the error deserves', () => {
    expect([null, 5, 0.3, 0.02, 1e-6].map(secondsDigits)).toEqual([2, 1, 2, 3, 4]);
  });
});

describe('timeAgo', () => {
  it('speaks in words up to 30 days and then gives the date', () => {
    const now = Date.parse('2026-03-31T12:00:00Z');
    const ago = (seconds: number) => timeAgo(now - seconds * 1000, now);
    expect([5, 300, 7200, 86_400, 3 * 86_400].map(ago)).toEqual([
      'just now',
      '5 minutes ago',
      '2 hours ago',
      'yesterday',
      '3 days ago',
    ]);
    expect(ago(40 * 86_400)).toBe('2026-02-19');
    expect(timeAgo(NaN, now)).toBe('–');
  });
});

describe('numberOrNull', () => {
  it('tells empty from unreadable', () => {
    expect([numberOrNull(''), numberOrNull('  '), numberOrNull(null)]).toEqual([null, null, null]);
    expect([numberOrNull(' 2.5 '), numberOrNull('−3'), numberOrNull(4)]).toEqual([2.5, -3, 4]);
    expect(numberOrNull('2,5')).toBeNaN();
  });
});

describe('jobPace', () => {
  const job = {
    state: 'running',
    done: 250,
    total: 1000,
    ratePerSecond: 50,
    startedAt: '2026-01-01T00:00:00Z',
    finishedAt: null,
  } as const;

  it('tells the share and the time left', () => {
    expect(jobPace(job)).toEqual({ share: 0.25, secondsLeft: 15, tookSeconds: null });
  });

  it('says nothing that it cannot know', () => {
    expect(jobPace({ ...job, total: null })).toEqual({ share: null, secondsLeft: null, tookSeconds: null });
    expect(jobPace({ ...job, ratePerSecond: 0 }).secondsLeft).toBeNull();
    expect(jobPace({ ...job, state: 'queued' }).secondsLeft).toBeNull();
    expect(jobPace({ ...job, state: 'done', finishedAt: '2026-01-01T00:01:12Z' }).tookSeconds).toBe(72);
  });
});
