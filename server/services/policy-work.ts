import { and, eq, sql } from 'drizzle-orm';
import { z } from 'zod';
import { inTransaction, type Tx } from '../../db/client';
import { appliedPolicy } from '../../db/schema/run';
import type { Context } from '../context';
import { found } from '../errors';
import { recordEvent } from './audit';
import { candidatesWithVerdict } from './candidates';
import { applyIdentity } from './identity';
import type { JobRun } from './jobs';
import { conflictingCandidates, decidedByRule } from './policies';
import { lockRegistry } from './registry-lock';
import { runById, type RunRow } from './run-lookup';

const policyPayload = z.strictObject({ act: z.enum(['apply', 'take back']), policyId: z.number().int() });
type PolicyRow = typeof appliedPolicy.$inferSelect;

/**
 * Carries out a policy job: its verdicts, or their taking back, and one pass over the registry, all in one
 * transaction. A job that begins again after it had ended finds its work done.
 */
export async function workOnPolicy(context: Context, run: JobRun): Promise<void> {
  const { act, policyId } = policyPayload.parse(run.payload);
  const { done, message } = await inTransaction(context.database, run.actor, async (tx) => {
    await lockRegistry(tx, run.actor);
    const [row] = await tx
      .select()
      .from(appliedPolicy)
      .where(and(eq(appliedPolicy.id, policyId), eq(appliedPolicy.groupId, run.actor.groupId)))
      .for('update');
    const policy = found(row, 'policy');
    const matchRun = await runById(tx, run.actor, policy.runId);
    return act === 'apply'
      ? applyPolicy(tx, run, policy, matchRun)
      : withdrawPolicy(tx, run, policy, matchRun);
  });
  run.finish(done, message);
}

/** A policy that was not applied leaves no trace; one that was not taken back stays as it is. */
export async function unwindPolicy(
  _context: Context,
  tx: Tx,
  run: Pick<JobRun, 'actor' | 'payload'>,
): Promise<null> {
  const { act, policyId } = policyPayload.parse(run.payload);
  if (act === 'take back') return null;
  await tx
    .delete(appliedPolicy)
    .where(
      and(
        eq(appliedPolicy.id, policyId),
        eq(appliedPolicy.groupId, run.actor.groupId),
        eq(appliedPolicy.verdicts, 0),
      ),
    );
  return null;
}

interface Ending {
  done: number;
  message: string;
}

async function applyPolicy(tx: Tx, run: JobRun, policy: PolicyRow, matchRun: RunRow): Promise<Ending> {
  if (policy.verdicts > 0)
    return { done: policy.verdicts, message: `${policy.verdicts} automatic verdicts.` };
  const { actor } = run;
  await run.report(0, null, 'Looking for conflicts');
  const conflicting = await conflictingCandidates(tx, actor, matchRun, policy.rule);
  await run.report(0, null, 'Giving verdicts');
  // No pair here has a verdict in force, so what is inserted is in force; no pair needs to be looked at again.
  const inserted = await tx.execute(sql`
    with spoken as (
      insert into verdict (group_id, entry_a, entry_b, value, grade, person_id, run_id, policy_id)
      select c.group_id, least(c.entry_a, c.entry_b), greatest(c.entry_a, c.entry_b), 'same', ${policy.rule.grade},
        ${policy.createdBy}::int, ${matchRun.id}::int, ${policy.id}::int
      from ${candidatesWithVerdict} where ${decidedByRule(actor, matchRun, policy.rule, conflicting)}
      order by c.seq
      returning *)
    insert into verdict_in_force (group_id, entry_a, entry_b, verdict_id, value, grade, policy_id)
    select group_id, entry_a, entry_b, id, value, grade, policy_id from spoken`);
  const verdicts = inserted.rowCount ?? 0;
  await tx.update(appliedPolicy).set({ verdicts }).where(eq(appliedPolicy.id, policy.id));
  await run.report(verdicts, verdicts, 'Merging objects');
  const { changed } = await applyIdentity(tx, actor, 'group');
  await recordEvent(tx, actor, 'policy applied', `cross-match ${matchRun.number}`, {
    policyId: policy.id,
    rule: policy.rule,
    verdicts,
    objectsChanged: changed,
  });
  return {
    done: verdicts,
    message: `${verdicts} automatic verdicts; ${conflicting.length} left for people as conflicts.`,
  };
}

async function withdrawPolicy(tx: Tx, run: JobRun, policy: PolicyRow, matchRun: RunRow): Promise<Ending> {
  if (policy.takenBackAt !== null) return { done: policy.verdicts, message: 'The verdicts are taken back.' };
  const { actor } = run;
  await run.report(0, policy.verdicts, 'Taking verdicts back');
  const taken = await takePolicyBack(tx, run, policy);
  await tx
    .update(appliedPolicy)
    .set({ takenBackAt: sql`now()` })
    .where(eq(appliedPolicy.id, policy.id));
  await run.report(taken, policy.verdicts, 'Separating objects');
  const { changed } = await applyIdentity(tx, actor, 'group');
  await recordEvent(tx, actor, 'policy taken back', `cross-match ${matchRun.number}`, {
    policyId: policy.id,
    verdicts: taken,
    objectsChanged: changed,
  });
  return { done: taken, message: `${taken} automatic verdicts taken back.` };
}

/**
 * Takes back every verdict of a policy that nobody took back before. A policy speaks only where nothing is in
 * force, so below its verdicts there is nothing that could come into force again.
 */
async function takePolicyBack(tx: Tx, { actor }: JobRun, policy: PolicyRow): Promise<number> {
  const { rowCount } = await tx.execute(sql`
    insert into verdict (group_id, entry_a, entry_b, person_id, takes_back)
    select v.group_id, v.entry_a, v.entry_b, ${actor.personId}::int, v.id from verdict v
    where v.group_id = ${actor.groupId} and v.policy_id = ${policy.id}
      and not exists (select 1 from verdict t where t.takes_back = v.id)
    order by v.id`);
  await tx.execute(
    sql`delete from verdict_in_force where group_id = ${actor.groupId} and policy_id = ${policy.id}`,
  );
  return rowCount ?? 0;
}
