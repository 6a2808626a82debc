import { readdirSync, readFileSync } from 'node:fs';
import path from 'node:path';
import { sql } from 'drizzle-orm';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { inTransaction } from '../../db/client';
import { JOB_KIND_WORK } from '../../server/jobs/kinds';
import { cancelJob, runJob } from '../../server/services/jobs';
import type { ColumnMapping } from '../../shared/schemas/mapping';
import type { UploadedFile } from '../../shared/schemas/file';
import { importTable, startImport, upload } from '../support/uploads';
import { createWorld, type World } from '../support/world';

const SAMPLES = path.join(import.meta.dirname, '..', 'outside', 'data');

const POSITION_ONLY: ColumnMapping = {
  position: { kind: 'two-columns', raColumn: 1, decColumn: 2, raNotation: 'degrees', decNotation: 'degrees' },
  keyColumn: 0,
  names: [],
  error: null,
  properMotion: null,
  photometry: [],
  redshift: null,
};

const GOOD = [
  'id,name,ra,dec,err,gmag',
  'K1,ABC 001,10.5,-20.25,0.2,18.1',
  'K2,ABC 002,359.99999,-20.5,0.3,',
  'K3,ABC 003,0,90,,17.5',
].join('\n');

interface Page {
  items: Record<string, unknown>[];
  next: string | null;
  total: number | null;
}

