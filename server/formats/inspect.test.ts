import { readFileSync } from 'node:fs';
import path from 'node:path';
import { gzipSync } from 'node:zlib';
import { describe, expect, it } from 'vitest';
import { fileInspection, type FileInspection, type TextDialect } from '../../shared/schemas/mapping';
import { LIMITS, opener } from './fixtures/streams';
import { inspectTextTable } from './inspect';

async function inspect(
  content: string | Uint8Array,
  dialect: Partial<TextDialect> = {},
): Promise<FileInspection> {
  return fileInspection.parse(await inspectTextTable(opener(content), { ...LIMITS, dialect }));
}

/** A real list as it lies in storage, packed; see fixtures/NOTICE.md. */
const packed = (name: string) => gzipSync(readFileSync(path.join(import.meta.dirname, 'fixtures', name)));

describe('real lists are understood without help', () => {
  it('CSV with several names in a cell', async () => {
    const seen = await inspect(packed('alpha.csv'));
    expect(seen.dialect).toEqual({
      compression: 'gzip',
      encoding: 'utf-8',
      delimiter: ',',
      quoted: true,
      header: true,
      commentPrefix: null,
      decimalComma: false,
    });
    expect(seen.rowsSeen).toBe(40);
    expect(seen.wholeFileSeen).toBe(true);
    expect(seen.sample).toHaveLength(20);
    expect(seen.columns[2]).toEqual({
      name: 'ra_deg',
      kind: 'number',
      examples: ['80.895797', '100.404197', '213.291699', '7.775000', '15.037500'],
    });
    expect(seen.suggestedMapping).toEqual({
      position: {
        kind: 'two-columns',
        raColumn: 2,
        decColumn: 3,
        raNotation: 'degrees',
        decNotation: 'degrees',
      },
      keyColumn: 0,
      names: [{ column: 1, separator: ';' }],
      error: null,
      properMotion: null,
      photometry: [
        { column: 4, errorColumn: null, kind: 'magnitude', band: 'b', unit: 'mag' },
        { column: 5, errorColumn: null, kind: 'magnitude', band: 'v', unit: 'mag' },
      ],
      redshift: { column: 6, errorColumn: 7, kind: 'redshift' },
    });
  });

  it('tabs and sexagesimal positions', async () => {
    const seen = await inspect(packed('beta.tsv'));
    expect(seen.dialect).toMatchObject({ delimiter: '\t', header: true });
    expect(seen.columns.map(({ kind }) => kind).slice(0, 4)).toEqual([
      'text',
      'sexagesimal',
      'sexagesimal',
      'number',
    ]);
    expect(seen.suggestedMapping).toMatchObject({
      position: {
        raColumn: 1,
        decColumn: 2,
        raNotation: 'sexagesimal-hours',
        decNotation: 'sexagesimal-degrees',
      },
      keyColumn: 0,
      names: [
        { column: 0, separator: null },
        { column: 7, separator: null },
      ],
      photometry: [{ column: 3, band: 'unstated' }],
    });
  });

  it('semicolons, hours and degrees with blanks', async () => {
    const seen = await inspect(packed('hd_epoch1950.csv'));
    expect(seen.dialect).toMatchObject({ delimiter: ';', header: true, decimalComma: false });
    expect(seen.suggestedMapping).toMatchObject({
      position: {
        raColumn: 1,
        decColumn: 2,
        raNotation: 'sexagesimal-hours',
        decNotation: 'sexagesimal-degrees',
      },
      keyColumn: 0,
      names: [{ column: 0, separator: null }],
      properMotion: { raColumn: 4, decColumn: 5, unit: 'mas/yr', raIncludesCosDec: true },
      photometry: [{ column: 6, band: 'V' }],
    });
  });

  it('right ascension in decimal hours', async () => {
    const seen = await inspect(packed('bright.tsv'));
    expect(seen.suggestedMapping).toMatchObject({
      position: { raColumn: 2, decColumn: 3, raNotation: 'hours', decNotation: 'degrees' },
      keyColumn: 0,
      names: [
        { column: 0, separator: null },
        { column: 1, separator: null },
      ],
      photometry: [{ column: 4, band: 'V' }],
    });
  });

  it('degrees below 24 at the beginning of a list sorted by right ascension; a colour is no magnitude', async () => {
    const seen = await inspect(packed('hip_j2000.csv'));
    expect(seen.suggestedMapping).toMatchObject({
      position: { raColumn: 1, decColumn: 2, raNotation: 'degrees', decNotation: 'degrees' },
      keyColumn: 0,
      properMotion: { raColumn: 3, decColumn: 4, unit: 'mas/yr' },
      photometry: [{ column: 5, band: 'V' }],
    });
    expect(seen.suggestedMapping?.names.map(({ column }) => column)).toEqual([0, 7]);
  });
});

