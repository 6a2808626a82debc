import { describe, expect, it } from 'vitest';
import type { ColumnMapping, SetAsideRow, UnderstoodRow } from '../../shared/schemas/mapping';
import { compileMapping, namesInCells } from './understand';

const base: ColumnMapping = {
  position: { kind: 'two-columns', raColumn: 1, decColumn: 2, raNotation: 'degrees', decNotation: 'degrees' },
  keyColumn: null,
  names: [{ column: 0, separator: ';' }],
  error: null,
  properMotion: null,
  photometry: [],
  redshift: null,
};
const columns = ['name', 'ra', 'dec', 'x', 'y', ''].map((name) => ({ name }));

function read(
  cells: (string | undefined)[] | null,
  mapping: Partial<ColumnMapping> = {},
  decimalComma = false,
): UnderstoodRow | SetAsideRow {
  const reader = compileMapping({ ...base, ...mapping }, columns, { decimalComma });
  const out = reader.newRow();
  const filled =
    cells && [...cells, '', '', '', ''].slice(0, Math.max(6, cells.length)).map((cell) => cell ?? '');
  return reader.read(filled, filled?.join(',') ?? 'raw "text', 17, 3, out) ?? out;
}

describe('positions', () => {
  it('reads degrees exactly, and 360 as 0', () => {
    expect(read(['A 1', '188.73', '-1.034'])).toMatchObject({ line: 17, raDeg: 188.73, decDeg: -1.034 });
    expect(read(['A 1', '360', '+90'])).toMatchObject({ raDeg: 0, decDeg: 90 });
    expect(read(['A 1', '1.5e2', '−0.5'])).toMatchObject({ raDeg: 150, decDeg: -0.5 });
  });

  it('reads sexagesimal and combined positions', () => {
    const sexagesimal = { raNotation: 'sexagesimal-hours', decNotation: 'sexagesimal-degrees' } as const;
    const row = read(['A 1', '12 34 56.7', '-00 12 30'], { position: { ...base.position, ...sexagesimal } });
    expect('raDeg' in row && row.raDeg).toBeCloseTo(15 * (12 + 34 / 60 + 56.7 / 3600), 12);
    expect('raDeg' in row && row.decDeg).toBeCloseTo(-12.5 / 60, 12);
    const oneColumn = { kind: 'one-column', column: 3, ...sexagesimal } as const;
    expect(read(['A 1', '', '', '12h00m00s -01 30 00'], { position: oneColumn })).toMatchObject({
      raDeg: 180,
      decDeg: -1.5,
    });
    expect(read(['A 1', '', '', ''], { position: oneColumn })).toMatchObject({
      code: 'no-position',
      column: 'x',
    });
    expect(read(['A 1', '', '', 'nowhere'], { position: oneColumn })).toMatchObject({
      code: 'unreadable-angle',
    });
  });

  it('reads decimal hours and decimal commas', () => {
    const hours = { ...base.position, raNotation: 'hours' } as const;
    expect(read(['A 1', '12,5', '-1,25'], { position: hours }, true)).toMatchObject({
      raDeg: 187.5,
      decDeg: -1.25,
    });
  });

  it.each([
    ['', '1', 'no-position', 'ra'],
    ['1', 'NaN', 'no-position', 'dec'],
    ['361', '1', 'ra-out-of-range', 'ra'],
    ['-0.1', '1', 'ra-out-of-range', 'ra'],
    ['1', '90.0001', 'dec-out-of-range', 'dec'],
    ['1', '-91', 'dec-out-of-range', 'dec'],
    ['abc', '1', 'unreadable-number', 'ra'],
    ['1', '12 30 00', 'unreadable-number', 'dec'],
  ])('sets aside RA “%s”, Dec “%s”: %s', (ra, dec, code, column) => {
    expect(read(['A 1', ra, dec])).toMatchObject({ line: 17, code, column, raw: `A 1,${ra},${dec},,,` });
  });
});

