import { and, eq, inArray, isNotNull, sql } from 'drizzle-orm';
import type { Tx } from '../../db/client';
import { object } from '../../db/schema/object';
import { verdict } from '../../db/schema/verdict';
import type { NewVerdict, VerdictResult } from '../../shared/schemas/verdict';
import { roleAtLeast } from '../../shared/words';
import type { Context, GroupActor } from '../context';
import { found, refuse } from '../errors';
import { applyIdentity, liveNumbers, type IdentityOutcome } from './identity';
import { pairKey, type Pair } from './identity-edges';
import { recordMoves } from './registry-events';
import { changeRegistry } from './registry-lock';
import { runByNumber } from './run-lookup';
import { appendVerdicts, takeBack, verdictOnPair } from './verdict-log';

/** Gives a verdict on a pair of entries; the latest on a pair counts, earlier ones stay in the log. */
export async function giveVerdict(
  context: Context,
  actor: GroupActor,
  input: NewVerdict,
): Promise<VerdictResult> {
  return changeRegistry(context, actor, async (tx) => {
    const pair: Pair = [input.entryA, input.entryB];
    await requireObjects(tx, actor, pair);
    const { run, ...spoken } = input;
    const runId = run === null ? null : (await runByNumber(tx, actor, run)).id;
    const [id] = await appendVerdicts(tx, actor, [{ ...spoken, runId }]);
    return settle(tx, actor, pair, { verdict: found(id, 'verdict'), value: input.value });
  });
}

/** Takes a verdict back by a later row of the log: a person their own, a curator any. */
export async function takeBackVerdict(
  context: Context,
  actor: GroupActor,
  id: number,
): Promise<VerdictResult> {
  return changeRegistry(context, actor, async (tx) => {
    const [row] = await tx
      .select({
        entryA: verdict.entryA,
        entryB: verdict.entryB,
        personId: verdict.personId,
        takenBack: sql<boolean>`exists (select 1 from verdict t where t.takes_back = verdict.id)`,
      })
      .from(verdict)
      .where(and(eq(verdict.id, id), eq(verdict.groupId, actor.groupId), isNotNull(verdict.value)));
    const seen = found(row, 'verdict');
    if (seen.personId !== actor.personId && !roleAtLeast(actor.role, 'curator')) {
      refuse('role-too-low', 'This verdict was given by somebody else.', {
        hint: 'Give your own verdict on the pair, or ask a curator to take this one back.',
      });
    }
    if (seen.takenBack) refuse('already-taken-back', 'This verdict was taken back before.');
    await takeBack(tx, actor, [id]);
    return settle(tx, actor, [seen.entryA, seen.entryB], { takenBack: id });
  });
}

/** Both entries must be of this group and have their objects. */
async function requireObjects(tx: Tx, actor: GroupActor, pair: Pair): Promise<void> {
  const rows = await tx
    .select({ id: object.id })
    .from(object)
    .where(and(eq(object.groupId, actor.groupId), inArray(object.id, pair)));
  if (rows.length === pair.length) return;
  const { rows: entries } = await tx.execute(
    sql`select 1 from entry where group_id = ${actor.groupId} and id in (${pair[0]}, ${pair[1]})`,
  );
  if (entries.length < pair.length) refuse('not-found', 'There is no such pair of sources here.');
  refuse('not-ready', 'The objects of this catalogue are still being registered.');
}

/** Brings identity up to date around a pair and says what became of it. */
async function settle(
  tx: Tx,
  actor: GroupActor,
  pair: Pair,
  cause: Record<string, unknown>,
): Promise<VerdictResult> {
  const outcome = await applyIdentity(tx, actor, { entries: pair });
  await recordMoves(tx, actor, outcome.moves, cause);
  const [objectA, objectB] = await liveNumbers(tx, actor, pair);
  return {
    verdict: await verdictOnPair(tx, actor, ...pair),
    objectA: found(objectA, 'object'),
    objectB: found(objectB, 'object'),
    conflict: isInConflict(outcome, pair),
  };
}

/** True when the pair's 'same' verdict is not carried out, or its 'different' verdict is what forbids another. */
function isInConflict(outcome: IdentityOutcome, pair: Pair): boolean {
  const key = pairKey(pair);
  return outcome.refused.some(({ edge, forbidden }) => pairKey(edge) === key || pairKey(forbidden) === key);
}
