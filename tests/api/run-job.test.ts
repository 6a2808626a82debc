import { sql } from 'drizzle-orm';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { inTransaction } from '../../db/client';
import { job as jobSchema } from '../../shared/schemas/job';
import { candidatePage, runDetail, type Candidate, type RunDetail } from '../../shared/schemas/run';
import { cancelJob, getJob, JobCancelled, runJob, type JobKindWork } from '../../server/services/jobs';
import { workOnRun } from '../../server/services/run-work';
import { createRun } from '../../server/services/runs';
import { JOB_KIND_WORK } from '../../server/jobs/kinds';
import { addCatalogue, runJobs } from '../support/fixtures';
import { createWorld, type World } from '../support/world';

let world: World;

const ARCSEC = 1 / 3600;

beforeAll(async () => {
  world = await createWorld();
  const places = (shift: number) =>
    Array.from({ length: 4 }, (_, i) => ({ raDeg: 20 + i, decDeg: -10 + shift * ARCSEC }));
  await addCatalogue(world, { label: 'OPT', sources: places(0) });
  await addCatalogue(world, { label: 'RAD', sources: places(0.5) });
});
afterAll(() => world.close());

const startRun = (catalogues: string[], radiusArcsec: number) =>
  createRun(world.context, world.actors.curator, { catalogues, radiusArcsec, title: '' });

async function detail(run: number): Promise<RunDetail> {
  return runDetail.parse((await world.agents.reader.get(world.api(`runs/${run}`))).body);
}

async function candidatesOf(run: number): Promise<Candidate[]> {
  return candidatePage.parse((await world.agents.reader.get(world.api(`runs/${run}/candidates`))).body).items;
}

describe('a run that does not end well', () => {
  const payloadOf = (jobId: string) => ({ jobId, groupId: world.actors.owner.groupId });
  const kindsWith = (work: JobKindWork['work']) => ({
    ...JOB_KIND_WORK,
    run: { ...JOB_KIND_WORK.run, work },
  });

  it('leaves nothing when it is cancelled while it writes', async () => {
    const { run, jobId } = await startRun(['OPT', 'RAD'], 2);
    // `report` writes a few times a second and throws at the next writing; here it throws at the next call.
    let asked = false;
    const asks = kindsWith((context, running) =>
      workOnRun(context, {
        ...running,
        async report(_done, _total, message) {
          if (asked) throw new JobCancelled();
          if (message !== 'Writing candidates') return;
          await cancelJob(context, world.actors.curator, jobId);
          asked = true;
        },
      }),
    );
    await runJob(world.context, payloadOf(jobId), asks);
    expect(await getJob(world.context, world.actors.owner, jobId)).toMatchObject({ state: 'cancelled' });
    expect(await detail(run)).toMatchObject({ state: 'cancelled', candidates: 0, pairs: [] });
    expect(await candidatesOf(run)).toEqual([]);
    expect(await partitionsOf(run)).toBe(0);
  });

  async function partitionsOf(run: number): Promise<number> {
    const { rows } = await inTransaction(world.context.database, world.actors.owner, (tx) =>
      tx.execute<{ n: number }>(sql`select count(*) as n from pg_class c join match_run r on r.number = ${run}
        where c.relname = 'candidate_' || r.id`),
    );
    return rows[0]?.n ?? -1;
  }

  it('leaves nothing when it breaks, and works when it is carried out again', async () => {
    const { run, jobId } = await startRun(['OPT', 'RAD'], 2);
    const breaks = kindsWith(async (context, running) => {
      await workOnRun(context, {
        ...running,
        report: (_done, _total, message) =>
          message === 'Indexing candidates'
            ? Promise.reject(new Error('the disk is gone'))
            : Promise.resolve(),
      });
    });
    await runJob(world.context, payloadOf(jobId), breaks);
    const ended = await getJob(world.context, world.actors.owner, jobId);
    expect(ended).toMatchObject({ state: 'failed', error: { code: 'internal' } });
    expect(ended.message).not.toContain('disk');
    expect(await partitionsOf(run)).toBe(0);

    await inTransaction(world.context.database, world.actors.owner, (tx) =>
      tx.execute(sql`update job set state = 'queued', finished_at = null where id = ${jobId}`),
    );
    await runJob(world.context, payloadOf(jobId), JOB_KIND_WORK);
    expect(await detail(run)).toMatchObject({ state: 'done', candidates: 4 });
    // As after the death of a worker between its commit and the closing of the job: nothing is done twice.
    await inTransaction(world.context.database, world.actors.owner, (tx) =>
      tx.execute(sql`update job set state = 'running', finished_at = null where id = ${jobId}`),
    );
    await runJob(world.context, payloadOf(jobId), JOB_KIND_WORK);
    expect(await detail(run)).toMatchObject({ state: 'done', candidates: 4 });
    expect(await candidatesOf(run)).toHaveLength(4);
  });

  it('refuses more pairs than a worker can hold', async () => {
    const { run, jobId } = await startRun(['OPT', 'RAD'], 2);
    await runJob(
      world.context,
      payloadOf(jobId),
      kindsWith((context, running) => workOnRun(context, running, 3)),
    );
    const res = await world.agents.reader.get(world.api(`jobs/${jobId}`));
    expect(jobSchema.parse(res.body)).toMatchObject({ state: 'failed', error: { code: 'too-many-pairs' } });
    expect(await detail(run)).toMatchObject({ state: 'failed', candidates: 0 });
  });
});

describe('a run over many rows', () => {
  it('writes every candidate of several batches', async () => {
    // Just over one batch.
    const ROWS = 4100;
    const grid = (shift: number) =>
      Array.from({ length: ROWS }, (_, i) => ({
        raDeg: (i % 100) * 0.01,
        decDeg: Math.floor(i / 100) * 0.01 + shift,
      }));
    await addCatalogue(world, { label: 'GRID1', sources: grid(0) });
    await addCatalogue(world, { label: 'GRID2', sources: grid(0.5 * ARCSEC) });
    const { run } = await startRun(['GRID1', 'GRID2'], 1);
    await runJobs(world);
    expect((await detail(run)).candidates).toBe(ROWS);
    const [sums] = (
      await inTransaction(world.context.database, world.actors.owner, (tx) =>
        tx.execute<{ rows: number; seqs: number; pairs: number }>(sql`
          select count(*) as rows, count(distinct c.seq) as seqs, count(*) filter (where c.row_a = c.row_b) as pairs
          from candidate c join match_run r on r.id = c.run_id where r.number = ${run}`),
      )
    ).rows;
    expect(sums).toEqual({ rows: ROWS, seqs: ROWS, pairs: ROWS });
  });
});