describe('layout', () => {
  it.each([
    [
      'comma',
      'id,ra,dec\nA 1,10.5,-3.25\nA 2,11.5,4.5\n',
      { delimiter: ',', header: true, decimalComma: false },
    ],
    [
      'semicolon and decimal comma',
      'id;ra;dec\nA 1;10,5;-3,25\n',
      { delimiter: ';', header: true, decimalComma: true },
    ],
    [
      'decimal comma without a header',
      '10,512;-3,251\n11,523;4,511\n',
      { delimiter: ';', header: false, decimalComma: true },
    ],
    ['tab and decimal comma', 'id\tra\tdec\nA 1\t10,5\t-3,25\n', { delimiter: '\t', decimalComma: true }],
    ['bars', 'id|ra|dec\nA|10.5|-3.25\n', { delimiter: '|' }],
    [
      'runs of blanks',
      ' id   ra     dec\n A1   10.5  -3.25\n A22  11.5   4.5\n',
      { delimiter: 'spaces', header: true },
    ],
    ['quoted commas', 'id,ra,dec\n"a, b",10.5,-3.25\n"c; d",1.5,2.5\n', { delimiter: ',', quoted: true }],
    ['comments', '# a list\n# of mine\nid,ra,dec\nA,10.5,-3.25\n', { commentPrefix: '#', header: true }],
    ['slashes', '// a list\nid,ra,dec\nA,10.5,-3.25\n', { commentPrefix: '//', header: true }],
    ['dashes', '-- a list\nid,ra,dec\nA,10.5,-3.25\n', { commentPrefix: '--', header: true }],
    ['a comment between rows', `id,ra,dec\n${'A,10.5,-3.25\n'.repeat(9)}#A,1,2\n`, { commentPrefix: '#' }],
    ['negative numbers first', '-3.255,10.512\n-4.251,11.513\n', { commentPrefix: null, header: false }],
    ['missing values first', 'x,ra,dec\n--,10.5,-3.25\n--,1.5,2.5\n', { commentPrefix: null, header: true }],
    ['missing values first, no header', '--,10.5,-3.25\n5,1.5,2.5\n', { commentPrefix: null, header: false }],
    ['seconds of arc', 'id,dec,ra\nA,-32°28\'03",5.5\nB,-33°28\'03",6.5\n', { delimiter: ',', quoted: true }],
    ['quotes that quote nothing', 'id,ra,dec\n"5 inch" x,1.5,2.5\n"6 inch" y,2.5,3.5\n', { quoted: false }],
    ['text only', 'pair,left\nhip-1,HD 5\nhip-2,HD 6\n', { header: true }],
    ['CR LF', 'id,ra,dec\r\nA,10.5,-3.25\r\n', { delimiter: ',' }],
    ['CR', 'id,ra,dec\rA,10.5,-3.25\r', { delimiter: ',' }],
  ] as const)('%s', async (_what, text, dialect) => {
    expect((await inspect(text)).dialect).toMatchObject(dialect);
  });

  it('a byte order mark is no part of the first name', async () => {
    const seen = await inspect('\ufeffra,dec\n10.5,-3.25\n');
    expect(seen.columns.map(({ name }) => name)).toEqual(['ra', 'dec']);
    expect(seen.dialect.encoding).toBe('utf-8');
  });

  it('Latin-1 is told by bytes that are not UTF-8', async () => {
    const seen = await inspect(Buffer.from('name,ra,dec\nCôte 1,10.5,-3.25\n', 'latin1'));
    expect(seen.dialect.encoding).toBe('latin1');
    expect(seen.sample[0]?.[0]).toBe('Côte 1');
  });

  it('a header that is a comment gives the names', async () => {
    for (const text of [
      '# made by hand\n# name ra dec\nA1 10.5 -3.25\nA2 11.5 4.5\n',
      '#name,ra,dec\nA1,10.5,-3.25\n',
    ]) {
      const seen = await inspect(text);
      expect(seen.dialect).toMatchObject({ header: false, commentPrefix: '#' });
      expect(seen.columns.map(({ name }) => name)).toEqual(['name', 'ra', 'dec']);
      expect(seen.suggestedMapping?.position).toMatchObject({ raColumn: 1, decColumn: 2 });
      expect(seen.rowsSeen).toBe(text.includes('A2') ? 2 : 1);
    }
  });

  it('an unnamed empty last column is dropped, an unnamed first one is kept', async () => {
    expect((await inspect('ra,dec,\n10.5,-3.25,\n11.5,4.5,\n')).columns).toHaveLength(2);
    const rowNames = await inspect('ra dec\n1 10.5 -3.25\n2 11.5 4.5\n');
    expect(rowNames.columns.map(({ name }) => name)).toEqual(['', 'ra', 'dec']);
    expect(rowNames.suggestedMapping?.position).toMatchObject({ raColumn: 1, decColumn: 2 });
  });

  it('what a person has set wins', async () => {
    const text = 'ra,dec\n10.5,-3.25\n';
    const seen = await inspect(text, { header: false, delimiter: ',', encoding: 'latin1' });
    expect(seen.dialect).toMatchObject({ header: false, encoding: 'latin1' });
    expect(seen.rowsSeen).toBe(2);
    expect((await inspect(`#x\n${text}`, { commentPrefix: null })).dialect.commentPrefix).toBeNull();
  });

  it('looks at 5,000 rows and 4 MiB only', async () => {
    const many = await inspect(`ra,dec\n${'10.5,-3.25\n'.repeat(20_000)}`);
    expect([many.rowsSeen, many.wholeFileSeen]).toEqual([5000, false]);
    const wide = await inspect(`ra,dec,note\n${`10.5,-3.25,${'x'.repeat(5000)}\n`.repeat(2000)}`);
    expect(wide.rowsSeen).toBeGreaterThan(800);
    expect(wide.rowsSeen).toBeLessThan(850);
    expect(wide.wholeFileSeen).toBe(false);
  });
});

