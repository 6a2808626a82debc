import { Readable } from 'node:stream';
import { gzipSync } from 'node:zlib';
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { allRows, COMMA, LIMITS } from './fixtures/streams';
import { readRows } from './rows';

const cellsOf = async (...args: Parameters<typeof allRows>) =>
  (await allRows(...args)).map(({ cells }) => cells);

describe('rows of a text table', () => {
  it('splits plain lines and tells their lines in the file', async () => {
    const rows = await allRows('# made by hand\nid,ra\n\n1,10.5\n# middle\n2,11.5', { commentPrefix: '#' });
    expect(rows).toEqual([
      { line: 4, raw: '1,10.5', cells: ['1', '10.5'] },
      { line: 6, raw: '2,11.5', cells: ['2', '11.5'] },
    ]);
  });

  it('takes LF, CR LF and CR in one file, also across chunks', async () => {
    for (const chunkBytes of [1, 2, 3, 5, 1000]) {
      const rows = await allRows('a,b\r\n1,2\n3,4\r5,6\r\n\r\n7,8\r', {}, chunkBytes);
      expect(rows.map(({ line, cells }) => [line, cells])).toEqual([
        [2, ['1', '2']],
        [3, ['3', '4']],
        [4, ['5', '6']],
        [6, ['7', '8']],
      ]);
    }
  });

  it('keeps line breaks and delimiters inside of quotes and counts the lines', async () => {
    const rows = await allRows('id,note\n1,"two\r\nlines, ""quoted"""\n2,"x"\n3,plain\n');
    expect(rows.map(({ line, cells }) => [line, cells])).toEqual([
      [2, ['1', 'two\nlines, "quoted"']],
      [4, ['2', 'x']],
      [5, ['3', 'plain']],
    ]);
  });

  it('takes a quote inside of an unquoted cell as it is: seconds of arc', async () => {
    expect(await cellsOf('id,dec\n1,-32°28\'03"\n2,5" wide\n')).toEqual([
      ['1', '-32°28\'03"'],
      ['2', '5" wide'],
    ]);
  });

  it('a header in quotes with a line break is one header', async () => {
    const rows = await allRows('"id","a\nb"\n1,2\n');
    expect(rows).toEqual([{ line: 3, raw: '1,2', cells: ['1', '2'] }]);
  });

  it('a forgotten quote breaks its own row only', async () => {
    const lines = Array.from({ length: 5000 }, (_, i) => `${i},"name ${i}",${i}.5`);
    lines[2500] = '2500,"name 2500,2500.5';
    const rows = await allRows(`id,name,x\n${lines.join('\n')}\n`, {}, 4096);
    expect(rows).toHaveLength(5000);
    expect(rows.filter(({ cells }) => cells === null)).toEqual([
      { line: 2502, raw: '2500,"name 2500,2500.5', cells: null },
    ]);
    expect(rows[4999]?.cells).toEqual(['4999', 'name 4999', '4999.5']);
  });

  it('a forgotten quote before thousands of unquoted rows breaks its own row only', async () => {
    const rows = await allRows(`id,x\n1,"open\n${'2,3\n'.repeat(5000)}`);
    expect(rows).toHaveLength(5001);
    expect(rows[0]).toEqual({ line: 2, raw: '1,"open', cells: null });
    expect(rows[5000]).toEqual({ line: 5002, raw: '2,3', cells: ['2', '3'] });
  });

  it('text after a closing quote breaks the row', async () => {
    expect(await cellsOf('a,b\n1,"x"y\n2,z\n')).toEqual([null, ['2', 'z']]);
  });

  it('takes quotes as text when told so', async () => {
    expect(await cellsOf('a,b\n"1","x"y\n', { quoted: false })).toEqual([['"1"', '"x"y']]);
  });

  it('splits at runs of blanks, with quoted cells', async () => {
    const text = 'id name  ra\n 1   "NGC 12"\t 5.5 \n2 HD9 "6"\n3 "open 7\n';
    expect(await cellsOf(text, { delimiter: 'spaces' })).toEqual([
      ['1', 'NGC 12', '5.5'],
      ['2', 'HD9', '6'],
      null,
    ]);
  });

  it('reads characters that chunk borders cut', async () => {
    const text = '\ufeffid,name\n1,τ Phe\n2,天狼星\n3,🌌\n';
    for (const chunkBytes of [1, 2, 3, 4, 7]) {
      expect(await cellsOf(text, {}, chunkBytes)).toEqual([
        ['1', 'τ Phe'],
        ['2', '天狼星'],
        ['3', '🌌'],
      ]);
    }
  });

  it('reads Latin-1, and the signs Windows has in its gap', async () => {
    const bytes = Buffer.from([0x61, 0x0a, 0xe9, 0xb0, 0x96, 0x32, 0x0a]);
    expect(await cellsOf(bytes, { encoding: 'latin1' })).toEqual([['é°–2']]);
  });

  it('reads gzip of several members', async () => {
    const bytes = Buffer.concat([gzipSync('id,ra\n1,2\n3'), gzipSync(',4\n')]);
    expect(await cellsOf(bytes, { compression: 'gzip' }, 7)).toEqual([
      ['1', '2'],
      ['3', '4'],
    ]);
  });

  it('does not read ahead of the reader and closes the file when reading stops', async () => {
    let chunks = 0;
    const source = Readable.from(
      (function* () {
        for (;;) {
          chunks += 1;
          yield Buffer.from('1,2\n'.repeat(1000));
        }
      })(),
      { objectMode: false, highWaterMark: 4000 },
    );
    for await (const batch of readRows(source, COMMA, LIMITS)) {
      expect(batch.lines.length).toBeGreaterThanOrEqual(1000);
      break;
    }
    expect(chunks).toBeLessThan(6);
    expect(source.destroyed).toBe(true);
  });
});

