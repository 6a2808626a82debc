import { sql } from 'drizzle-orm';
import type { z } from 'zod';
import type { Tx } from '../../db/client';
import type {
  mergeObjects as mergeInput,
  registryChange,
  splitObject as splitInput,
} from '../../shared/schemas/object';
import type { Context, GroupActor } from '../context';
import { partitionEntries } from '../engine/partition';
import { refuse } from '../errors';
import { applyIdentity, liveNumbers } from './identity';
import { selectEdges, verdictIdsByPair, type Pair } from './identity-edges';
import { liveIdOf } from './live-object';
import { recordMoves } from './registry-events';
import { changeRegistry } from './registry-lock';
import { appendVerdicts, bigintArray, takeBack, type SpokenVerdict } from './verdict-log';

type RegistryChange = z.infer<typeof registryChange>;

/**
 * Merges objects by hand: 'same' verdicts between the object with the lowest number and each of the others,
 * on the entries they were born with. Where a 'different' verdict forbids it, the result counts a conflict.
 */
export async function mergeObjects(
  context: Context,
  actor: GroupActor,
  input: z.infer<typeof mergeInput>,
): Promise<RegistryChange> {
  return changeRegistry(context, actor, async (tx) => {
    const [first, ...others] = await selectLive(tx, actor, input.numbers);
    if (first === undefined || others.length === 0) {
      refuse('nothing-to-decide', 'These numbers are one object already.');
    }
    await appendVerdicts(
      tx,
      actor,
      others.map((other) => byHand([first, other], 'same', input.remark)),
    );
    return settle(tx, actor, [first, ...others], { act: 'merged by hand', remark: input.remark });
  });
}

/**
 * Splits entries off an object by hand: the 'same' verdicts in force between the two parts are taken back and
 * 'different' ones given on exactly those pairs; each part is held together by further 'same' verdicts where
 * only the other part had joined its entries.
 */
export async function splitObject(
  context: Context,
  actor: GroupActor,
  input: z.infer<typeof splitInput>,
): Promise<RegistryChange> {
  return changeRegistry(context, actor, async (tx) => {
    const members = await selectMembers(tx, actor, input.number);
    const taken = new Set(input.entryIds);
    const known = new Set(members);
    if ([...taken].some((entry) => !known.has(entry))) {
      refuse('nothing-to-decide', `Not all of these sources belong to object ${input.number}.`);
    }
    if (taken.size === members.length) {
      refuse('nothing-to-decide', 'All sources of the object are chosen; one at least has to stay.');
    }
    const edges = await selectEdges(tx, actor, members);
    const crosses = ([a, b]: Pair) => taken.has(a) !== taken.has(b);
    const crossing = edges.same.filter(crosses);
    const within = edges.same.filter((pair) => !crosses(pair));
    await takeBack(tx, actor, crossing.map(verdictIdsByPair(edges)));
    const spoken = [
      ...crossing.map((pair) => byHand(pair, 'different', input.remark)),
      ...missingLinks(
        members.filter((entry) => taken.has(entry)),
        within,
      ).map((pair) => byHand(pair, 'same', input.remark)),
      ...missingLinks(
        members.filter((entry) => !taken.has(entry)),
        within,
      ).map((pair) => byHand(pair, 'same', input.remark)),
    ];
    await appendVerdicts(tx, actor, spoken);
    return settle(tx, actor, members, { act: 'split by hand', remark: input.remark });
  });
}

function byHand([entryA, entryB]: Pair, value: 'same' | 'different', remark: string): SpokenVerdict {
  return { entryA, entryB, value, grade: 'certain', flags: [], remark, runId: null };
}

/** The fewest pairs that join a part into one piece, given the pairs that are joined already. */
function missingLinks(part: readonly number[], joined: readonly Pair[]): Pair[] {
  const inPart = new Set(part);
  const same = joined.filter(([a]) => inPart.has(a));
  const placed = new Set<number>();
  const heads: number[] = [];
  for (const piece of partitionEntries({ same, different: [] }).components) {
    for (const entry of piece) placed.add(entry);
    heads.push(Math.min(...piece));
  }
  heads.push(...part.filter((entry) => !placed.has(entry)));
  const [first, ...others] = heads.sort((x, y) => x - y);
  return first === undefined ? [] : others.map((other) => [first, other]);
}

/** Ids of the live objects that numbers lead to (a forwarding one to its live object), the lowest number first. */
async function selectLive(tx: Tx, actor: GroupActor, numbers: readonly number[]): Promise<number[]> {
  const wanted = new Set(numbers);
  const { rows } = await tx.execute<{ given: number; id: number; number: number }>(sql`
    select o.number as given, live.id, live.number
    from object o join object live on live.id = ${liveIdOf('o')}
    where o.group_id = ${actor.groupId} and o.number = any(${bigintArray(wanted)})
    order by live.number`);
  const missing = [...wanted].find((number) => !rows.some((row) => row.given === number));
  if (missing !== undefined) refuse('not-found', `There is no object ${missing} here.`);
  return [...new Set(rows.map((row) => row.id))];
}

/** Entries of a live object, ascending. */
async function selectMembers(tx: Tx, actor: GroupActor, number: number): Promise<number[]> {
  const { rows } = await tx.execute<{ id: number; merged: boolean }>(sql`
    select m.id, o.merged_into is not null as merged
    from object o join object m on m.id = o.id or m.merged_into = o.id
    where o.group_id = ${actor.groupId} and o.number = ${number} order by m.id`);
  if (rows.length === 0) refuse('not-found', `There is no object ${number} here.`);
  if (rows.some((row) => row.merged)) {
    refuse('nothing-to-decide', `Object ${number} is part of another object; split that one.`);
  }
  return rows.map((row) => row.id);
}

async function settle(
  tx: Tx,
  actor: GroupActor,
  entries: readonly number[],
  cause: Record<string, unknown>,
): Promise<RegistryChange> {
  const outcome = await applyIdentity(tx, actor, { entries });
  await recordMoves(tx, actor, outcome.moves, cause);
  const numbers = (await liveNumbers(tx, actor, entries)).filter((number) => number !== null);
  return { numbers: [...new Set(numbers)].sort((x, y) => x - y), conflicts: outcome.refused.length };
}