describe('keys and names', () => {
  it('the key is the key column, else the first name, else the row number', () => {
    expect(read(['A 1; B 2;A 1 ;-', '1', '2', 'k7'], { keyColumn: 3 })).toMatchObject({
      key: 'k7',
      names: ['A 1', 'B 2'],
    });
    expect(read(['A 1; B 2', '1', '2'])).toMatchObject({ key: 'A 1' });
    expect(read(['', '1', '2'])).toMatchObject({ key: '3', names: [] });
    expect(read(['007', '1', '2'])).toMatchObject({ key: '007' });
  });

  it('sets aside rows without a key, and names that are no names', () => {
    expect(read(['A 1', '1', '2', ' '], { keyColumn: 3 })).toMatchObject({ code: 'no-key', column: 'x' });
    expect(read(['n'.repeat(200), '1', '2'])).toMatchObject({ key: 'n'.repeat(200) });
    expect(read(['n'.repeat(201), '1', '2'])).toMatchObject({ code: 'name-too-long', column: 'name' });
    expect(read(['n'.repeat(10_000), '1', '2'])).toMatchObject({ code: 'name-too-long' });
    expect(read(['A\u00071', '1', '2'])).toMatchObject({ code: 'control-character', column: 'name' });
    expect(read(['two\nlines', '1', '2'])).toMatchObject({ code: 'control-character' });
    expect(read(['A 1', '1', '2', 'k\u0085'], { keyColumn: 3 })).toMatchObject({
      code: 'control-character',
      column: 'x',
    });
  });

  it('gives the names of a stored row', () => {
    const names = [
      { column: 2, separator: ',' },
      { column: 0, separator: null },
    ];
    expect(namesInCells({ names }, ['A;1', 'x', ' B 2 , ,C 3'])).toEqual(['B 2', 'C 3', 'A;1']);
  });
});

describe('rows that are no rows', () => {
  it('counts cells; a single empty cell at the end is allowed', () => {
    const reader = compileMapping(base, columns.slice(0, 3), { decimalComma: false });
    const out = reader.newRow();
    const cells = ['A 1', '1', '2', ''];
    expect(reader.read(cells, '', 1, 1, out)).toBeNull();
    expect(cells).toHaveLength(3);
    expect(reader.read(['A 1', '1'], 'A 1,1', 1, 1, out)).toMatchObject({
      code: 'too-few-cells',
      column: null,
      message: 'The row has 2 cells, the table has 3 columns.',
    });
    expect(reader.read(['A 1', '1', '2', 'x'], '', 1, 1, out)).toMatchObject({ code: 'too-many-cells' });
    expect(reader.read(['A 1', '1', '2', '', ''], '', 1, 1, out)).toMatchObject({ code: 'too-many-cells' });
  });

  it('sets aside broken quoting, long cells and what can’t be stored, in any column', () => {
    expect(read(null)).toMatchObject({ code: 'bad-quoting', line: 17, raw: 'raw "text' });
    expect(read(['A 1', '1', '2', '', 'x'.repeat(10_001)])).toMatchObject({
      code: 'cell-too-long',
      column: 'y',
    });
    expect(read(['A 1', '1', '2', '', 'x'.repeat(10_000)])).toMatchObject({ key: 'A 1' });
    expect(read(['A 1', '1', '2', '', 'x\u001f'])).toMatchObject({ code: 'control-character', column: 'y' });
    expect(read(['A 1', '1', '2', '', '', 'x\0'])).toMatchObject({
      code: 'control-character',
      column: 'column 6',
      raw: 'A 1,1,2,,,x␀',
    });
  });

  it('cuts the raw text at 2,000 characters', () => {
    const refused = read(['A 1', 'x'.repeat(5000), '2']);
    expect('raw' in refused && refused.raw).toBe(`A 1,${'x'.repeat(1996)}`);
    expect('message' in refused && refused.message.length).toBeLessThan(400);
  });

  it('refuses a mapping beyond the table', () => {
    expect(() => compileMapping(base, columns.slice(0, 2), { decimalComma: false })).toThrow(RangeError);
  });
});
