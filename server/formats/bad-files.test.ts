import { randomBytes } from 'node:crypto';
import { Readable } from 'node:stream';
import { createGzip, gzipSync } from 'node:zlib';
import { describe, expect, it } from 'vitest';
import type { TextDialect } from '../../shared/schemas/mapping';
import { allRows, COMMA, LIMITS, opener } from './fixtures/streams';
import { inspectTextTable, UnreadableFile } from './inspect';
import { readRows } from './rows';

const MIB = 1024 * 1024;

async function refusalOf(work: () => Promise<unknown>): Promise<UnreadableFile> {
  const error: unknown = await work().then(
    () => null,
    (reason: unknown) => reason,
  );
  if (!(error instanceof UnreadableFile)) throw new Error('no UnreadableFile was thrown', { cause: error });
  return error;
}

const inspectionOf = (content: string | Uint8Array, dialect: Partial<TextDialect> = {}) =>
  refusalOf(() => inspectTextTable(opener(content), { ...LIMITS, dialect }));

describe('files that can’t be read say why', () => {
  it.each([
    ['nothing', '', 'file-empty'],
    ['blank lines', '\n \n\r\n', 'file-empty'],
    ['a byte order mark', '\ufeff', 'file-empty'],
    ['comments', '# one\n# two\n', 'file-empty'],
    ['nothing, packed', gzipSync(''), 'file-empty'],
    ['a header', 'id,ra,dec\n', 'file-header-only'],
    ['a header and comments', '# a list\nid,ra,dec\n# end\n\n', 'file-header-only'],
    ['random bytes', randomBytes(5000), 'file-binary'],
    ['NUL bytes', Buffer.from('id,ra,dec\0\0\0\n1,2,3\0\0\0\n'), 'file-binary'],
    ['control characters', '\u0001\u0002\u0003,\u0004\n'.repeat(50), 'file-binary'],
    ['a spreadsheet', Buffer.concat([Buffer.from('PK\u0003\u0004'), randomBytes(500)]), 'file-binary'],
    ['XML', '<?xml version="1.0"?>\n<a>1,2</a>\n', 'file-binary'],
    ['gzip in gzip', gzipSync(gzipSync('id,ra,dec\n1,2,3\n')), 'file-binary'],
    ['UTF-16 with a mark', Buffer.from('\ufeffid,ra,dec\n1,2,3\n', 'utf16le'), 'file-encoding'],
    ['UTF-16 without a mark', Buffer.from('id,ra,dec\n1,2,3\n'.repeat(5), 'utf16le'), 'file-encoding'],
    ['damaged gzip', gzipSync('id,ra,dec\n1,2,3\n').fill(7, 12, 20), 'file-gzip-broken'],
    ['gzip cut short', gzipSync(randomBytes(5000).toString('hex')).subarray(0, 2000), 'file-gzip-broken'],
    ['2,001 columns', `${'x,'.repeat(2000)}y\n${'1,'.repeat(2000)}2\n`, 'file-too-many-columns'],
    ['a cell of 10 MB', `id,ra,dec\n1,2,${'9'.repeat(10 * MIB)}\n`, 'file-row-too-long'],
    ['a quoted cell of 10 MB', `id,ra,dec\n1,2,"${'9'.repeat(10 * MIB)}"\n`, 'file-row-too-long'],
    ['one column without positions', 'name\nHD 1\nHD 2\n', 'file-one-column'],
  ] as const)('%s', async (_what, content, code) => {
    const refusal = await inspectionOf(content);
    expect(refusal.code).toBe(code);
    expect(refusal.message).toMatch(/^(The|Line) .{10,120}\.$/);
    expect(refusal.hint).toMatch(/\.$|\)\.$/);
  });

  it('2,000 columns can be read', async () => {
    const names = Array.from({ length: 2000 }, (_, i) => (i === 0 ? 'ra' : i === 1 ? 'dec' : `c${i}`));
    const seen = await inspectTextTable(opener(`${names.join(',')}\n${'1.5,'.repeat(1999)}1.5\n`), LIMITS);
    expect(seen.columns).toHaveLength(2000);
    expect(seen.suggestedMapping?.position).toMatchObject({ raColumn: 0, decColumn: 1 });
  });

  it('does not read a long line to its end', async () => {
    let bytes = 0;
    const endless = () =>
      Readable.from(
        (function* () {
          for (;;) {
            bytes += 65_536;
            yield Buffer.alloc(65_536, '9');
          }
        })(),
        { objectMode: false },
      );
    const refusal = await refusalOf(() => inspectTextTable(endless, LIMITS));
    expect([refusal.code, refusal.line]).toEqual(['file-row-too-long', 1]);
    expect(bytes).toBeLessThan(6 * MIB);
  });

  it('bad bytes in UTF-8 text are told with their line', async () => {
    const text = Buffer.from(`name,ra,dec\n${'Côte étoilé,1.5,2.5\n'.repeat(50)}`);
    const bad = Buffer.concat([text, Buffer.from('C'), Buffer.from([0xf4]), Buffer.from('te,1,2\nx,1,2\n')]);
    const refusal = await inspectionOf(bad);
    expect([refusal.code, refusal.line]).toEqual(['file-encoding', 52]);
    expect(
      (await inspectionOf(Buffer.from('a,ra,dec\nb\xe9,1,2\n', 'latin1'), { encoding: 'utf-8' })).line,
    ).toBe(2);
  });

  it('a lone NUL in a long text concerns its row only', async () => {
    const text = `name,ra,dec\n${'A 1,1.5,2.5\n'.repeat(500)}A\u00001,1.5,2.5\n`;
    expect((await inspectTextTable(opener(text), LIMITS)).rowsSeen).toBe(501);
  });
});