describe('suggestions', () => {
  const rowsOf = (count: number, row: (i: number) => (string | number)[]) =>
    Array.from({ length: count }, (_, i) => row(i).join(',')).join('\n');
  const mapping = async (text: string) => (await inspect(text)).suggestedMapping;

  it('hours when values fill 0..24 and never go beyond', async () => {
    const spread = rowsOf(200, (i) => [((i * 7.31) % 24).toFixed(4), ((i * 13.7) % 180) - 90]);
    expect((await mapping(`ra,dec\n${spread}`))?.position.raNotation).toBe('hours');
    const narrow = rowsOf(200, (i) => [(12 + (i % 10) / 100).toFixed(4), -3 + i / 100]);
    expect((await mapping(`ra,dec\n${narrow}`))?.position.raNotation).toBe('degrees');
  });

  it('degrees at the sorted beginning of a longer list', async () => {
    const sorted = rowsOf(20_000, (i) => [(i * 0.004).toFixed(4), (((i * 13.7) % 180) - 90).toFixed(3)]);
    expect((await mapping(`ra,dec\n${sorted}`))?.position.raNotation).toBe('degrees');
  });

  it('degrees and minutes with degree signs or beyond 24 are no hours', async () => {
    expect((await mapping("ra,dec\n12°30'00,-3 00 00\n13°30'00,4 00 00\n"))?.position.raNotation).toBe(
      'sexagesimal-degrees',
    );
    expect((await mapping('ra,dec\n112:30:00,-3:00:00\n13:30:00,4:00:00\n'))?.position.raNotation).toBe(
      'sexagesimal-degrees',
    );
  });

  it('a position without header words: neighbours with the decimals or the look of angles', async () => {
    expect((await mapping('A 1,5,10.5123,-3.2512\nA 2,6,211.5123,4.5512\n'))?.position).toMatchObject({
      raColumn: 2,
      decColumn: 3,
    });
    expect((await mapping('A 1;12 30 00;-03 00 00\nA 2;13 30 00;+04 00 00\n'))?.position).toMatchObject({
      raColumn: 1,
      raNotation: 'sexagesimal-hours',
    });
    expect(await mapping('a,b\n1,2\n3,4\n')).toBeNull();
  });

  it('a position in one column', async () => {
    expect((await mapping('id,coords\n1,12 34 56.7 -01 02 03\n2,13 34 56.7 +01 02 03\n'))?.position).toEqual({
      kind: 'one-column',
      column: 1,
      raNotation: 'sexagesimal-hours',
      decNotation: 'sexagesimal-degrees',
    });
    expect((await mapping('id;where\n1;188.73 -1.034\n2;190.1 +2.5\n'))?.position).toMatchObject({
      column: 1,
      raNotation: 'degrees',
    });
    expect((await mapping('12 34 56.7 -01 02 03\n13 34 56.7 +01 02 03\n'))?.position).toMatchObject({
      kind: 'one-column',
      column: 0,
    });
  });

  it('equinox 2000 before 1950', async () => {
    const text = 'RAB1950,DEB1950,RAJ2000,DEJ2000\n10.5,1.5,11.1,1.7\n20.5,2.5,21.1,2.7\n';
    expect((await mapping(text))?.position).toMatchObject({ raColumn: 2, decColumn: 3 });
  });

  it('errors: ellipse, axes, circle, with unit and meaning', async () => {
    expect((await mapping('ra,dec,err_maj,err_min,err_pa\n1.5,2.5,0.3,0.2,10\n'))?.error).toEqual({
      kind: 'ellipse',
      majorColumn: 2,
      minorColumn: 3,
      paColumn: 4,
      unit: 'arcsec',
      meaning: 'sigma',
    });
    expect((await mapping('ra,ra_error [mas],dec,dec_error [mas]\n1.5,0.3,2.5,0.2\n'))?.error).toEqual({
      kind: 'axes',
      raColumn: 1,
      decColumn: 3,
      raUnit: 'mas',
      decUnit: 'mas',
      meaning: 'sigma',
    });
    expect(
      (await mapping('RAJ2000,DEJ2000,e_RAJ2000 (s),e_DEJ2000\n1 2 3,2 3 4,0.3,0.2\n'))?.error,
    ).toMatchObject({ raUnit: 'time-second' });
    expect((await mapping('ra,dec,r95 (arcmin)\n1.5,2.5,0.3\n'))?.error).toEqual({
      kind: 'circle',
      column: 2,
      unit: 'arcmin',
      meaning: 'r95',
    });
  });

  it('brightness with errors, flux with unit, velocity, and z as a band', async () => {
    const text =
      'ra,dec,Kmag,e_Kmag,J-K,flux_1400 (mJy),rv,z\n1.5,2.5,12.1,0.1,0.5,3.2,120,18.2\n3.5,4.5,13.1,0.1,0.5,4.2,-5,19.1\n';
    const found = await mapping(text);
    expect(found?.photometry).toEqual([
      { column: 2, errorColumn: 3, kind: 'magnitude', band: 'K', unit: 'mag' },
      { column: 5, errorColumn: null, kind: 'flux', band: '1400', unit: 'mJy' },
      { column: 7, errorColumn: null, kind: 'magnitude', band: 'z', unit: 'mag' },
    ]);
    expect(found?.redshift).toEqual({ column: 6, errorColumn: null, kind: 'velocity-km-s' });
  });

  it('motions in arcsec/yr by their size', async () => {
    expect(
      (await mapping('ra,dec,pmra,pmdec\n1.5,2.5,0.01,-0.02\n3.5,4.5,0.03,0.05\n'))?.properMotion?.unit,
    ).toBe('arcsec/yr');
    expect((await mapping('ra,dec,pmra,pmdec\n1.5,2.5,10,-20\n3.5,4.5,3,5\n'))?.properMotion?.unit).toBe(
      'mas/yr',
    );
  });

  it('names by their look; a spectral type is none; separators by all cells that have one', async () => {
    const text = 'HD,sp,ra,dec\nHD 1,G2V,1.5,2.5\nHD 2,G2V,3.5,4.5\nHD 3,K0III,5.5,4.5\nHD 4,G2V,6.5,4.5\n';
    expect(await mapping(text)).toMatchObject({ names: [{ column: 0, separator: null }], keyColumn: 0 });
    for (const [cell, separator] of [
      ['A 1|B 2', '|'],
      ['A 1 / B 2', '/'],
      ['"A 1,B 2"', ','],
      ['Smith and Sons / left', null],
    ] as const) {
      expect((await mapping(`name,ra,dec\n${cell},1.5,2.5\nC 3,3.5,4.5\n`))?.names[0]?.separator, cell).toBe(
        separator,
      );
    }
  });

  it('a repeated value is no key', async () => {
    expect((await mapping('id,ra,dec\n1,1.5,2.5\n1,3.5,4.5\n'))?.keyColumn).toBeNull();
    expect((await mapping('id,name,ra,dec\n1,A 1,1.5,2.5\n1,A 2,3.5,4.5\n'))?.keyColumn).toBe(1);
  });
});
