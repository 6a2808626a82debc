import { eq } from 'drizzle-orm';
import { z } from 'zod';
import { inTransaction } from '../../db/client';
import { matchRun } from '../../db/schema/run';
import type { PairStatistics } from '../../shared/schemas/run';
import type { Context, GroupActor } from '../context';
import { refuse } from '../errors';
import { recordEvent } from './audit';
import { copyCandidates, type CandidateRow } from './candidate-copy';
import type { JobRun } from './jobs';
import { revisionPositions } from './revision-index';
import { compare, pairStatisticsOf, type ComparedSide, type Comparison } from './run-comparison';
import { runById, runRevisions, type RunRow } from './run-lookup';

const runPayload = z.strictObject({ runId: z.number().int() });
/** Pairs of one run, over all its pairs of catalogues: what fits into the memory of a worker. */
const MAX_PAIRS = 20_000_000;

/**
 * The job of a cross-match: compares every pair of its catalogues, then writes candidates and statistics in one
 * transaction, so that a cancelled or broken run leaves nothing. Started again after it had ended, it finds its
 * work done.
 */
export async function workOnRun(context: Context, run: JobRun, maxPairs = MAX_PAIRS): Promise<void> {
  const { runId } = runPayload.parse(run.payload);
  const { actor } = run;
  const { row, sides } = await loadSides(context, actor, runId);
  // A run of two catalogues has the statistics of at least one pair, so these say that it ended.
  if (row.pairs.length > 0) {
    run.finish(row.candidates, endingOf(row.candidates));
    return;
  }
  const comparisons = await compareAll(run, row, sides, maxPairs);
  const statistics: PairStatistics[] = [];
  for (const comparison of comparisons) {
    await run.report(0, null, `Measuring chance pairs of ${comparison.a.label} and ${comparison.b.label}`);
    statistics.push(pairStatisticsOf(comparison, row.radiusArcsec));
  }
  const candidates = comparisons.reduce((sum, { pairs }) => sum + pairs.a.length, 0);
  await run.report(0, candidates, 'Sorting candidates');
  const rowAt = bySeparation(comparisons);
  await inTransaction(context.database, actor, async (tx) => {
    await copyCandidates(tx, { groupId: actor.groupId, runId }, candidates, rowAt, (done) =>
      run.report(done, candidates, 'Writing candidates'),
    );
    await run.report(candidates, candidates, 'Indexing candidates');
    await tx.update(matchRun).set({ candidates, pairs: statistics }).where(eq(matchRun.id, runId));
    await recordEvent(tx, actor, 'cross-match finished', `cross-match ${row.number}`, { candidates });
  });
  run.finish(candidates, endingOf(candidates));
}

/** The candidates come and go with their transaction, so a run that was cancelled or failed has nothing to undo. */
export function unwindRun(): Promise<null> {
  return Promise.resolve(null);
}

function endingOf(candidates: number): string {
  return `${candidates} candidates.`;
}

async function loadSides(
  context: Context,
  actor: GroupActor,
  runId: number,
): Promise<{ row: RunRow; sides: ComparedSide[] }> {
  const { row, revisions } = await inTransaction(context.database, actor, async (tx) => {
    const row = await runById(tx, actor, runId);
    return { row, revisions: await runRevisions(tx, actor, row) };
  });
  const sides: ComparedSide[] = [];
  for (const { id, label } of revisions) {
    sides.push({ label, revisionId: id, positions: await revisionPositions(context, actor, id) });
  }
  return { row, sides };
}

async function compareAll(
  run: JobRun,
  row: RunRow,
  sides: readonly ComparedSide[],
  maxPairs: number,
): Promise<Comparison[]> {
  const plan = sides.flatMap((a, i) => sides.slice(i + 1).map((b) => ({ a, b })));
  const totalRows = plan.reduce((sum, { a }) => sum + a.positions.rowCount, 0);
  const comparisons: Comparison[] = [];
  let rowsBefore = 0;
  let roomLeft = maxPairs;
  for (const { a, b } of plan) {
    if (roomLeft <= 0) refuse('too-many-pairs', `The catalogues have more than ${maxPairs} pairs.`);
    const base = rowsBefore;
    const comparison = await compare(a, b, row.radiusArcsec, roomLeft, (doneRows) =>
      run.report(base + doneRows, totalRows, `Comparing ${a.label} with ${b.label}`),
    );
    comparisons.push(comparison);
    rowsBefore += a.positions.rowCount;
    roomLeft -= comparison.pairs.a.length;
  }
  return comparisons;
}

/** A reader of all pairs in the order of separation; equal ones in the order of the plan, then of the rows. */
function bySeparation(comparisons: readonly Comparison[]): (index: number, row: CandidateRow) => void {
  const count = comparisons.reduce((sum, { pairs }) => sum + pairs.a.length, 0);
  const sepArcsec = new Float64Array(count);
  const comparisonOf = new Uint8Array(count);
  const pairOf = new Uint32Array(count);
  const order = new Uint32Array(count);
  let at = 0;
  comparisons.forEach(({ pairs }, which) => {
    for (let pair = 0; pair < pairs.a.length; pair += 1, at += 1) {
      sepArcsec[at] = pairs.sepArcsec[pair] ?? NaN;
      comparisonOf[at] = which;
      pairOf[at] = pair;
      order[at] = at;
    }
  });
  const rowOf = (place: number, side: 'a' | 'b') =>
    comparisons[comparisonOf[place] ?? 0]?.pairs[side][pairOf[place] ?? 0] ?? 0;
  order.sort(
    (x, y) =>
      (sepArcsec[x] ?? NaN) - (sepArcsec[y] ?? NaN) ||
      (comparisonOf[x] ?? 0) - (comparisonOf[y] ?? 0) ||
      rowOf(x, 'a') - rowOf(y, 'a') ||
      rowOf(x, 'b') - rowOf(y, 'b'),
  );
  return (index, row) => {
    const place = order[index] ?? 0;
    const comparison = comparisons[comparisonOf[place] ?? 0];
    if (comparison !== undefined) fillRow(row, comparison, pairOf[place] ?? 0);
  };
}

function fillRow(row: CandidateRow, { a, b, pairs, ranks, paDeg }: Comparison, pair: number): void {
  const rowA = pairs.a[pair] ?? 0;
  const rowB = pairs.b[pair] ?? 0;
  row.entryA = a.positions.entryIds[rowA] ?? 0;
  row.entryB = b.positions.entryIds[rowB] ?? 0;
  row.revisionA = a.revisionId;
  row.revisionB = b.revisionId;
  // Rows are counted from 1 in the database.
  row.rowA = rowA + 1;
  row.rowB = rowB + 1;
  row.sepArcsec = pairs.sepArcsec[pair] ?? NaN;
  row.paDeg = paDeg[pair] ?? NaN;
  row.rankA = ranks.rankOfB[pair] ?? 0;
  row.rankB = ranks.rankOfA[pair] ?? 0;
  row.rivalsA = (ranks.partnersOfA[pair] ?? 1) - 1;
  row.rivalsB = (ranks.partnersOfB[pair] ?? 1) - 1;
  row.mutualBest = ranks.mutualBest[pair] === 1;
}
