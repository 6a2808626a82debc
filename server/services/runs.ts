import { readFileSync } from 'node:fs';
import path from 'node:path';
import { and, desc, eq, sql } from 'drizzle-orm';
import { inTransaction, type Tx } from '../../db/client';
import { researchGroup } from '../../db/schema/group';
import { job } from '../../db/schema/job';
import { person } from '../../db/schema/person';
import { matchRun } from '../../db/schema/run';
import type { NewRun, RunDetail, RunSummary } from '../../shared/schemas/run';
import type { Context, GroupActor } from '../context';
import { found, refuse } from '../errors';
import { recordEvent } from './audit';
import { verdictCounts } from './candidates';
import { catalogueByLabel } from './catalogues';
import { enqueueJob } from './jobs';
import { appliedPolicies } from './policies';
import { revisionsById, runByNumber, type RunRevision } from './run-lookup';

const MAX_LISTED = 500;

/** Version of this software, as its manifest states it; kept with every run. */
export const SOFTWARE_VERSION = versionOf(
  JSON.parse(readFileSync(path.join(import.meta.dirname, '..', '..', 'package.json'), 'utf8')),
);

function versionOf(manifest: unknown): string {
  if (
    typeof manifest === 'object' &&
    manifest !== null &&
    'version' in manifest &&
    typeof manifest.version === 'string'
  ) {
    return manifest.version;
  }
  throw new Error('package.json states no version');
}

/** Plans a cross-match of the newest revisions of catalogues and queues it; revisions must be ready. */
export async function createRun(
  context: Context,
  actor: GroupActor,
  input: NewRun,
): Promise<{ run: number; jobId: string }> {
  return inTransaction(context.database, actor, async (tx) => {
    const revisionIds = await readyRevisions(tx, actor, input.catalogues);
    const number = await takeRunNumber(tx, actor);
    const jobId = crypto.randomUUID();
    const [row] = await tx
      .insert(matchRun)
      .values({
        groupId: actor.groupId,
        number,
        title: input.title === '' ? input.catalogues.join(' × ') : input.title,
        revisionIds,
        radiusArcsec: input.radiusArcsec,
        softwareVersion: SOFTWARE_VERSION,
        jobId,
        createdBy: actor.personId,
      })
      .returning({ id: matchRun.id });
    await enqueueJob(tx, actor, {
      id: jobId,
      kind: 'run',
      title: `Cross-match ${number}`,
      payload: { runId: found(row, 'cross-match').id },
      link: `cross-match/${number}`,
    });
    await recordEvent(tx, actor, 'cross-match started', `cross-match ${number}`, {
      catalogues: input.catalogues,
      radiusArcsec: input.radiusArcsec,
    });
    return { run: number, jobId };
  });
}

async function readyRevisions(tx: Tx, actor: GroupActor, labels: readonly string[]): Promise<number[]> {
  const ids: number[] = [];
  // At most a dozen labels.
  for (const [i, label] of labels.entries()) {
    const { catalogue, revision } = await catalogueByLabel(tx, actor, label);
    if (revision.state !== 'ready') {
      refuse('not-ready', `The import of ${catalogue.label} is not finished (${revision.state}).`, {
        errors: [{ path: `catalogues.${i}`, message: 'is not ready' }],
      });
    }
    // Labels ignore case, so the same catalogue may come under two spellings.
    if (ids.includes(revision.id)) {
      refuse('bad-request', `The catalogue ${catalogue.label} is named twice.`, {
        errors: [{ path: `catalogues.${i}`, message: 'is named twice' }],
      });
    }
    ids.push(revision.id);
  }
  return ids;
}

/** The update locks the group's row: two runs never get the same number. */
async function takeRunNumber(tx: Tx, actor: GroupActor): Promise<number> {
  const [group] = await tx
    .update(researchGroup)
    .set({ nextRunNumber: sql`${researchGroup.nextRunNumber} + 1` })
    .where(eq(researchGroup.id, actor.groupId))
    .returning({ next: researchGroup.nextRunNumber });
  return found(group, 'group').next - 1;
}

async function selectRuns(tx: Tx, actor: GroupActor, number: number | null) {
  return tx
    .select({ run: matchRun, job, createdBy: person.name })
    .from(matchRun)
    .innerJoin(job, eq(job.id, matchRun.jobId))
    .innerJoin(person, eq(person.id, matchRun.createdBy))
    .where(
      and(eq(matchRun.groupId, actor.groupId), number === null ? undefined : eq(matchRun.number, number)),
    )
    .orderBy(desc(matchRun.number))
    .limit(MAX_LISTED);
}

type SelectedRun = Awaited<ReturnType<typeof selectRuns>>[number];

function summaryOf(row: SelectedRun, revisions: Map<number, RunRevision>): RunSummary {
  return {
    run: row.run.number,
    title: row.run.title,
    catalogues: row.run.revisionIds.map((id) => {
      const { label, ordinal, revision, sources, epochYear } = found(revisions.get(id), 'revision');
      return { label, ordinal, revision, sources, epochYear };
    }),
    radiusArcsec: row.run.radiusArcsec,
    state: row.job.state,
    candidates: row.run.candidates,
    createdBy: row.createdBy,
    createdAt: row.run.createdAt.toISOString(),
    jobId: row.run.jobId,
  };
}

/** The group's runs, the newest first. */
export async function listRuns(context: Context, actor: GroupActor): Promise<RunSummary[]> {
  return inTransaction(context.database, actor, async (tx) => {
    const rows = await selectRuns(tx, actor, null);
    const revisions = await revisionsById(
      tx,
      actor,
      rows.flatMap((row) => row.run.revisionIds),
    );
    return rows.map((row) => summaryOf(row, revisions));
  });
}

/** A run with its statistics for each pair of catalogues, its verdicts so far and its policies. */
export async function getRun(context: Context, actor: GroupActor, number: number): Promise<RunDetail> {
  return inTransaction(context.database, actor, async (tx) => {
    const run = await runByNumber(tx, actor, number);
    const [row] = await selectRuns(tx, actor, number);
    const seen = found(row, 'cross-match');
    return {
      ...summaryOf(seen, await revisionsById(tx, actor, run.revisionIds)),
      pairs: run.pairs,
      verdicts: await verdictCounts(tx, actor, run),
      policies: await appliedPolicies(tx, actor, run),
      finishedAt: seen.job.finishedAt?.toISOString() ?? null,
      softwareVersion: run.softwareVersion,
    };
  });
}
