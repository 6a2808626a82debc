import { and, desc, eq, gt, sql, type SQL } from 'drizzle-orm';
import { inTransaction, type Tx } from '../../db/client';
import { person } from '../../db/schema/person';
import { appliedPolicy } from '../../db/schema/run';
import type { PolicyCount, PolicyRule, RunDetail } from '../../shared/schemas/run';
import type { Context, GroupActor } from '../context';
import { partitionEntries } from '../engine/partition';
import { found, refuse } from '../errors';
import { recordEvent } from './audit';
import { candidatesWithVerdict, ofRun } from './candidates';
import { selectEdges, selectKeptApart, selectReachable, pairKey, type Pair } from './identity-edges';
import { enqueueJob } from './jobs';
import { runByNumber, runRevisions, type RunRow } from './run-lookup';
import { bigintArray } from './verdict-log';

/** Which candidates (`c`) a rule fits, whatever their verdict. */
function fitsRule(rule: PolicyRule): SQL {
  const conditions = [sql`c.sep_arcsec < ${rule.maxSepArcsec}::float8`];
  if (rule.mutualBest) conditions.push(sql`c.mutual_best`);
  if (rule.noRival) conditions.push(sql`c.rivals_a = 0 and c.rivals_b = 0`);
  return sql`(${sql.join(conditions, sql` and `)})`;
}

/** Which candidates (`c`, `f`) a rule decides: it fits, nobody has said anything, and nothing forbids it. */
export function decidedByRule(
  actor: GroupActor,
  run: RunRow,
  rule: PolicyRule,
  conflicting: readonly number[],
): SQL {
  return sql`${ofRun(actor, run)} and ${fitsRule(rule)} and f.verdict_id is null
    and c.seq <> all(${bigintArray(conflicting)})`;
}

/** What a rule would do with a run's candidates; changes nothing. */
export async function countPolicy(
  context: Context,
  actor: GroupActor,
  number: number,
  rule: PolicyRule,
): Promise<PolicyCount> {
  return inTransaction(
    context.database,
    actor,
    async (tx) => {
      const run = await requireDecidable(tx, actor, number);
      const conflicts = (await conflictingCandidates(tx, actor, run, rule)).length;
      const { rows } = await tx.execute<{ undecided: number; fitting: number; decided: number }>(sql`
        select count(*) filter (where f.verdict_id is null) as undecided,
          count(*) filter (where f.verdict_id is null and ${fitsRule(rule)}) as fitting,
          count(*) filter (where f.verdict_id is not null and ${fitsRule(rule)}) as decided
        from ${candidatesWithVerdict} where ${ofRun(actor, run)}`);
      const { undecided, fitting, decided } = found(rows[0], 'count');
      const automatic = fitting - conflicts;
      return { automatic, toReview: undecided - automatic, alreadyDecided: decided, conflicts };
    },
    'repeatable read',
  );
}

/**
 * Candidates that a rule fits but that would, taken in the order of separation behind the verdicts in force, put
 * a pair with a 'different' verdict into one object. They stay for people. Only what hangs together with such a
 * pair is looked at.
 */
export async function conflictingCandidates(
  tx: Tx,
  actor: GroupActor,
  run: RunRow,
  rule: PolicyRule,
): Promise<number[]> {
  const keptApart = await selectKeptApart(tx, actor);
  if (keptApart.length === 0) return [];
  const condition = sql`${ofRun(actor, run)} and ${fitsRule(rule)}`;
  const entries = await selectReachable(tx, actor, keptApart, { runId: run.id, condition });
  const { rows } = await tx.execute<{ seq: number; a: number; b: number }>(sql`
    select c.seq, c.entry_a as a, c.entry_b as b from ${candidatesWithVerdict}
    where ${condition} and f.verdict_id is null and c.entry_a = any(${bigintArray(entries)})
    order by c.seq`);
  const edges = await selectEdges(tx, actor, entries);
  const proposed = rows.map(({ a, b }): Pair => [a, b]);
  const { refused } = partitionEntries({ same: [...edges.same, ...proposed], different: edges.different });
  const refusedPairs = new Set(refused.map(({ edge }) => pairKey(edge)));
  return rows.filter(({ a, b }) => refusedPairs.has(pairKey([a, b]))).map(({ seq }) => seq);
}

