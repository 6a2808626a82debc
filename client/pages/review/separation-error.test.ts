import { describe, expect, it } from 'vitest';
import { separationErrorArcsec } from './separation-error';

const circle = (errMajArcsec: number | null) => ({ errMajArcsec, errMinArcsec: null, errPaDeg: null });
const EXACT = { errMajArcsec: 1e-9, errMinArcsec: null, errPaDeg: null };

describe('separationErrorArcsec', () => {
  it('adds circular errors in quadrature, whatever the direction', () => {
    for (const paDeg of [null, 0, 37, 270]) {
      expect(separationErrorArcsec(circle(0.3), circle(0.4), paDeg)).toBeCloseTo(0.5, 12);
    }
  });

  it('takes the long axis along the ellipse and the short one across it', () => {
    const thin = { errMajArcsec: 2, errMinArcsec: 0.5, errPaDeg: 30 };
    expect(separationErrorArcsec(thin, EXACT, 30)).toBeCloseTo(2, 9);
    expect(separationErrorArcsec(thin, EXACT, 210)).toBeCloseTo(2, 9);
    expect(separationErrorArcsec(thin, EXACT, 120)).toBeCloseTo(0.5, 9);
    expect(separationErrorArcsec(thin, EXACT, null)).toBeCloseTo(2, 9);
  });

  it('says nothing when a side states no error', () => {
    expect(separationErrorArcsec(circle(null), circle(0.4), 0)).toBeNull();
    expect(separationErrorArcsec(circle(0.4), circle(0), 0)).toBeNull();
  });
});
