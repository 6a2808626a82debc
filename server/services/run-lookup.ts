import { and, eq, inArray } from 'drizzle-orm';
import type { Tx } from '../../db/client';
import { catalogue, catalogueRevision } from '../../db/schema/catalogue';
import { matchRun } from '../../db/schema/run';
import type { GroupActor } from '../context';
import { found } from '../errors';

export type RunRow = typeof matchRun.$inferSelect;

/** The run with this number in the group; refuses 'not-found'. */
export async function runByNumber(tx: Tx, actor: GroupActor, number: number): Promise<RunRow> {
  const [row] = await tx
    .select()
    .from(matchRun)
    .where(and(eq(matchRun.groupId, actor.groupId), eq(matchRun.number, number)));
  return found(row, `cross-match ${number}`);
}

export async function runById(tx: Tx, actor: GroupActor, id: number): Promise<RunRow> {
  const [row] = await tx
    .select()
    .from(matchRun)
    .where(and(eq(matchRun.groupId, actor.groupId), eq(matchRun.id, id)));
  return found(row, 'cross-match');
}

/** A revision as a run names it. */
export interface RunRevision {
  id: number;
  label: string;
  ordinal: number;
  revision: number;
  sources: number;
  epochYear: number | null;
  columns: { name: string }[];
  registered: boolean;
}

/** The revisions with these ids, by id. */
export async function revisionsById(
  tx: Tx,
  actor: GroupActor,
  ids: readonly number[],
): Promise<Map<number, RunRevision>> {
  if (ids.length === 0) return new Map();
  const rows = await tx
    .select({
      id: catalogueRevision.id,
      label: catalogue.label,
      ordinal: catalogue.ordinal,
      revision: catalogueRevision.number,
      sources: catalogueRevision.sources,
      epochYear: catalogueRevision.epochYear,
      columns: catalogueRevision.columns,
      registeredAt: catalogueRevision.registeredAt,
    })
    .from(catalogueRevision)
    .innerJoin(catalogue, eq(catalogue.id, catalogueRevision.catalogueId))
    .where(
      and(eq(catalogueRevision.groupId, actor.groupId), inArray(catalogueRevision.id, [...new Set(ids)])),
    );
  return new Map(
    rows.map(({ registeredAt, ...row }) => [row.id, { ...row, registered: registeredAt !== null }]),
  );
}

/** A run's revisions in the order of its plan. */
export async function runRevisions(tx: Tx, actor: GroupActor, run: RunRow): Promise<RunRevision[]> {
  const known = await revisionsById(tx, actor, run.revisionIds);
  return run.revisionIds.map((id) => found(known.get(id), 'revision'));
}
