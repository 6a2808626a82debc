import { sql, type SQL } from 'drizzle-orm';
import { inTransaction, type Tx } from '../../db/client';
import type { Candidate, DeskTask } from '../../shared/schemas/run';
import { midpoint } from '../../shared/astro/sphere';
import type { Context, GroupActor } from '../context';
import { found } from '../errors';
import {
  candidatesWhere,
  candidatesWithVerdict,
  conditionsOf,
  ofRun,
  type CandidateFilter,
} from './candidates';
import { coneSources } from './near-sources';
import { runByNumber, runRevisions, type RunRevision, type RunRow } from './run-lookup';
import { bigintArray, verdictsOnPair } from './verdict-log';

const CELL_SEPARATOR = '\u001f';
const MAX_OTHERS = 50;
const MAX_FIELD_SOURCES = 400;
/** The field of the chart in radii of the run, and its limits in arcsec. */
const FIELD_RADII = 3;
const MIN_FIELD_ARCSEC = 10;
const MAX_FIELD_ARCSEC = 5400;

/** Everything the desk shows for one candidate, and where the queue goes on under the same filter. */
export async function deskTask(
  context: Context,
  actor: GroupActor,
  number: number,
  seq: number,
  filter: CandidateFilter,
): Promise<DeskTask> {
  return inTransaction(context.database, actor, async (tx) => {
    const run = await runByNumber(tx, actor, number);
    const [row] = await candidatesWhere(tx, actor, run, sql`c.seq = ${seq}`, 1);
    const candidate = found(row, `candidate ${seq}`);
    const revisions = await runRevisions(tx, actor, run);
    const pair = [candidate.a.entryId, candidate.b.entryId] as const;
    return {
      candidate,
      others: await candidatesWhere(tx, actor, run, sql`${touches(pair)} and c.seq <> ${seq}`, MAX_OTHERS),
      ...(await fieldAround(context, tx, actor, run, candidate)),
      rowA: await originalRow(tx, actor, revisionOf(revisions, candidate.a), candidate.a.rowNo),
      rowB: await originalRow(tx, actor, revisionOf(revisions, candidate.b), candidate.b.rowNo),
      past: await verdictsOnPair(tx, actor, ...pair),
      ...(await neighboursInQueue(tx, actor, run, seq, filter)),
    };
  });
}

/** Candidates that share an entry with a pair. */
function touches(pair: readonly number[]): SQL {
  const entries = bigintArray(pair);
  return sql`(c.entry_a = any(${entries}) or c.entry_b = any(${entries}))`;
}

function revisionOf(revisions: RunRevision[], side: Candidate['a']): RunRevision {
  return found(
    revisions.find(({ label }) => label === side.catalogue),
    'revision',
  );
}

async function fieldAround(
  context: Context,
  tx: Tx,
  actor: GroupActor,
  run: RunRow,
  { a, b }: Candidate,
): Promise<Pick<DeskTask, 'field' | 'fieldRadiusArcsec'>> {
  const radiusArcsec = Math.min(MAX_FIELD_ARCSEC, Math.max(MIN_FIELD_ARCSEC, FIELD_RADII * run.radiusArcsec));
  const centre = midpoint(a, b) ?? a;
  const sources = await coneSources(
    context,
    tx,
    actor,
    run.revisionIds,
    { ...centre, radiusArcsec },
    MAX_FIELD_SOURCES,
  );
  const field = sources.map(
    ({ revisionId: _revisionId, epochYear: _epochYear, sepArcsec: _sepArcsec, ...side }) => side,
  );
  return { field, fieldRadiusArcsec: radiusArcsec };
}

/** The cells of a row as written, by column. */
async function originalRow(
  tx: Tx,
  actor: GroupActor,
  revision: RunRevision,
  rowNo: number,
): Promise<DeskTask['rowA']> {
  const { rows } = await tx.execute<{ cells: string }>(sql`
    select cells from source
    where revision_id = ${revision.id} and row_no = ${rowNo} and group_id = ${actor.groupId}`);
  const cells = found(rows[0], 'row').cells.split(CELL_SEPARATOR);
  return revision.columns.map(({ name }, i) => ({ name, cell: cells[i] ?? '' }));
}

/** One pass over the queue: the nearest on either side of a candidate, and how many wait for a verdict. */
async function neighboursInQueue(
  tx: Tx,
  actor: GroupActor,
  run: RunRow,
  seq: number,
  filter: CandidateFilter,
): Promise<Pick<DeskTask, 'previousSeq' | 'nextSeq' | 'undecidedLeft'>> {
  const where = [ofRun(actor, run), ...(await conditionsOf(tx, actor, run, filter))];
  const undecided = sql`f.verdict_id is null`;
  const inQueue =
    filter.verdict === 'any'
      ? sql`true`
      : filter.verdict === 'undecided'
        ? undecided
        : sql`f.value = ${filter.verdict}`;
  const { rows } = await tx.execute<{ lower: number | null; higher: number | null; left: number }>(sql`
    select max(c.seq) filter (where ${inQueue} and c.seq < ${seq}) as lower,
      min(c.seq) filter (where ${inQueue} and c.seq > ${seq}) as higher,
      count(*) filter (where ${undecided}) as left
    from ${candidatesWithVerdict} where ${sql.join(where, sql` and `)}`);
  const { lower, higher, left } = found(rows[0], 'count');
  const [previousSeq, nextSeq] = filter.sort === 'sep' ? [lower, higher] : [higher, lower];
  return { previousSeq, nextSeq, undecidedLeft: left };
}
