import { sql } from 'drizzle-orm';
import type { Tx } from '../../db/client';
import type { ObjectSummary } from '../../shared/schemas/object';
import { bigintArray } from './verdict-log';

export interface ObjectRow {
  id: number;
  number: number;
  name: string;
  raDeg: number;
  decDeg: number;
  errArcsec: number | null;
  entries: number;
  [key: string]: unknown;
}

/** Columns of a live object `o`, as an ObjectRow. */
export const OBJECT_COLUMNS = sql`o.id, o.number, o.name, o.ra_deg as "raDeg", o.dec_deg as "decDeg",
  o.err_arcsec as "errArcsec", o.entries`;

/** Adds to each object the labels of the catalogues it stands in. */
export async function summaries(
  tx: Tx,
  rows: readonly (ObjectRow & { sepArcsec: number | null })[],
): Promise<ObjectSummary[]> {
  const labels = await labelsOf(
    tx,
    rows.map((row) => row.id),
  );
  return rows.map((row) => ({
    number: row.number,
    name: row.name,
    raDeg: row.raDeg,
    decDeg: row.decDeg,
    errArcsec: row.errArcsec,
    entries: row.entries,
    catalogues: labels.get(row.id) ?? [],
    sepArcsec: row.sepArcsec,
  }));
}

/** The entries of live objects: entry id -> id of its live object. */
export async function bornInto(tx: Tx, liveIds: readonly number[]): Promise<Map<number, number>> {
  const list = bigintArray(liveIds);
  const { rows } = await tx.execute<{ id: number; live: number }>(sql`
    select id, id as live from object where id = any(${list})
    union all select id, merged_into from object where merged_into = any(${list})`);
  return new Map(rows.map((row) => [row.id, row.live]));
}

/** Labels of the catalogues that live objects stand in, in order of arrival. */
async function labelsOf(tx: Tx, ids: readonly number[]): Promise<Map<number, string[]>> {
  if (ids.length === 0) return new Map();
  const born = await bornInto(tx, ids);
  const { rows } = await tx.execute<{ id: number; label: string }>(sql`
    select e.id, c.label from entry e join catalogue c on c.id = e.catalogue_id
    where e.id = any(${bigintArray(born.keys())}) order by c.ordinal`);
  const labels = new Map<number, string[]>();
  for (const { id, label } of rows) {
    const live = born.get(id) ?? id;
    const known = labels.get(live);
    if (known === undefined) labels.set(live, [label]);
    else if (!known.includes(label)) known.push(label);
  }
  return labels;
}
