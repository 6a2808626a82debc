import { sql } from 'drizzle-orm';
import type { z } from 'zod';
import { inTransaction, type Tx } from '../../db/client';
import { parsePosition } from '../../shared/astro/angles';
import { nameKey } from '../../shared/astro/designations';
import type { FindAnswer, findQuery } from '../../shared/schemas/find';
import type { Context, GroupActor } from '../context';
import { liveIdOf } from './live-object';
import { nearMisses } from './near-misses';
import { liveObjectsOf, OBJECT_COLUMNS, objectsInCone, summaries, type ObjectRow } from './objects';

type FindQuery = z.output<typeof findQuery>;

const NUMBER = /^#?\s*(\d{1,15})$/;

/** Reads what a person typed as an object number, a position or a name, and says which. Near misses are never taken. */
export async function find(context: Context, actor: GroupActor, query: FindQuery): Promise<FindAnswer> {
  return inTransaction(context.database, actor, async (tx) => {
    const number = NUMBER.exec(query.q)?.[1];
    if (number !== undefined) {
      const byNumber = await findNumber(tx, actor, query, Number(number));
      // A bare number may also be a catalogue's own key.
      if (byNumber.exact.length > 0 || query.q.startsWith('#')) return byNumber;
      return findName(tx, actor, query);
    }
    const position = parsePosition(query.q);
    if (position !== null) return findPosition(tx, actor, query, position);
    return findName(tx, actor, query);
  });
}

const nothing = (q: string, read: FindAnswer['read']): FindAnswer => ({
  q,
  read,
  position: null,
  exact: [],
  nearMisses: [],
  forwardedFrom: null,
});

async function findNumber(tx: Tx, actor: GroupActor, query: FindQuery, number: number): Promise<FindAnswer> {
  const { rows } = await tx.execute<ObjectRow>(sql`
    select ${OBJECT_COLUMNS} from object b join object o on o.id = ${liveIdOf('b')}
    where b.group_id = ${actor.groupId} and b.number = ${number}`);
  const [summary] = await summaries(tx, rows.map((row) => ({ ...row, sepArcsec: null })));
  const answer = nothing(query.q, 'number');
  if (summary === undefined) return answer;
  return {
    ...answer,
    exact: [{ ...summary, alias: null }],
    forwardedFrom: summary.number === number ? null : number,
  };
}

async function findPosition(
  tx: Tx,
  actor: GroupActor,
  query: FindQuery,
  position: { raDeg: number; decDeg: number },
): Promise<FindAnswer> {
  const centre = { ...position, radiusArcsec: query.radiusArcsec };
  const near = (await objectsInCone(tx, centre, liveObjectsOf(actor))).slice(0, query.limit);
  return {
    ...nothing(query.q, 'position'),
    position: centre,
    exact: (await summaries(tx, near)).map((summary) => ({ ...summary, alias: null })),
  };
}

async function findName(tx: Tx, actor: GroupActor, query: FindQuery): Promise<FindAnswer> {
  const answer = nothing(query.q, 'name');
  const key = nameKey(query.q);
  if (key === '') return answer;
  const { rows } = await tx.execute<ObjectRow & { alias: string }>(sql`
    select distinct on (o.number) ${OBJECT_COLUMNS}, a.name as alias
    from alias a join object b on b.id = a.object_id join object o on o.id = ${liveIdOf('b')}
    where a.group_id = ${actor.groupId} and a.key = ${key} and a.retired_at is null
    order by o.number limit ${query.limit}`);
  const described = await summaries(tx, rows.map((row) => ({ ...row, sepArcsec: null })));
  const exact = described.map((summary, i) => ({ ...summary, alias: rows[i]?.alias ?? null }));
  if (exact.length > 0) return { ...answer, exact };
  return { ...answer, nearMisses: await nearMisses(tx, actor, key, query.limit) };
}
