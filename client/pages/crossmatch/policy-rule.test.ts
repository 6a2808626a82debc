import { describe, expect, it } from 'vitest';
import { draftSepArcsec, proposedSepArcsec, ruleOfDraft, type RuleDraft } from './policy-rule';

const DRAFT: RuleDraft = { maxSepText: '0.5', mutualBest: true, noRival: true, grade: 'certain' };

describe('proposedSepArcsec', () => {
  it('holds 99 % of Rayleigh-distributed separations with the measured median', () => {
    // Closed form of the Rayleigh distribution: r99 / r50 = sqrt(ln 100 / ln 2) = 2.5776.
    expect(proposedSepArcsec([{ medianSepArcsec: 1 }], 10)).toBe(2.58);
  });

  it('takes the widest pair of catalogues, and never more than the radius', () => {
    expect(proposedSepArcsec([{ medianSepArcsec: 0.1 }, { medianSepArcsec: 0.4 }], 10)).toBe(1.03);
    expect(proposedSepArcsec([{ medianSepArcsec: 1 }], 2)).toBe(2);
  });

  it('takes half the radius where no median is known', () => {
    expect(proposedSepArcsec([{ medianSepArcsec: null }], 3)).toBe(1.5);
    expect(proposedSepArcsec([{ medianSepArcsec: 0 }], 3)).toBe(1.5);
  });
});

describe('a rule while it is typed', () => {
  it('is a rule once the separation can be read', () => {
    expect(ruleOfDraft(DRAFT)).toEqual({
      maxSepArcsec: 0.5,
      mutualBest: true,
      noRival: true,
      grade: 'certain',
    });
  });

  it.each(['', ' ', '0', '-1', 'wide', '3601', 'NaN', 'Infinity'])(
    'is none with a separation of "%s"',
    (text) => {
      expect(draftSepArcsec({ maxSepText: text })).toBeNull();
      expect(ruleOfDraft({ ...DRAFT, maxSepText: text })).toBeNull();
    },
  );
});
