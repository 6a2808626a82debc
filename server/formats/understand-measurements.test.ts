import { describe, expect, it } from 'vitest';
import type { ColumnMapping, SetAsideRow, UnderstoodRow } from '../../shared/schemas/mapping';
import { compileMapping } from './understand';

const columns = ['ra', 'dec', 'a', 'b', 'c'].map((name) => ({ name }));

function read(
  values: readonly string[],
  mapping: Partial<ColumnMapping>,
  dec = '60',
): UnderstoodRow | SetAsideRow {
  const reader = compileMapping(
    {
      position: {
        kind: 'two-columns',
        raColumn: 0,
        decColumn: 1,
        raNotation: 'degrees',
        decNotation: 'degrees',
      },
      keyColumn: null,
      names: [],
      error: null,
      properMotion: null,
      photometry: [],
      redshift: null,
      ...mapping,
    },
    columns,
    { decimalComma: false },
  );
  const out = reader.newRow();
  const cells = ['10', dec, ...values, '', '', ''].slice(0, 5);
  return reader.read(cells, cells.join(','), 2, 1, out) ?? out;
}

const errorsOf = (row: UnderstoodRow | SetAsideRow) =>
  'raDeg' in row ? [row.errMajArcsec, row.errMinArcsec, row.errPaDeg] : row.code;

describe('positional errors become one sigma per axis in arcsec', () => {
  const circle = { kind: 'circle', column: 2, unit: 'arcsec', meaning: 'sigma' } as const;

  it('circles, in any unit', () => {
    expect(errorsOf(read(['0.5'], { error: circle }))).toEqual([0.5, 0.5, 0]);
    expect(errorsOf(read(['500'], { error: { ...circle, unit: 'mas' } }))).toEqual([0.5, 0.5, 0]);
    expect(errorsOf(read(['0.5'], { error: { ...circle, unit: 'arcmin' } }))).toEqual([30, 30, 0]);
    expect(errorsOf(read(['0.001'], { error: { ...circle, unit: 'deg' } }))).toEqual([3.6, 3.6, 0]);
    expect(errorsOf(read([''], { error: circle }))).toEqual([null, null, null]);
  });

  it.each([
    // Radii in sigma of the Rayleigh distribution: methods handbook, section 4, to four decimals.
    ['r50', 1.1774],
    ['r68', 1.5151],
    ['r90', 2.146],
    ['r95', 2.4477],
    ['r99', 3.0349],
  ] as const)('a radius %s is %d sigma', (meaning, sigmas) => {
    const row = read([String(sigmas)], { error: { ...circle, meaning } });
    expect('raDeg' in row && row.errMajArcsec).toBeCloseTo(1, 3);
    const constant = read([], { error: { kind: 'constant', valueArcsec: 2 * sigmas, meaning } });
    expect('raDeg' in constant && constant.errMinArcsec).toBeCloseTo(2, 3);
  });

  it('axes: the major axis lies along the larger error', () => {
    const axes = {
      kind: 'axes',
      raColumn: 2,
      decColumn: 3,
      raUnit: 'mas',
      decUnit: 'arcsec',
      meaning: 'sigma',
    } as const;
    expect(errorsOf(read(['300', '0.2'], { error: axes }))).toEqual([0.3, 0.2, 90]);
    expect(errorsOf(read(['100', '0.2'], { error: axes }))).toEqual([0.2, 0.1, 0]);
    expect(errorsOf(read(['100', ''], { error: axes }))).toEqual([null, null, null]);
  });

  it('axes: seconds of time are 15 cos Dec arcsec each', () => {
    const error = {
      kind: 'axes',
      raColumn: 2,
      decColumn: 3,
      raUnit: 'time-second',
      decUnit: 'arcsec',
      meaning: 'sigma',
    } as const;
    const row = read(['0.1', '0.2'], { error });
    expect('raDeg' in row && row.errMajArcsec).toBeCloseTo(0.75, 12);
    expect('raDeg' in row && row.errPaDeg).toBe(90);
  });

  it('ellipses: position angle in 0..180, exchanged axes are turned', () => {
    const error = {
      kind: 'ellipse',
      majorColumn: 2,
      minorColumn: 3,
      paColumn: 4,
      unit: 'arcsec',
      meaning: 'sigma',
    } as const;
    expect(errorsOf(read(['2', '1', '30'], { error }))).toEqual([2, 1, 30]);
    expect(errorsOf(read(['1', '2', '30'], { error }))).toEqual([2, 1, 120]);
    expect(errorsOf(read(['2', '1', '-30'], { error }))).toEqual([2, 1, 150]);
    expect(errorsOf(read(['2', '1', '190'], { error }))).toEqual([2, 1, 10]);
    expect(errorsOf(read(['2', '1', '30'], { error: { ...error, paColumn: null } }))).toEqual([2, 1, 0]);
    expect(errorsOf(read(['2', '1', 'x'], { error }))).toBe('unreadable-number');
  });

  it('a negative or unreadable error sets the row aside', () => {
    expect(read(['-0.5'], { error: circle })).toMatchObject({ code: 'negative-error', column: 'a', line: 2 });
    expect(read(['big'], { error: circle })).toMatchObject({
      code: 'unreadable-number',
      column: 'a',
      message: 'Column “a”: “big” is not a number.',
    });
  });
});

describe('motions, brightness, redshift', () => {
  const motion = { raColumn: 2, decColumn: 3, unit: 'mas/yr', raIncludesCosDec: true } as const;

  it('proper motions in mas/yr with cos Dec', () => {
    expect(read(['10', '-4'], { properMotion: motion })).toMatchObject({ pmRaMasYr: 10, pmDecMasYr: -4 });
    const row = read(['0.01', '-0.004'], {
      properMotion: { ...motion, unit: 'arcsec/yr', raIncludesCosDec: false },
    });
    expect('raDeg' in row && row.pmRaMasYr).toBeCloseTo(5, 12);
    expect('raDeg' in row && row.pmDecMasYr).toBe(-4);
    expect(read(['10', '--'], { properMotion: motion })).toMatchObject({ pmRaMasYr: null, pmDecMasYr: null });
    expect(read(['10', 'x'], { properMotion: motion })).toMatchObject({
      code: 'unreadable-number',
      column: 'b',
    });
  });

  it('photometry with errors; a missing value is null, a word sets the row aside', () => {
    const band = { column: 2, errorColumn: 3, kind: 'magnitude', band: 'V', unit: 'mag' } as const;
    expect(read(['12.5', '0.02'], { photometry: [band] })).toMatchObject({
      photometry: [{ band: 'V', value: 12.5, error: 0.02 }],
    });
    expect(read(['null', '-1'], { photometry: [band] })).toMatchObject({
      photometry: [{ band: 'V', value: null, error: null }],
    });
    expect(read(['<21', '0.1'], { photometry: [band] })).toMatchObject({
      code: 'unreadable-number',
      column: 'a',
    });
  });

  it('redshifts, and velocities over the speed of light', () => {
    expect(read(['-0.001'], { redshift: { column: 2, errorColumn: null, kind: 'redshift' } })).toMatchObject({
      redshift: -0.001,
    });
    const row = read(['2997.92458'], { redshift: { column: 2, errorColumn: null, kind: 'velocity-km-s' } });
    expect('raDeg' in row && row.redshift).toBeCloseTo(0.01, 15);
  });
});
