import { parse } from 'csv-parse/sync';
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { csvLine } from './csv-writer';

const rowsOf = (text: string): string[][] => parse(text, { record_delimiter: '\r\n' });

describe('a line of CSV', () => {
  it('quotes what needs it and ends with CR LF (RFC 4180, section 2)', () => {
    expect(csvLine(['a', 1.5, null, 'b,c', 'say "x"', 'two\nlines', ''])).toBe(
      'a,1.5,,"b,c","say ""x""","two\nlines",\r\n',
    );
  });

  it('leaves numbers as they are and cells without a number empty', () => {
    expect(csvLine([-12.3, 1e-7, 0, NaN, Infinity])).toBe('-12.3,1e-7,0,,\r\n');
  });

  it.each([
    '=1+1',
    '+cmd|x',
    '-2+3',
    '@SUM(A1)',
    '  =1+1',
    '\t=1',
    '\rx',
    '\u00a0=1',
    '＝1',
    '+12 34 56.7 =x',
    '-1e5x',
  ])('makes %j safe', (text) => {
    const cell = rowsOf(csvLine([text, 'x']))[0]?.[0];
    expect(cell).toBe(`'${text}`);
  });

  it.each(['-12.3', '+5', '-.5', '-1.2e-5', '-32 28 03.99', '+12:30:45.6', '-', '--', 'a=b', "'x", 'NGC 12'])(
    'leaves %j as it is',
    (text) => {
      expect(csvLine([text])).toBe(`${text}\r\n`);
    },
  );

  it('gives every text back through a reader of CSV, with at most an apostrophe before it', () => {
    const unit = fc.constantFrom('a', ',', '"', '\r', '\n', '=', '-', ' ', '1', 'é', "'");
    fc.assert(
      fc.property(fc.array(fc.string({ unit }), { minLength: 2, maxLength: 5 }), (texts) => {
        const rows = rowsOf(csvLine(texts));
        expect(rows).toHaveLength(1);
        rows[0]?.forEach((cell, i) => expect([texts[i], `'${texts[i]}`]).toContain(cell));
      }),
    );
  });
});
