import { describe, expect, it } from 'vitest';
import { compareRows, relationOf, type NamedCell } from './differing-values';

const row = (cells: Record<string, string>): NamedCell[] =>
  Object.entries(cells).map(([name, cell]) => ({ name, cell }));

describe('compareRows', () => {
  it('puts columns of the same name beside each other, in the order of A, and keeps the others apart', () => {
    const compared = compareRows(
      row({ id: 'A1', mag: '18.2', note: 'x' }),
      row({ flux: '3', MAG: '18.4', ' id ': 'B7' }),
    );
    expect(compared.shared).toEqual([
      { name: 'id', a: 'A1', b: 'B7', relation: 'differs' },
      { name: 'mag', a: '18.2', b: '18.4', relation: 'differs' },
    ]);
    expect(compared.onlyA).toEqual([{ name: 'note', cell: 'x' }]);
    expect(compared.onlyB).toEqual([{ name: 'flux', cell: '3' }]);
  });

  it('pairs repeated names one by one and loses none', () => {
    const a = [
      { name: 'e', cell: '1' },
      { name: 'e', cell: '2' },
    ];
    const b = [
      { name: 'e', cell: '1' },
      { name: 'e', cell: '3' },
      { name: 'e', cell: '4' },
    ];
    const { shared, onlyA, onlyB } = compareRows(a, b);
    expect(shared.map(({ a: one, b: other, relation }) => [one, other, relation])).toEqual([
      ['1', '1', 'alike'],
      ['2', '3', 'differs'],
    ]);
    expect(onlyA).toEqual([]);
    expect(onlyB).toEqual([{ name: 'e', cell: '4' }]);
  });
});

describe('relationOf', () => {
  it.each([
    ['1.50', '1.5', 'alike'],
    ['+2', '2.0', 'alike'],
    ['1e3', '1000', 'alike'],
    ['1.0D-2', '0.01', 'alike'],
    [' star ', 'star', 'alike'],
    ['star', 'Star', 'differs'],
    ['18.2', '18.20001', 'differs'],
    ['', '3', 'one empty'],
    ['', ' ', 'alike'],
    ['0x10', '16', 'differs'],
    ['Infinity', 'infinity', 'differs'],
  ] as const)('"%s" and "%s" are %s', (a, b, relation) => {
    expect(relationOf(a, b)).toBe(relation);
    expect(relationOf(b, a)).toBe(relation);
  });
});