describe('import', () => {
  let world: World;
  beforeAll(async () => {
    world = await createWorld();
  });
  afterAll(() => world.close());

  const rowsIn = (table: string) =>
    inTransaction(world.context.database, world.actors.owner, async (tx) => {
      const { rows } = await tx.execute<{ n: number }>(sql`select count(*) as n from ${sql.identifier(table)}`);
      return Number(rows[0]?.n);
    });
  const bulkTables = async () => {
    const { rows } = await world.context.database.pool.query<{ n: number }>(
      `select count(*) as n from pg_class where relnamespace = 'bulk'::regnamespace and relkind = 'r'`,
    );
    return Number(rows[0]?.n);
  };

  it('makes sources, entries, numbered objects and names, and keeps every cell as written', async () => {
    const { job, catalogue } = await importTable(world, 'GOOD', GOOD);
    expect(job).toMatchObject({ state: 'done', done: 3, error: null });
    expect(catalogue).toMatchObject({ state: 'ready', registered: true, sources: 3, setAside: 0, rowsRead: 3 });
    expect(catalogue?.medianErrArcsec).toBeCloseTo(0.25, 6);
    const sources = (await world.agents.reader.get(world.api('catalogues/GOOD/sources'))).body as Page;
    expect(sources.total).toBe(3);
    expect(sources.items[1]).toMatchObject({
      designation: 'K2',
      raDeg: 359.99999,
      decDeg: -20.5,
      cells: ['K2', 'ABC 002', '359.99999', '-20.5', '0.3', ''],
      objectNumber: 2,
    });
    // Both the key and the name of each row can be found.
    expect(await rowsIn('alias')).toBe(6);
    const coverage = await world.agents.reader.get(world.api('catalogues/GOOD/coverage'));
    const cells = (coverage.body as { cells: { count: number }[] }).cells;
    expect(cells.reduce((sum, cell) => sum + cell.count, 0)).toBe(3);
  });

  it('sets rows aside with line, column and reason, takes the rest, and hands them out as a file', async () => {
    const text = `${GOOD}\nK4,ABC 004,370,-20,0.1,\nK5,ABC 005,10,95,0.1,\nK6,ABC 006,10,x,0.1,\nK1,ABC 007,10,10,0.1,\nK8,ABC 008,10,10,oops,\nK9,short\n`;
    const { job, catalogue } = await importTable(world, 'MIXED', text, {
      mapping: {
        ...POSITION_ONLY,
        position: { kind: 'two-columns', raColumn: 2, decColumn: 3, raNotation: 'degrees', decNotation: 'degrees' },
        names: [{ column: 1, separator: null }],
        error: { kind: 'circle', column: 4, unit: 'arcsec', meaning: 'sigma' },
      },
    });
    expect(job.state).toBe('done');
    expect(catalogue).toMatchObject({ sources: 3, setAside: 6, rowsRead: 9 });
    const aside = (await world.agents.reader.get(world.api('catalogues/MIXED/set-aside'))).body as Page;
    expect(aside.items.map((row) => [row.line, row.code, row.column])).toEqual([
      [5, 'ra-out-of-range', 'ra'],
      [6, 'dec-out-of-range', 'dec'],
      [7, 'unreadable-number', 'dec'],
      [8, 'duplicate-key', null],
      [9, 'unreadable-number', 'err'],
      [10, 'too-few-cells', null],
    ]);
    const file = await world.agents.reader.get(world.api('catalogues/MIXED/set-aside.csv'));
    expect(file.text.trim().split('\r\n')).toHaveLength(7);
    expect(file.text).toContain('K9,short');
  });

  it('pages through the rows in every order without losing or repeating one', async () => {
    const rows = Array.from({ length: 250 }, (_, i) => `P${i},${i % 360},${(i * 7) % 90},${i % 3 === 0 ? '' : i % 11}`);
    await importTable(world, 'PAGES', `id,ra,dec,mag\n${rows.join('\n')}`);
    for (const sort of ['row', 'designation', 'ra', 'dec', 'error', 'c3']) {
      for (const order of ['asc', 'desc']) {
        const seen: unknown[] = [];
        let after = '';
        for (;;) {
          const url = world.api(`catalogues/PAGES/sources?sort=${sort}&order=${order}&limit=40${after}`);
          const answer = await world.agents.reader.get(url);
          expect([sort, order, answer.status]).toEqual([sort, order, 200]);
          const page = answer.body as Page;
          seen.push(...page.items.map((item) => item.rowNo));
          if (page.next === null) break;
          after = `&after=${encodeURIComponent(page.next)}`;
        }
        expect([sort, order, seen.length, new Set(seen).size]).toEqual([sort, order, 250, 250]);
      }
    }
    const byMag = (await world.agents.reader.get(world.api('catalogues/PAGES/sources?sort=c3&order=desc&limit=500'))).body as Page;
    const mags = byMag.items.map((item) => (item.cells as string[])[3]);
    expect(mags.slice(0, 3)).toEqual(['10', '10', '10']);
    expect(mags.slice(-84)).toEqual(Array(84).fill(''));
    const found = (await world.agents.reader.get(world.api('catalogues/PAGES/sources?text=p17'))).body as Page;
    expect(found.total).toBe(11);
    const cone = (await world.agents.reader.get(world.api('catalogues/PAGES/sources?ra=1&dec=7&radiusArcsec=3600'))).body as Page;
    expect(cone.items.map((item) => item.designation)).toEqual(['P1']);
  });

  it('leaves nothing of an import that is cancelled in the middle', async () => {
    const before = [await rowsIn('catalogue'), await rowsIn('entry'), await rowsIn('object'), await bulkTables()];
    const rows = Array.from({ length: 20_000 }, (_, i) => `C${i},${i % 360},${i % 90}`);
    const file = (await upload(world, `id,ra,dec\n${rows.join('\n')}`)).body as UploadedFile;
    const jobId = await startImport(world, 'GONE', file);
    const actor = world.actors.curator;
    await runJob(
      world.context,
      { jobId, groupId: actor.groupId },
      {
        ...JOB_KIND_WORK,
        import: {
          ...JOB_KIND_WORK.import,
          // A person presses Cancel after the first report of progress.
          async work(context, run) {
            let reports = 0;
            await JOB_KIND_WORK.import.work(context, {
              ...run,
              async report(done, total, message) {
                reports += 1;
                if (reports === 1) await cancelJob(context, actor, jobId);
                // Past the pause between two writes of progress, as in a longer import.
                await run.report(done, total, message);
                if (reports > 1) await run.report(done, total, message, 'now');
              },
            });
          },
        },
      },
    );
    const job = (await world.agents.reader.get(world.api(`jobs/${jobId}`))).body as { state: string };
    expect(job.state).toBe('cancelled');
    expect([await rowsIn('catalogue'), await rowsIn('entry'), await rowsIn('object'), await bulkTables()]).toEqual(before);
    expect(readdirSync(world.context.config.filesDir).filter((name) => name.startsWith(file.fileId))).toEqual([]);
    expect(readdirSync(world.context.config.filesDir).filter((name) => name.endsWith('.part'))).toEqual([]);
    await world.agents.reader.get(world.api('catalogues/GONE')).expect(404);
  });

  it('says in one sentence why no row could be read, and leaves the label free', async () => {
    const { job, catalogue } = await importTable(world, 'NONE', 'id,ra,dec\na,400,1\nb,500,2\n', {
      mapping: POSITION_ONLY,
    });
    expect(catalogue).toBeNull();
    expect(job).toMatchObject({ state: 'failed', error: { code: 'no-sources' } });
    expect(job.error?.detail).toContain('2 rows');
    expect(await importTable(world, 'NONE', GOOD)).toMatchObject({ job: { state: 'done' } });
  });

  it('keeps a label to one catalogue, whatever its case, also for ten at once', async () => {
    const file = (await upload(world, GOOD)).body as UploadedFile;
    const labels = Array.from({ length: 10 }, (_, i) => (i % 2 === 0 ? 'Twice' : 'TWICE'));
    const answers = await Promise.allSettled(labels.map((label) => startImport(world, label, file)));
    expect(answers.filter((answer) => answer.status === 'fulfilled')).toHaveLength(1);
  });

  it('refuses a mapping that names columns the file does not have', async () => {
    const file = (await upload(world, GOOD)).body as UploadedFile;
    const attempt = startImport(world, 'BEYOND', file, {
      mapping: {
        ...POSITION_ONLY,
        position: { kind: 'two-columns', raColumn: 2, decColumn: 33, raNotation: 'degrees', decNotation: 'degrees' },
      },
    });
    await expect(attempt).rejects.toThrow(/mapping-refused.*mapping\.position\.decColumn/);
  });

  it('understands the open samples without help', async () => {
    const cases = [
      ['deepsky-south/alpha.csv.gz', 21760],
      ['deepsky-south/beta.tsv.gz', 2437],
      ['stars-south/hip_j2000.csv.gz', 11320],
      ['stars-south/hd_epoch1950.csv.gz', 11678],
      ['stars-south/bright.tsv.gz', 2542],
    ] as const;
    for (const [name, rows] of cases) {
      const label = name.replace(/^.*\/|\..*$/g, '');
      const { catalogue } = await importTable(world, label, readFileSync(path.join(SAMPLES, name)));
      expect([name, catalogue?.sources, catalogue?.setAside]).toEqual([name, rows, 0]);
    }
  });
});
