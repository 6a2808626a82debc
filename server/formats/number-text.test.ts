import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { hasNoValue, readNumber, readPlainDecimal } from './number-text';

describe('numbers in cells', () => {
  it('tells no value from no number', () => {
    for (const cell of [
      '',
      '  ',
      'NaN',
      'nan',
      'null',
      'NULL',
      '-',
      '--',
      '---',
      'n/a',
      'N/A',
      '...',
      '\\N',
      '—',
    ]) {
      expect(readNumber(cell, false), cell).toBeNull();
      expect(hasNoValue(cell), cell).toBe(true);
    }
    for (const cell of [
      'x',
      '1 2',
      '0x1f',
      'Infinity',
      '1e',
      '12:30',
      '<21.5',
      '1,5',
      '+-1',
      '.',
      '1e999',
      '1.2.3',
    ]) {
      const expected = cell === '.' ? null : NaN;
      expect(readNumber(cell, false), cell).toEqual(expected);
    }
    expect(hasNoValue('NGC 1')).toBe(false);
  });

  it('takes signs, exponents, Unicode minus and blanks around', () => {
    expect(readNumber('+1.5', false)).toBe(1.5);
    expect(readNumber(' -0.25 ', false)).toBe(-0.25);
    expect(readNumber('−3', false)).toBe(-3);
    expect(readNumber('8.7e-05', false)).toBe(8.7e-5);
    expect(readNumber('.5', false)).toBe(0.5);
    expect(readNumber('5.', false)).toBe(5);
  });

  it('takes a comma for the point only when told so', () => {
    expect(readNumber('-12,25', true)).toBe(-12.25);
    expect(readNumber('1,234,5', true)).toBeNaN();
    expect(readNumber('-12,25', false)).toBeNaN();
  });

  it('gives the same double as the reading of JavaScript', () => {
    const digits = fc.string({ unit: fc.constantFrom(...'0123456789'), minLength: 1, maxLength: 18 });
    fc.assert(
      fc.property(fc.constantFrom('', '-', '+'), digits, digits, (sign, whole, decimals) => {
        const text = `${sign}${whole}.${decimals}`;
        expect(readNumber(text, false)).toBe(Number(text));
        const quick = readPlainDecimal(text);
        expect(Number.isNaN(quick) || quick === Number(text)).toBe(true);
      }),
      { numRuns: 5000 },
    );
  });
});
