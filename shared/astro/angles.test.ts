import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  formatDec,
  formatRa,
  parseDec,
  parsePosition,
  parseRa,
  splitCombinedPosition,
  type AngleResult,
  type DecNotation,
  type RaNotation,
} from './angles';

function degOf(result: AngleResult): number {
  return result.ok ? result.deg : NaN;
}

function codeOf(result: AngleResult): string {
  return result.ok ? 'read' : result.code;
}

describe('parseRa', () => {
  it.each<[string, RaNotation, number]>([
    ['188.7305', 'degrees', 188.7305],
    ['+188.7305', 'degrees', 188.7305],
    ['.5', 'degrees', 0.5],
    ['12.', 'degrees', 12],
    ['1.887305e2', 'degrees', 188.7305],
    ['188.7305°', 'degrees', 188.7305],
    [' 188.7305 deg ', 'degrees', 188.7305],
    ['360', 'degrees', 0],
    ['-0', 'degrees', 0],
    ['12.5', 'hours', 187.5],
    ['12.5h', 'hours', 187.5],
    ['24', 'hours', 0],
    ['12:30:00', 'sexagesimal-hours', 187.5],
    ['12 30', 'sexagesimal-hours', 187.5],
    ['12.5', 'sexagesimal-hours', 187.5],
    ['12h30m', 'sexagesimal-hours', 187.5],
    ['12h 30m 0.00s', 'sexagesimal-hours', 187.5],
    ['12ʰ30ᵐ00ˢ', 'sexagesimal-hours', 187.5],
    ['187 30 00', 'sexagesimal-degrees', 187.5],
    ['187d30m', 'sexagesimal-degrees', 187.5],
    ["187°30'00''", 'sexagesimal-degrees', 187.5],
    ['187°30’00”', 'sexagesimal-degrees', 187.5],
  ])('reads %s as %s', (text, notation, deg) => {
    const result = parseRa(text, notation);
    expect(codeOf(result)).toBe('read');
    expect(degOf(result)).toBeCloseTo(deg, 11);
    expect(Object.is(degOf(result), -0)).toBe(false);
  });

  it.each<[string, RaNotation, string]>([
    ['', 'degrees', 'no-position'],
    ['   ', 'sexagesimal-hours', 'no-position'],
    ['NaN', 'degrees', 'no-position'],
    ['--', 'degrees', 'no-position'],
    ['n/a', 'sexagesimal-hours', 'no-position'],
    ['360.0001', 'degrees', 'ra-out-of-range'],
    ['-0.001', 'degrees', 'ra-out-of-range'],
    ['24.1', 'hours', 'ra-out-of-range'],
    ['24:00:00.1', 'sexagesimal-hours', 'ra-out-of-range'],
    ['1e400', 'degrees', 'ra-out-of-range'],
    ['Infinity', 'degrees', 'unreadable-number'],
    ['0x10', 'degrees', 'unreadable-number'],
    ['12,5', 'degrees', 'unreadable-number'],
    ['12:30:00', 'degrees', 'unreadable-number'],
    ['12.5h', 'degrees', 'unreadable-number'],
    ['12.5°', 'hours', 'unreadable-number'],
    ['187d30m', 'sexagesimal-hours', 'unreadable-angle'],
    ['12h30m', 'sexagesimal-degrees', 'unreadable-angle'],
    ["12h30'", 'sexagesimal-hours', 'unreadable-angle'],
    ['12:30:', 'sexagesimal-hours', 'unreadable-angle'],
    ['12:30:60.5', 'sexagesimal-hours', 'unreadable-angle'],
    ['12m30s', 'sexagesimal-hours', 'unreadable-angle'],
    ['12:30:00x', 'sexagesimal-hours', 'unreadable-angle'],
    ['12 30 . 5', 'sexagesimal-hours', 'unreadable-angle'],
  ])('refuses %j as %s: %s', (text, notation, code) => {
    const result = parseRa(text, notation);
    expect(codeOf(result)).toBe(code);
    expect(result.ok ? '' : result.message).toMatch(/^“.*” can’t be read as an angle: .+\.$/);
  });

  it('carries 60 seconds and says so', () => {
    expect(parseRa('05:35:60.0', 'sexagesimal-hours')).toEqual({ ok: true, deg: 84, carried: true });
    expect(parseRa('05:36:00.0', 'sexagesimal-hours')).toEqual({ ok: true, deg: 84, carried: false });
  });

  it('reads a decimal comma only when told to', () => {
    expect(degOf(parseRa('187,5', 'degrees', { decimalComma: true }))).toBe(187.5);
    expect(degOf(parseRa('12 30 00,6', 'sexagesimal-hours', { decimalComma: true }))).toBeCloseTo(
      187.5025,
      11,
    );
    expect(codeOf(parseRa('12 30 00,6', 'sexagesimal-hours'))).toBe('unreadable-angle');
  });

  it('shortens long cells in its message', () => {
    const result = parseRa('x'.repeat(10_000), 'degrees');
    expect(result.ok ? 0 : result.message.length).toBeLessThan(120);
  });
});