const cell = fc.oneof(
  fc.constantFrom(
    '',
    '1.5',
    '-00 12 30',
    'NGC 12',
    'a,b',
    '"',
    '""',
    'x"y',
    'two\nlines',
    'τ',
    ' ',
    '#1',
    ';',
    '\t',
    "5'",
  ),
  fc.string({ unit: fc.constantFrom('a', '1', ',', '"', ' ', '\n', 'é', '-', ';') }),
);
const table = fc
  .integer({ min: 2, max: 5 })
  .chain((width) =>
    fc.array(fc.array(cell, { minLength: width, maxLength: width }), { minLength: 1, maxLength: 30 }),
  );
const needsQuotes = /[",\n]/;
const quoted = (text: string) => `"${text.replaceAll('"', '""')}"`;

describe('both ways of reading rows agree with what was written', () => {
  it('whatever is quoted, however lines end, wherever chunks end', async () => {
    await fc.assert(
      fc.asyncProperty(
        table,
        fc.constantFrom('needed', 'all'),
        fc.constantFrom('\n', '\r\n', '\r'),
        fc.integer({ min: 1, max: 64 }),
        async (rows, quoting, lineEnd, chunkBytes) => {
          const write = (text: string) => (quoting === 'all' || needsQuotes.test(text) ? quoted(text) : text);
          // A row of blanks only is a blank line unless it is quoted.
          const lines = rows.map((row) => {
            const line = row.map(write).join(',');
            return line.trim() === '' ? row.map(quoted).join(',') : line;
          });
          const text = ['h', ...lines].map((line) => line.replaceAll('\n', lineEnd) + lineEnd).join('');
          const read = await allRows(text, {}, chunkBytes);
          expect(read.map(({ cells }) => cells)).toEqual(rows);
          let line = 2;
          for (const [i, row] of lines.entries()) {
            expect(read[i]?.line).toBe(line);
            line += row.split('\n').length;
          }
        },
      ),
      { numRuns: 300 },
    );
  }, 30_000);

  it('any text at all is read without an exception, every line in some row', async () => {
    const anyText = fc.string({ unit: fc.constantFrom('a', ',', '"', '\n', '\r', ' '), maxLength: 60 });
    await fc.assert(
      fc.asyncProperty(anyText, fc.integer({ min: 1, max: 9 }), async (text, chunkBytes) => {
        const whole = await allRows(text, { header: false });
        expect(await allRows(text, { header: false }, chunkBytes)).toEqual(whole);
        const unified = text.replaceAll('\r\n', '\n').replaceAll('\r', '\n').split('\n');
        const inRows = whole.flatMap(({ line, raw }) =>
          raw.split('\n').map((part, i) => [line + i, part] as const),
        );
        for (const [line, part] of inRows) expect(unified[line - 1]).toBe(part);
        const covered = new Set(inRows.map(([line]) => line));
        unified.forEach((line, i) => expect(covered.has(i + 1) || line.trim() === '').toBe(true));
      }),
      { numRuns: 500 },
    );
  }, 30_000);
});
