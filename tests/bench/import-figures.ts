import { spawnSync } from 'node:child_process';
import { openAsBlob } from 'node:fs';
import path from 'node:path';
import { setTimeout as sleep } from 'node:timers/promises';
import pg from 'pg';
import { writeBigTable } from '../../seed/big-table';
import type { Job } from '../../shared/schemas/job';
import type { UploadedFile } from '../../shared/schemas/file';
import type { BenchServer } from './bench-server';
import type { Figure } from './figure';

export const ROWS = 1_000_000;
const COLUMNS = 12;
const GOAL_RATIO = 3;
const GOAL_WORKER_MB = 400;
const POLL_MS = 20;

/** Path of the first big table; the match figures write their partner for it. */
export function bigTablePath(server: BenchServer): string {
  return path.join(server.folder, 'big-a.csv');
}

/** Import of a million rows of twelve columns against a bare \copy of the same file on the same server. */
export async function importFigures(server: BenchServer): Promise<Figure[]> {
  const file = bigTablePath(server);
  await writeBigTable(file, { rows: ROWS, seed: 1 });
  const bareSeconds = await bareCopySeconds(server, file);
  const { readySeconds, jobSeconds } = await importTable(server, file, 'BIGA');
  const data = `${ROWS} rows x ${COLUMNS} columns, CSV`;
  const workerMb = server.peakMemoryMb('worker');
  return [
    {
      name: 'import-million-rows',
      data: `${data}; until all rows are in, keyed and indexed (the revision is ready)`,
      value: readySeconds,
      unit: 's',
      baseline: 'psql \\copy of the file into a bare table of the same columns (s)',
      baselineValue: bareSeconds,
      ratio: readySeconds / bareSeconds,
      goal: `<= ${GOAL_RATIO}x`,
      met: readySeconds <= GOAL_RATIO * bareSeconds,
      repeat: 'npm run bench -- --only import-million-rows',
    },
    {
      name: 'import-worker-memory',
      data,
      value: workerMb,
      unit: 'MB peak resident',
      baseline: 'the goal (MB)',
      baselineValue: GOAL_WORKER_MB,
      ratio: workerMb / GOAL_WORKER_MB,
      goal: `<= ${GOAL_WORKER_MB} MB`,
      met: workerMb <= GOAL_WORKER_MB,
      repeat: 'npm run bench -- --only import-worker-memory',
    },
    {
      name: 'import-registered',
      data: `${data}; the whole job: also position index, coverage, object numbers, aliases with name keys`,
      value: jobSeconds,
      unit: 's',
      baseline: 'psql \\copy as above (s)',
      baselineValue: bareSeconds,
      ratio: jobSeconds / bareSeconds,
      goal: 'none set',
      met: true,
      repeat: 'npm run bench -- --only import-registered',
    },
  ];
}

/** Seconds of psql's \copy into a table of the same columns without any index; the median of three. */
async function bareCopySeconds(server: BenchServer, file: string): Promise<number> {
  const client = new pg.Client({ connectionString: server.ownerUrl });
  await client.connect();
  try {
    return await medianCopy(client, server, file);
  } finally {
    await client.end();
  }
}

async function medianCopy(client: pg.Client, server: BenchServer, file: string): Promise<number> {
  const header = spawnSync('head', ['-1', file], { encoding: 'utf8' }).stdout.trim().split(',');
  const sample = spawnSync('sed', ['-n', '2p', file], { encoding: 'utf8' }).stdout.trim().split(',');
  const columns = header.map((name, i) => `"${name}" ${sample[i] === '' || Number.isNaN(Number(sample[i])) ? 'text' : 'double precision'}`);
  const seconds: number[] = [];
  for (let round = 0; round < 3; round += 1) {
    await client.query(`drop table if exists bare; create table bare (${columns.join(', ')})`);
    const begin = performance.now();
    const done = spawnSync('psql', [server.ownerUrl, '-v', 'ON_ERROR_STOP=1', '-c', `\\copy bare from '${file}' csv header`]);
    if (done.status !== 0) throw new Error(done.stderr.toString());
    seconds.push((performance.now() - begin) / 1000);
  }
  await client.query('drop table bare');
  return seconds.sort((a, b) => a - b)[1] ?? Number.NaN;
}

/** Uploads and imports a table as a person would; times run from the start of the job. */
export async function importTable(
  server: BenchServer,
  file: string,
  label: string,
): Promise<{ readySeconds: number; jobSeconds: number }> {
  const form = new FormData();
  form.set('file', await openAsBlob(file), path.basename(file));
  const uploaded = (await answered(server.fetch(server.api('files'), { method: 'POST', body: form }))) as UploadedFile;
  const { inspection } = uploaded;
  const accepted = (await answered(
    server.fetch(server.api('catalogues'), {
      method: 'POST',
      headers: { 'Content-Type': 'application/json' },
      body: JSON.stringify({
        label,
        title: label,
        description: '',
        band: '',
        citation: '',
        fileId: uploaded.fileId,
        dialect: inspection.dialect,
        mapping: inspection.suggestedMapping,
        frame: 'ICRS',
        epochYear: 2016,
      }),
    }),
  )) as { jobId: string };
  return watchImport(server, label, accepted.jobId);
}

async function watchImport(server: BenchServer, label: string, jobId: string) {
  let readyAt: number | null = null;
  let startedAt: number | null = null;
  for (;;) {
    const job = await finishedJob(server, jobId, 'look');
    startedAt ??= job.startedAt === null ? null : Date.parse(job.startedAt);
    if (readyAt === null && startedAt !== null) {
      const { state } = (await answered(server.fetch(server.api(`catalogues/${label}`)))) as { state: string };
      if (state === 'ready') readyAt = Date.now();
    }
    if (job.finishedAt !== null) {
      const end = Date.parse(job.finishedAt);
      const start = startedAt ?? end;
      return { readySeconds: ((readyAt ?? end) - start) / 1000, jobSeconds: (end - start) / 1000 };
    }
    await sleep(POLL_MS);
  }
}

/** The state of a job; with 'wait', once it has finished. A failed job is an error of the bench. */
export async function finishedJob(server: BenchServer, jobId: string, how: 'look' | 'wait'): Promise<Job> {
  for (;;) {
    const job = (await answered(server.fetch(server.api(`jobs/${jobId}`)))) as Job;
    if (job.state === 'failed') throw new Error(`job failed: ${JSON.stringify(job.error)}`);
    if (how === 'look' || job.finishedAt !== null) return job;
    await sleep(POLL_MS);
  }
}

/** The JSON of an answer; anything but success is an error of the bench. */
export async function answered(pending: Promise<Response>): Promise<unknown> {
  const response = await pending;
  if (!response.ok) throw new Error(`${response.status} ${response.url}: ${await response.text()}`);
  return response.json();
}