describe('parseDec', () => {
  it.each<[string, DecNotation, number]>([
    ['-12.5', 'degrees', -12.5],
    ['−12.5', 'degrees', -12.5],
    ['–12.5', 'degrees', -12.5],
    ['90', 'degrees', 90],
    ['-90', 'degrees', -90],
    ['-00 12 30', 'sexagesimal-degrees', -0.20833333333333334],
    ['–00:12:30', 'sexagesimal-degrees', -0.20833333333333334],
    ['- 00 12 30', 'sexagesimal-degrees', -0.20833333333333334],
    ['−00°12′30″', 'sexagesimal-degrees', -0.20833333333333334],
    ['-00d12m30s', 'sexagesimal-degrees', -0.20833333333333334],
    ['+41:16:09', 'sexagesimal-degrees', 41.26916666666666],
  ])('reads %s as %s', (text, notation, deg) => {
    expect(degOf(parseDec(text, notation))).toBeCloseTo(deg, 12);
  });

  it.each<[string, DecNotation, string]>([
    ['90.0001', 'degrees', 'dec-out-of-range'],
    ['-90 00 00.1', 'sexagesimal-degrees', 'dec-out-of-range'],
    ['12h30m', 'sexagesimal-degrees', 'unreadable-angle'],
    ['+-12', 'sexagesimal-degrees', 'unreadable-angle'],
    ['--12', 'degrees', 'unreadable-number'],
    ['12 -30', 'sexagesimal-degrees', 'unreadable-angle'],
  ])('refuses %j as %s: %s', (text, notation, code) => {
    expect(codeOf(parseDec(text, notation))).toBe(code);
  });
});

describe('formatRa and formatDec', () => {
  it('carries rounded seconds and wraps at 24 h', () => {
    expect(formatRa(15 - 1e-9, 3)).toBe('01:00:00.000');
    expect(formatRa(359.99999999, 3)).toBe('00:00:00.000');
    expect(formatDec(-59.99999999, 2)).toBe('-60:00:00.00');
    expect(formatDec(-0, 0)).toBe('+00:00:00');
  });

  it('refuses what has no text', () => {
    expect(() => formatRa(NaN, 2)).toThrow(RangeError);
    expect(() => formatDec(10, 10)).toThrow(RangeError);
  });

  it('what is written can be read back', () => {
    const ra = fc.double({ min: 0, max: 359.9999, noNaN: true });
    const dec = fc.double({ min: -90, max: 90, noNaN: true });
    fc.assert(
      fc.property(ra, dec, (raDeg, decDeg) => {
        const half = 0.5e-6 / 3600;
        const readRa = degOf(parseRa(formatRa(raDeg, 6), 'sexagesimal-hours'));
        expect(Math.abs(readRa - raDeg)).toBeLessThan(15 * half + 1e-12);
        const readDec = degOf(parseDec(formatDec(decDeg, 6), 'sexagesimal-degrees'));
        expect(Math.abs(readDec - decDeg)).toBeLessThan(half + 1e-12);
      }),
    );
  });
});

describe('splitCombinedPosition', () => {
  it.each<[string, [string, string] | null]>([
    ['12 34 56.7 -01 02 03', ['12 34 56.7', '-01 02 03']],
    ['12 34 56.7 −01 02 03', ['12 34 56.7', '−01 02 03']],
    ['188.73 -1.034', ['188.73', '-1.034']],
    ['188.73, 1.034', ['188.73', '1.034']],
    ['188.73;1.034', ['188.73', '1.034']],
    ['12 34 56.7 01 02 03', ['12 34 56.7', '01 02 03']],
    ['12h34m56s12d23m28s', ['12h34m56s', '12d23m28s']],
    ['12:34:56 12:23:28', ['12 34 56', '12 23 28']],
    ['1.8873e+2 -1.034', ['1.8873e+2', '-1.034']],
    ['12 34 56 01 02', null],
    ['188.73', null],
    ['188.73,', null],
    ['1,2,3', null],
    ['', null],
  ])('%j', (text, parts) => {
    expect(splitCombinedPosition(text)).toEqual(parts);
  });

  it('leaves commas alone when they are decimal signs', () => {
    expect(splitCombinedPosition('188,73 -1,034', { decimalComma: true })).toEqual(['188,73', '-1,034']);
  });
});

describe('parsePosition', () => {
  const place = { raDeg: 187.7059166666667, decDeg: 12.391111111111112 };

  it.each([
    '12:30:49.42 +12:23:28',
    '12 30 49.42 +12 23 28',
    '12 30 49.42 12 23 28',
    '12h30m49.42s+12d23m28s',
    '12h30m49.42s +12°23′28″',
    '12h 30m 49.42s, 12d 23m 28s',
    '12:30:49.42, 12:23:28',
    '187.70591666667 12.39111111111',
    '187.70591666667, +12.39111111111',
    '187.70591666667d 12.39111111111d',
    'J2000 12:30:49.42 +12:23:28',
    '12:30:49.42 +12:23:28 (J2000)',
  ])('reads %s', (text) => {
    const read = parsePosition(text);
    expect(read?.raDeg).toBeCloseTo(place.raDeg, 9);
    expect(read?.decDeg).toBeCloseTo(place.decDeg, 9);
  });

  it.each([
    'J123456.7-123456',
    'J1230+1223',
    'PKS 1817-43',
    '1817-43',
    'NGC 224',
    '47 Tuc',
    '3C 273',
    '61 Cyg A',
    '224',
    '12:30:49.42 +12:23:28 B1950',
    '400 10',
    '12 30 91',
    '25:00:00 +12:00:00',
    '12.5 +12 23 28',
    '',
  ])('does not take %j for a position', (text) => {
    expect(parsePosition(text)).toBeNull();
  });

  it('takes two whole numbers for degrees', () => {
    expect(parsePosition('187 12')).toEqual({ raDeg: 187, decDeg: 12 });
    expect(parsePosition('187 -12')).toEqual({ raDeg: 187, decDeg: -12 });
  });
});