/** Queues the application of a rule; its verdicts appear together when the job is done. */
export async function startPolicy(
  context: Context,
  actor: GroupActor,
  number: number,
  rule: PolicyRule,
): Promise<{ jobId: string }> {
  return inTransaction(context.database, actor, async (tx) => {
    const run = await requireDecidable(tx, actor, number);
    const [row] = await tx
      .insert(appliedPolicy)
      .values({ groupId: actor.groupId, runId: run.id, rule, createdBy: actor.personId })
      .returning({ id: appliedPolicy.id });
    const policyId = found(row, 'policy').id;
    await recordEvent(tx, actor, 'policy started', `cross-match ${number}`, { policyId, rule });
    return {
      jobId: await enqueuePolicy(tx, actor, run, `Policy on cross-match ${number}`, {
        act: 'apply',
        policyId,
      }),
    };
  });
}

/** Queues the taking back of all verdicts of a policy. */
export async function startTakingBack(
  context: Context,
  actor: GroupActor,
  number: number,
  policyId: number,
): Promise<{ jobId: string }> {
  return inTransaction(context.database, actor, async (tx) => {
    const run = await runByNumber(tx, actor, number);
    const [row] = await tx
      .select()
      .from(appliedPolicy)
      .where(
        and(eq(appliedPolicy.id, policyId), eq(appliedPolicy.runId, run.id), gt(appliedPolicy.verdicts, 0)),
      )
      .for('update');
    if (found(row, 'policy').takenBackAt !== null) {
      refuse('already-taken-back', 'The verdicts of this policy were taken back before.');
    }
    await recordEvent(tx, actor, 'policy withdrawn', `cross-match ${number}`, { policyId });
    const title = `Taking back a policy on cross-match ${number}`;
    return { jobId: await enqueuePolicy(tx, actor, run, title, { act: 'take back', policyId }) };
  });
}

function enqueuePolicy(
  tx: Tx,
  actor: GroupActor,
  run: RunRow,
  title: string,
  payload: { act: 'apply' | 'take back'; policyId: number },
): Promise<string> {
  return enqueueJob(tx, actor, { kind: 'policy', title, payload, link: `cross-match/${run.number}` });
}

/** A run whose candidates exist and whose entries have objects. */
async function requireDecidable(tx: Tx, actor: GroupActor, number: number): Promise<RunRow> {
  const run = await runByNumber(tx, actor, number);
  if (run.pairs.length === 0) refuse('not-ready', `Cross-match ${number} has no candidates yet.`);
  const waiting = (await runRevisions(tx, actor, run)).find(({ registered }) => !registered);
  if (waiting !== undefined)
    refuse('not-ready', `The objects of ${waiting.label} are still being registered.`);
  return run;
}

/** The policies that gave verdicts on a run, the newest first. */
export async function appliedPolicies(
  tx: Tx,
  actor: GroupActor,
  run: RunRow,
): Promise<RunDetail['policies']> {
  const rows = await tx
    .select({ policy: appliedPolicy, by: person.name })
    .from(appliedPolicy)
    .innerJoin(person, eq(person.id, appliedPolicy.createdBy))
    .where(
      and(
        eq(appliedPolicy.groupId, actor.groupId),
        eq(appliedPolicy.runId, run.id),
        gt(appliedPolicy.verdicts, 0),
      ),
    )
    .orderBy(desc(appliedPolicy.id));
  return rows.map(({ policy, by }) => ({
    id: policy.id,
    rule: policy.rule,
    verdicts: policy.verdicts,
    by,
    at: policy.createdAt.toISOString(),
    takenBackAt: policy.takenBackAt?.toISOString() ?? null,
  }));
}
