import { sql, type SQL } from 'drizzle-orm';
import { z } from 'zod';
import { inTransaction, type Tx } from '../../db/client';
import type { Candidate, candidateQuery, verdictCounts as counts } from '../../shared/schemas/run';
import type { Context, GroupActor } from '../context';
import { found, refuse } from '../errors';
import { decodeCursor, encodeCursor } from './cursor';
import { liveIdOf } from './live-object';
import { runByNumber, runRevisions, type RunRow } from './run-lookup';
import { bigintArray, verdictJson } from './verdict-log';

export type CandidateFilter = Omit<z.output<typeof candidateQuery>, 'limit' | 'after'>;
export interface CandidatePage {
  items: Candidate[];
  next: string | null;
  total: number | null;
}

/** Above this many candidates a filtered list is not counted: counting would cost more than the page. */
const MAX_COUNTED = 100_000;
const seqCursor = z.number().int();

const onPair = sql`f.group_id = c.group_id and f.entry_a = least(c.entry_a, c.entry_b)
  and f.entry_b = greatest(c.entry_a, c.entry_b)`;

/** Candidate `c` with the verdict in force on its pair, `f`. */
export const candidatesWithVerdict = sql`candidate c left join verdict_in_force f on ${onPair}`;

/** Mutual best on both sides and nobody else inside the radius (on `c`). */
export const isClear = sql`(c.mutual_best and c.rivals_a = 0 and c.rivals_b = 0)`;

export function ofRun(actor: GroupActor, run: Pick<RunRow, 'id'>): SQL {
  return sql`c.run_id = ${run.id} and c.group_id = ${actor.groupId}`;
}

/** Candidates under a filter, as parts of a query: where they come from, their verdict, and the conditions. */
interface Queue {
  from: SQL;
  verdictId: SQL;
  where: SQL[];
}

/** Candidates under a filter. Each kind of verdict has its own join, so that a page can stop at its last row. */
async function queueOf(tx: Tx, actor: GroupActor, run: RunRow, filter: CandidateFilter): Promise<Queue> {
  const where = [ofRun(actor, run), ...(await conditionsOf(tx, actor, run, filter))];
  if (filter.verdict === 'any') return { from: candidatesWithVerdict, verdictId: sql`f.verdict_id`, where };
  if (filter.verdict === 'undecided') {
    const undecided = sql`not exists (select 1 from verdict_in_force f where ${onPair})`;
    return { from: sql`candidate c`, verdictId: sql`null::bigint`, where: [...where, undecided] };
  }
  return {
    from: sql`candidate c join verdict_in_force f on ${onPair}`,
    verdictId: sql`f.verdict_id`,
    where: [...where, sql`f.value = ${filter.verdict}`],
  };
}

/** The conditions of a filter on `c`: all but the verdict. */
export async function conditionsOf(
  tx: Tx,
  actor: GroupActor,
  run: RunRow,
  filter: CandidateFilter,
): Promise<SQL[]> {
  const conditions: SQL[] = [];
  if (filter.kind === 'clear') conditions.push(isClear);
  if (filter.kind === 'crowded') conditions.push(sql`not ${isClear}`);
  if (filter.minSepArcsec !== undefined) conditions.push(sql`c.sep_arcsec >= ${filter.minSepArcsec}::float8`);
  if (filter.maxSepArcsec !== undefined) conditions.push(sql`c.sep_arcsec <= ${filter.maxSepArcsec}::float8`);
  if (filter.pair !== undefined && filter.pair !== '')
    conditions.push(await pairCondition(tx, actor, run, filter.pair));
  return conditions;
}

/** 'LAB-A,LAB-B' in either order, as the condition on the revisions of a run. */
async function pairCondition(tx: Tx, actor: GroupActor, run: RunRow, pair: string): Promise<SQL> {
  const labels = pair.split(',').map((label) => label.trim().toLowerCase());
  const revisions = await runRevisions(tx, actor, run);
  const [first, second] = revisions.filter(({ label }) => labels.includes(label.toLowerCase()));
  if (labels.length !== 2 || first === undefined || second === undefined) {
    refuse('bad-request', 'The pair names no two catalogues of this cross-match.', {
      errors: [{ path: 'pair', message: 'two labels with a comma between' }],
    });
  }
  return sql`(c.revision_a = ${first.id} and c.revision_b = ${second.id})`;
}

/** Candidates of a run in the order of separation, a keyset page at a time. */
export async function listCandidates(
  context: Context,
  actor: GroupActor,
  number: number,
  query: z.output<typeof candidateQuery>,
): Promise<CandidatePage> {
  return inTransaction(context.database, actor, async (tx) => {
    const run = await runByNumber(tx, actor, number);
    const queue = await queueOf(tx, actor, run, query);
    const from = query.after === undefined ? [] : [beyond(query.sort, decodeCursor(seqCursor, query.after))];
    const found = await selectCandidates(
      tx,
      run,
      { ...queue, where: [...queue.where, ...from] },
      { descending: query.sort === 'sep-desc', limit: query.limit + 1 },
    );
    const items = found.slice(0, query.limit);
    const last = items.at(-1);
    return {
      items,
      next: found.length > query.limit && last !== undefined ? encodeCursor(last.seq) : null,
      total: await countPageable(tx, run, queue, query),
    };
  });
}

