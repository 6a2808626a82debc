import { randomBytes } from 'node:crypto';
import { readdirSync } from 'node:fs';
import { gzipSync } from 'node:zlib';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import type { Problem } from '../../shared/schemas/problem';
import { importTable, upload } from '../support/uploads';
import { createWorld, type World } from '../support/world';

const HEADER = 'id,name,ra,dec\n';
const GOOD_ROWS = Array.from({ length: 40 }, (_, i) => `K${i},ABC ${i + 1},${10 + i},${-20 - i}`).join('\n');

describe('bad uploads', () => {
  let world: World;
  beforeAll(async () => {
    world = await createWorld({ IDEM_MAX_UPLOAD_BYTES: '20000000', IDEM_MAX_UNPACKED_BYTES: '8000000' });
  });
  afterAll(() => world.close());
  const stored = () => {
    try {
      return readdirSync(world.context.config.filesDir);
    } catch {
      return [];
    }
  };

  const CASES: [what: string, bytes: () => Buffer, status: number, code: string][] = [
    ['an empty file', () => Buffer.alloc(0), 422, 'file-empty'],
    ['a binary file', () => randomBytes(5000), 422, 'file-binary'],
    ['a header and nothing else', () => Buffer.from(HEADER), 422, 'file-header-only'],
    [
      '2,001 columns',
      () => Buffer.from(`${Array.from({ length: 2001 }, (_, i) => `c${i}`).join(',')}\n${'1,'.repeat(2000)}1\n`),
      422,
      'file-too-many-columns',
    ],
    ['a cell of 10 MB', () => Buffer.from(`${HEADER}K1,${'x'.repeat(10_000_000)},1,1\n`), 422, 'file-row-too-long'],
    ['UTF-16 text', () => Buffer.from(`\ufeff${HEADER}${GOOD_ROWS}`, 'utf16le'), 422, 'file-encoding'],
    ['broken gzip', () => gzipSync(`${HEADER}${GOOD_ROWS}`).subarray(0, 60), 422, 'file-gzip-broken'],
    ['one column that is no position', () => Buffer.from('name\nabc\ndef\n'), 422, 'file-one-column'],
  ];

  it.each(CASES)('%s is refused with a sentence, and nothing is kept', async (_what, bytes, status, code) => {
    const before = stored();
    const answer = await upload(world, bytes());
    const problem = answer.body as Problem;
    expect({ status: answer.status, errors: problem.errors }).toEqual({ status, errors: [{ path: 'file', message: code }] });
    expect(problem.detail).toMatch(/^[A-Z“].*[.!]$/);
    expect(problem.hint).toBeTruthy();
    expect(stored()).toEqual(before);
  });

  it('a file over the limit is refused by its size, and nothing is kept', async () => {
    const before = stored();
    const answer = await upload(world, Buffer.alloc(21_000_000, 'a,b\n'));
    expect(answer.body).toMatchObject({ status: 413, code: 'file-too-large' });
    expect(stored()).toEqual(before);
  });

  it('a gzip bomb is refused at the import, and leaves no catalogue', async () => {
    const bomb = gzipSync(`${HEADER}${GOOD_ROWS}\n${`K,ABC,1,1\n`.repeat(800_000)}`);
    const { job, catalogue } = await importTable(world, 'BOMB', bomb);
    expect(job).toMatchObject({ state: 'failed', error: { code: 'file-unreadable' } });
    expect(job.error?.detail).toContain('unpacks to more');
    expect(catalogue).toBeNull();
  });

  it('mixed line ends, a byte-order mark and Latin-1 are no obstacle', async () => {
    const mixed = `\ufeff${HEADER}K1,ABC 1,1,1\r\nK2,ABC 2,2,2\rK3,ABC 3,3,3\nK4,ABC 4,4,4\n`;
    expect((await importTable(world, 'MIXED', mixed)).catalogue).toMatchObject({ sources: 4, setAside: 0 });
    const latin1 = Buffer.from(`${HEADER}K1,Kühn 1,1,1\nK2,Kühn 2,2,2\n`, 'latin1');
    const { catalogue } = await importTable(world, 'LATIN', latin1);
    expect(catalogue).toMatchObject({ sources: 2, dialect: { encoding: 'latin1' } });
    const found = await world.agents.reader.get(world.api(`find?q=${encodeURIComponent('kühn 2')}`));
    expect(found.body).toMatchObject({ exact: [{ name: 'K2' }] });
  });

  it('ragged rows and impossible names are set aside, and the rest goes in', async () => {
    const rows = [
      GOOD_ROWS,
      'R1,short',
      'R2,ABC 91,1,1,too,many',
      `R3,${'n'.repeat(10_000)},1,1`,
      'R4,ABC\u0007 92,1,1',
      'R5,ABC\u0000 93,1,1',
      '"R6,unclosed,1,1',
      'R7,ABC 94,1,1',
    ];
    const { catalogue } = await importTable(world, 'RAGGED', `${HEADER}${rows.join('\n')}\n`);
    expect(catalogue).toMatchObject({ sources: 41, setAside: 6 });
    const aside = (await world.agents.reader.get(world.api('catalogues/RAGGED/set-aside'))).body as { items: { code: string }[] };
    expect(aside.items.map((row) => row.code)).toEqual([
      'too-few-cells',
      'too-many-cells',
      'name-too-long',
      'control-character',
      'control-character',
      'bad-quoting',
    ]);
  });

  it('a request without a file, or that is no form, is told so', async () => {
    const noForm = await world.agents.curator.post(world.api('files'), { not: 'a form' });
    expect(noForm.body).toMatchObject({ status: 400, code: 'upload-missing' });
    const empty = await world.agents.curator
      .post(world.api('files'))
      .set('Content-Type', 'multipart/form-data; boundary=x')
      .send('--x--\r\n');
    expect(empty.body).toMatchObject({ status: 400, code: 'upload-missing' });
  });

  it('a file name cannot lead out of the storage', async () => {
    const answer = await upload(world, `${HEADER}${GOOD_ROWS}`, '../../etc/passwd.csv');
    expect(answer.body).toMatchObject({ name: expect.not.stringContaining('/') as string });
  });
});
