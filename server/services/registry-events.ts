import type { Tx } from '../../db/client';
import { auditEvent } from '../../db/schema/group';
import type { GroupActor } from '../context';
import type { Move } from './identity-write';

/**
 * Writes one audit line for every object that an act of a person moved or that took in or gave back others;
 * `cause` says which act it was (a verdict's id, a remark).
 */
export async function recordMoves(
  tx: Tx,
  actor: GroupActor,
  moves: readonly Move[],
  cause: Record<string, unknown>,
): Promise<void> {
  const events = [...moves.map(ownEvent), ...hostEvents(moves)];
  if (events.length === 0) return;
  await tx.insert(auditEvent).values(
    events.map(({ action, number, objects }) => ({
      groupId: actor.groupId,
      personId: actor.personId,
      action,
      subject: `object ${number}`,
      detail: { ...cause, objects },
    })),
  );
}

interface ObjectEvent {
  action: string;
  number: number;
  objects: number[];
}

function ownEvent({ number, wasPartOf, isPartOf }: Move): ObjectEvent {
  return isPartOf === number
    ? { action: 'separated from object', number, objects: [wasPartOf] }
    : { action: 'merged into object', number, objects: [isPartOf] };
}

function hostEvents(moves: readonly Move[]): ObjectEvent[] {
  const joined = new Map<number, number[]>();
  const left = new Map<number, number[]>();
  for (const { number, wasPartOf, isPartOf } of moves) {
    if (isPartOf !== number) joined.set(isPartOf, [...(joined.get(isPartOf) ?? []), number]);
    if (wasPartOf !== number) left.set(wasPartOf, [...(left.get(wasPartOf) ?? []), number]);
  }
  return [
    ...[...joined].map(([number, objects]) => ({ action: 'took in objects', number, objects })),
    ...[...left].map(([number, objects]) => ({ action: 'gave back objects', number, objects })),
  ];
}
