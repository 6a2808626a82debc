import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { linearScale, linearTicks, logScale, roundDown125, tickStep, tickText } from './scales';

describe('linearScale', () => {
  it('maps the ends of the domain to the ends of the range, also downwards', () => {
    const y = linearScale(0, 10, 200, 0);
    expect([y.at(0), y.at(10), y.at(2.5)]).toEqual([200, 0, 150]);
    expect(y.valueAt(50)).toBe(7.5);
  });

  it('refuses an empty, turned or endless domain', () => {
    expect(() => linearScale(1, 1, 0, 1)).toThrow(RangeError);
    expect(() => linearScale(2, 1, 0, 1)).toThrow(RangeError);
    expect(() => linearScale(0, Infinity, 0, 1)).toThrow(RangeError);
  });
});

describe('logScale', () => {
  it('gives each decade the same room', () => {
    const x = logScale(0.01, 100, 0, 400);
    expect([0.01, 0.1, 1, 10, 100].map((v) => Math.round(x.at(v) * 1e9) / 1e9)).toEqual([
      0, 100, 200, 300, 400,
    ]);
    expect(x.valueAt(150)).toBeCloseTo(10 ** -0.5, 12);
  });

  it('has no place for zero and refuses a domain that holds it', () => {
    expect(logScale(1, 10, 0, 1).at(0)).toBeNaN();
    expect(() => logScale(0, 10, 0, 1)).toThrow(RangeError);
  });
});

describe('ticks', () => {
  it('takes 1, 2, 5 times a power of ten', () => {
    expect([0.99, 1, 1.99, 2, 4.9, 5, 9.9, 10, 0.002, 34_567].map(roundDown125)).toEqual([
      0.5, 1, 1, 2, 2, 5, 5, 10, 0.002, 20_000,
    ]);
  });

  it('stands at round numbers without rounding noise', () => {
    expect(linearTicks(0, 1, 10)).toEqual([0, 0.1, 0.2, 0.3, 0.4, 0.5, 0.6, 0.7, 0.8, 0.9, 1]);
    expect(linearTicks(-0.3, 0.3, 3)).toEqual([-0.2, 0, 0.2]);
    expect(linearTicks(187.31, 187.69, 4)).toEqual([187.4, 187.5, 187.6]);
    expect(linearTicks(0, 1234, 5)).toEqual([0, 500, 1000]);
  });

  it('keeps to the wanted number, inside the range, rising', () => {
    fc.assert(
      fc.property(
        fc.double({ min: -1e5, max: 1e5, noNaN: true }),
        fc.double({ min: 1e-3, max: 1e5, noNaN: true }),
        fc.integer({ min: 1, max: 12 }),
        (lo, span, most) => {
          const hi = lo + span;
          const ticks = linearTicks(lo, hi, most);
          const step = tickStep(lo, hi, most);
          expect(step).toBeGreaterThanOrEqual((span / most) * (1 - 1e-6));
          expect(ticks.length).toBeLessThanOrEqual(most + 1);
          for (const [i, tick] of ticks.entries()) {
            expect(tick).toBeGreaterThanOrEqual(lo - step * 1e-6);
            expect(tick).toBeLessThanOrEqual(hi + step * 1e-6);
            if (i > 0) expect(tick - (ticks[i - 1] ?? NaN)).toBeCloseTo(step, 9);
          }
        },
      ),
    );
  });

  it('writes as many decimals as the step needs, with a real minus', () => {
    expect(tickText(0.5, 0.1)).toBe('0.5');
    expect(tickText(2, 1)).toBe('2');
    expect(tickText(-0.25, 0.05)).toBe('−0.25');
  });
});