describe('what goes wrong further on', () => {
  const drain = (content: Uint8Array, dialect: Partial<TextDialect> = {}, limits = LIMITS) =>
    refusalOf(async () => {
      for await (const batch of readRows(opener(content)(), { ...COMMA, ...dialect }, limits))
        expect(batch).toBeDefined();
    });

  it('bytes that are not UTF-8, with the line, across chunks and line ends', async () => {
    for (const lineEnd of ['\n', '\r\n', '\r']) {
      const head = Buffer.from(`name,ra${lineEnd}${`é 1,1.5${lineEnd}`.repeat(20_000)}`);
      const bad = Buffer.concat([
        head,
        Buffer.from([0xe9, 0x20, 0x31]),
        Buffer.from(`,2${lineEnd}é 1,1.5${lineEnd}`),
      ]);
      const refusal = await drain(bad);
      expect([refusal.code, refusal.line]).toEqual(['file-encoding', 20_002]);
    }
  });

  it('bad bytes right behind a chunk border', async () => {
    for (const lineEnd of ['\n', '\r\n', '\r']) {
      const bad = Buffer.concat([
        Buffer.from(`a${lineEnd}é${lineEnd}b${lineEnd}`),
        Buffer.from([0xff]),
        Buffer.from(lineEnd),
      ]);
      for (let chunkBytes = 1; chunkBytes < 9; chunkBytes += 1) {
        const reading = refusalOf(() => allRows(bad, {}, chunkBytes));
        expect((await reading).line, `${JSON.stringify(lineEnd)} ${chunkBytes}`).toBe(4);
      }
    }
  });

  it('a character cut short at the end of the file', async () => {
    expect(
      await drain(Buffer.concat([Buffer.from('a,b\n1,2\n3,'), Buffer.from([0xe5, 0xa4])])),
    ).toMatchObject({
      code: 'file-encoding',
      line: 3,
    });
  });

  it('a line over 1 MiB, with its number', async () => {
    const refusal = await drain(Buffer.from(`a,b\n${'1,2\n'.repeat(1000)}3,${'x'.repeat(2 * MIB)}\n4,5\n`));
    expect([refusal.code, refusal.line]).toEqual(['file-row-too-long', 1002]);
  });

  it('gzip cut short, after the rows before the cut', async () => {
    const packed = gzipSync(
      `a,b\n${Array.from({ length: 50_000 }, (_, i) => `${i},${(i * 7919) % 10_007}`).join('\n')}`,
    );
    const rows: string[] = [];
    const refusal = await refusalOf(async () => {
      const source = opener(packed.subarray(0, packed.length - 20_000))();
      for await (const batch of readRows(source, { ...COMMA, compression: 'gzip' }, LIMITS))
        rows.push(...batch.raws);
    });
    expect(refusal.code).toBe('file-gzip-broken');
    expect(rows.length).toBeGreaterThan(1000);
  });

  it('a gzip file that unpacks beyond the limit', async () => {
    const packed = gzipSync('1,2\n'.repeat(500_000));
    const refusal = await drain(packed, { compression: 'gzip' }, { maxUnpackedBytes: MIB });
    expect(refusal.code).toBe('file-gzip-bomb');
    expect(refusal.message).toContain('1 MiB');
  });

  it('a gzip bomb, by its ratio', async () => {
    const block = Buffer.from(`1,${'2'.repeat(4093)}\n`.repeat(256));
    const bomb = createGzip({ level: 9 });
    Readable.from(
      Array.from({ length: 120 }, () => block),
      { objectMode: false },
    ).pipe(bomb);
    const refusal = await refusalOf(async () => {
      for await (const batch of readRows(bomb, { ...COMMA, compression: 'gzip' }, LIMITS))
        expect(batch.lines.length).toBeGreaterThan(0);
    });
    expect(refusal.code).toBe('file-gzip-bomb');
    expect(refusal.message).toContain('200 times');
  }, 30_000);

  it('an error of the storage comes through as it is', async () => {
    for (const compression of ['none', 'gzip'] as const) {
      const source = new Readable({ read: () => undefined });
      source.push(gzipSync('1,2\n'));
      const reading = (async () => {
        for await (const batch of readRows(source, { ...COMMA, compression, encoding: 'latin1' }, LIMITS)) {
          expect(batch).toBeDefined();
        }
      })();
      source.destroy(new Error('the disk is gone'));
      await expect(reading).rejects.toThrow('the disk is gone');
    }
  });

  it('ragged rows stay rows; what they lack is told when they are understood', async () => {
    const rows = await allRows('a,b,c\n1\n1,2,3,4\n');
    expect(rows.map(({ cells }) => cells?.length)).toEqual([1, 4]);
  });
});
