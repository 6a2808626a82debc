import { describe, expect, it } from 'vitest';
import { nextSort, visibleColumns, type Column } from './table-column';
import { tableTsv, tsvCell } from './table-tsv';

interface Row {
  name: string;
  sep: number;
}

const columns: Column<Row>[] = [
  { id: 'name', header: 'Designation', cell: (row) => row.name },
  {
    id: 'sep',
    header: 'Separation',
    unit: 'arcsec',
    numeric: true,
    cell: (row) => row.sep.toFixed(2).replace('-', '−'),
  },
  {
    id: 'mark',
    header: 'Mark',
    cell: () => null,
    text: (row) => (row.sep < 1 ? 'near' : 'far'),
    hidden: true,
  },
];

describe('tableTsv', () => {
  it('has a head with units, one line per row and a last line end', () => {
    expect(tableTsv(columns, [{ name: 'LAN-O 1', sep: 0.5 }])).toBe(
      'Designation\tSeparation (arcsec)\tMark\nLAN-O 1\t0.50\tnear\n',
    );
  });

  it('writes numbers as programs read them', () => {
    expect(tableTsv(columns.slice(1, 2), [{ name: '', sep: -1.5 }])).toContain('\n-1.50\n');
    const counts: Column<string>[] = [{ id: 'n', header: 'N', numeric: true, cell: (text) => text }];
    expect(tableTsv(counts, ['12,345', '–'])).toBe('N\n12345\n\n');
  });

  it('keeps a cell in its cell and defuses formulas, but not signed numbers and declinations', () => {
    expect(tsvCell('two\tparts\r\nof text')).toBe('two parts of text');
    expect(tsvCell('=HYPERLINK("x")')).toBe('\'=HYPERLINK("x")');
    expect(tsvCell('+cmd|x')).toBe("'+cmd|x");
    expect(tsvCell('@SUM(A1)')).toBe("'@SUM(A1)");
    expect(['-1.5', '+12:23:28.0', '-1.5e-3', '+12 23 28'].map(tsvCell)).toEqual([
      '-1.5',
      '+12:23:28.0',
      '-1.5e-3',
      '+12 23 28',
    ]);
  });
});

describe('column choice', () => {
  it('shows what is not hidden at first, the chosen ones afterwards, never none', () => {
    const ids = (chosen: string[] | null) => visibleColumns(columns, chosen).map((column) => column.id);
    expect(ids(null)).toEqual(['name', 'sep']);
    expect(ids(['mark', 'name'])).toEqual(['name', 'mark']);
    expect(ids(['gone'])).toEqual(['name']);
  });
});

describe('nextSort', () => {
  it('turns round on the same column and rises on another', () => {
    expect(nextSort({ id: 'ra', order: 'asc' }, 'ra')).toEqual({ id: 'ra', order: 'desc' });
    expect(nextSort({ id: 'ra', order: 'desc' }, 'ra')).toEqual({ id: 'ra', order: 'asc' });
    expect(nextSort({ id: 'ra', order: 'desc' }, 'dec')).toEqual({ id: 'dec', order: 'asc' });
  });
});
