import { describe, expect, it } from 'vitest';
import { RULER_LABELS, RULER_TICKS, rulerPx, rulerSepArcsec, rulerText, steppedSep } from './ruler-scale';

describe('ruler', () => {
  it('runs from 0.01″ to 10′ on a log scale, and keeps what lies beyond at its ends', () => {
    expect(rulerPx(0.01, 400)).toBe(0);
    expect(rulerPx(600, 400)).toBeCloseTo(400, 9);
    expect(rulerPx(1, 400)).toBeCloseTo((400 * 2) / Math.log10(60_000), 9);
    expect(rulerPx(0.0001, 400)).toBe(0);
    expect(rulerPx(3600, 400)).toBeCloseTo(400, 9);
  });

  it('reads a place back', () => {
    for (const sep of [0.02, 0.7, 3.3, 75])
      expect(rulerSepArcsec(rulerPx(sep, 333), 333)).toBeCloseTo(sep, 9);
    expect(rulerSepArcsec(-20, 333)).toBeCloseTo(0.01, 12);
  });

  it('has ticks only inside, and none where a number stands', () => {
    const labelled = RULER_LABELS.map(({ sepArcsec }) => sepArcsec);
    expect(RULER_TICKS.every((tick) => tick > 0.01 && tick < 600 && !labelled.includes(tick))).toBe(true);
    expect([...RULER_TICKS]).toEqual([...RULER_TICKS].sort((a, b) => a - b));
  });

  it('moves its limit by hundredths of a decade inside the scale', () => {
    expect(steppedSep(1, 1)).toBe(1.02);
    expect(steppedSep(1, -100)).toBe(0.1);
    expect(steppedSep(590, 50)).toBe(600);
  });

  it('says in words what it shows', () => {
    expect(rulerText([{ sepArcsec: 1.234, errArcsec: 0.2, label: 'DEEP' }, { sepArcsec: 90 }], 2)).toBe(
      'DEEP 1.234″ ± 0.2000″; 1.50′; limit 2.000″',
    );
    expect(rulerText([], null)).toBe('no separation');
  });
});
