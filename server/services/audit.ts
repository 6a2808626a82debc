import type { Tx } from '../../db/client';
import { auditEvent } from '../../db/schema/group';

/** Writes one line of the group's append-only audit trail, inside the transaction of the act itself. */
export async function recordEvent(
  tx: Tx,
  actor: { groupId: number; personId: number | null },
  action: string,
  subject: string,
  detail: Record<string, unknown>,
): Promise<void> {
  await tx
    .insert(auditEvent)
    .values({ groupId: actor.groupId, personId: actor.personId, action, subject, detail });
}