function beyond(sort: CandidateFilter['sort'], seq: number): SQL {
  return sort === 'sep' ? sql`c.seq > ${seq}` : sql`c.seq < ${seq}`;
}

async function countPageable(
  tx: Tx,
  run: RunRow,
  queue: Queue,
  filter: CandidateFilter,
): Promise<number | null> {
  // The run itself is the one condition of a list without filters.
  if (filter.verdict === 'any' && queue.where.length === 1) return run.candidates;
  if (run.candidates > MAX_COUNTED) return null;
  const { rows } = await tx.execute<{ n: number }>(
    sql`select count(*) as n from ${queue.from} where ${sql.join(queue.where, sql` and `)}`,
  );
  return found(rows[0], 'count').n;
}

/** One side of candidate `c` as JSON: its source, catalogue and live object. */
function sideJson(side: 'a' | 'b'): SQL {
  const [s, k, o] = [sql.raw(`s${side}`), sql.raw(`k${side}`), sql.raw(`o${side}`)];
  return sql`json_build_object('catalogue', ${k}.label, 'ordinal', ${k}.ordinal, 'entryId', ${s}.entry_id,
    'rowNo', ${s}.row_no, 'designation', ${s}.designation, 'raDeg', ${s}.ra_deg, 'decDeg', ${s}.dec_deg,
    'errMajArcsec', ${s}.err_maj_arcsec, 'errMinArcsec', ${s}.err_min_arcsec, 'errPaDeg', ${s}.err_pa_deg,
    'objectNumber', ${o}.number)`;
}

function sideJoins(side: 'a' | 'b', revisionIds: readonly number[]): SQL {
  const [s, r, k, b, o] = ['s', 'r', 'k', 'b', 'o'].map((prefix) => sql.raw(`${prefix}${side}`));
  const [revision, row] = [sql.raw(`c.revision_${side}`), sql.raw(`c.row_${side}`)];
  // The list of revisions lets the planner leave all other partitions alone.
  return sql`join source ${s} on ${s}.revision_id = ${revision} and ${s}.row_no = ${row}
      and ${s}.revision_id = any(${bigintArray(revisionIds)}::int[])
    join catalogue_revision ${r} on ${r}.id = ${revision}
    join catalogue ${k} on ${k}.id = ${r}.catalogue_id
    left join object ${b} on ${b}.id = ${s}.entry_id
    left join object ${o} on ${o}.id = ${liveIdOf(`b${side}`)}`;
}

/** Candidates of a queue in the order of separation, with all that is shown of them. */
async function selectCandidates(
  tx: Tx,
  run: RunRow,
  queue: Queue,
  { descending, limit }: { descending: boolean; limit: number },
): Promise<Candidate[]> {
  const order = descending ? sql`c.seq desc` : sql`c.seq`;
  const { rows } = await tx.execute<Candidate & { [key: string]: unknown }>(sql`
    with page as materialized (
      select c.*, ${queue.verdictId} as verdict_id from ${queue.from}
      where ${sql.join(queue.where, sql` and `)} order by ${order} limit ${limit})
    select c.seq, ${sideJson('a')} as a, ${sideJson('b')} as b, c.sep_arcsec as "sepArcsec", c.pa_deg as "paDeg",
      c.rank_a as "rankA", c.rank_b as "rankB", c.rivals_a as "rivalsA", c.rivals_b as "rivalsB",
      c.mutual_best as "mutualBest", ${verdictJson} as verdict
    from page c
    ${sideJoins('a', run.revisionIds)}
    ${sideJoins('b', run.revisionIds)}
    left join verdict v on v.id = c.verdict_id
    left join person p on p.id = v.person_id
    order by ${order}`);
  return rows;
}

/** The candidates of a run that meet a condition on `c`, by separation. */
export function candidatesWhere(
  tx: Tx,
  actor: GroupActor,
  run: RunRow,
  condition: SQL,
  limit: number,
): Promise<Candidate[]> {
  const where = [ofRun(actor, run), condition];
  const queue = { from: candidatesWithVerdict, verdictId: sql`f.verdict_id`, where };
  return selectCandidates(tx, run, queue, { descending: false, limit });
}

/** How the candidates of a run stand: by verdict in force, undecided, and how many of the verdicts are automatic. */
export async function verdictCounts(tx: Tx, actor: GroupActor, run: RunRow): Promise<z.infer<typeof counts>> {
  const { rows } = await tx.execute<Omit<z.infer<typeof counts>, 'undecided'> & { decided: number }>(sql`
    select count(*) filter (where f.value = 'same') as same, count(*) filter (where f.value = 'different') as different,
      count(*) filter (where f.value = 'unsure') as unsure, count(*) filter (where f.policy_id is not null) as automatic,
      count(*) as decided
    from candidate c join verdict_in_force f
      on f.entry_a = least(c.entry_a, c.entry_b) and f.entry_b = greatest(c.entry_a, c.entry_b)
    where ${ofRun(actor, run)} and f.group_id = ${actor.groupId}`);
  const { decided, ...by } = found(rows[0], 'count');
  return { ...by, undecided: run.candidates - decided };
}
