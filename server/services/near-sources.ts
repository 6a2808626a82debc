import { sql } from 'drizzle-orm';
import type { Tx } from '../../db/client';
import type { Context, GroupActor } from '../context';
import { liveIdOf } from './live-object';
import { nearestRows, rowsInCone, type NearRow } from './revision-index';

/** A source near a place, with what charts and lists show of it. */
export interface NearSource {
  revisionId: number;
  catalogue: string;
  ordinal: number;
  epochYear: number | null;
  entryId: number;
  rowNo: number;
  designation: string;
  raDeg: number;
  decDeg: number;
  errMajArcsec: number | null;
  errMinArcsec: number | null;
  errPaDeg: number | null;
  pmRaMasYr: number | null;
  pmDecMasYr: number | null;
  /** Number of the live object it belongs to; null until its catalogue is registered. */
  objectNumber: number | null;
  sepArcsec: number;
}

/** The newest ready revision of every catalogue of the group. */
export async function currentRevisionIds(tx: Tx, actor: GroupActor): Promise<number[]> {
  const { rows } = await tx.execute<{ id: number }>(sql`
    select distinct on (catalogue_id) id from catalogue_revision
    where group_id = ${actor.groupId} and state = 'ready' order by catalogue_id, number desc`);
  return rows.map((row) => row.id).sort((a, b) => a - b);
}

/** Sources of the revisions within a radius of a position, the nearest first, at most `limit`. */
export async function coneSources(
  context: Context,
  tx: Tx,
  actor: GroupActor,
  revisionIds: readonly number[],
  centre: { raDeg: number; decDeg: number; radiusArcsec: number },
  limit: number,
): Promise<NearSource[]> {
  return describeRows(tx, actor, await rowsInCone(context, actor, revisionIds, centre, limit));
}

/** The k nearest sources of the revisions within `maxArcsec`, across all of them. */
export async function nearestSources(
  context: Context,
  tx: Tx,
  actor: GroupActor,
  revisionIds: readonly number[],
  place: { raDeg: number; decDeg: number; maxArcsec: number },
  k: number,
): Promise<NearSource[]> {
  return describeRows(tx, actor, await nearestRows(context, actor, revisionIds, place, k));
}

async function describeRows(tx: Tx, actor: GroupActor, near: readonly NearRow[]): Promise<NearSource[]> {
  if (near.length === 0) return [];
  const revisionIds = near.map((row) => row.revisionId);
  const distinctRevisions = [...new Set(revisionIds)];
  const { rows } = await tx.execute<Omit<NearSource, 'sepArcsec'> & { [key: string]: unknown }>(sql`
    with wanted as (
      select * from unnest(${sql.param(revisionIds)}::int[], ${sql.param(near.map((row) => row.rowNo))}::int[])
        as w (revision_id, row_no))
    select s.revision_id as "revisionId", c.label as catalogue, c.ordinal, r.epoch_year as "epochYear",
      s.entry_id as "entryId", s.row_no as "rowNo", s.designation, s.ra_deg as "raDeg", s.dec_deg as "decDeg",
      s.err_maj_arcsec as "errMajArcsec", s.err_min_arcsec as "errMinArcsec", s.err_pa_deg as "errPaDeg",
      s.pm_ra_mas_yr as "pmRaMasYr", s.pm_dec_mas_yr as "pmDecMasYr", live.number as "objectNumber"
    from wanted w
    join source s on s.revision_id = w.revision_id and s.row_no = w.row_no
      and s.revision_id = any(${sql.param(distinctRevisions)}::int[])
    join catalogue_revision r on r.id = s.revision_id
    join catalogue c on c.id = r.catalogue_id
    left join object o on o.id = s.entry_id
    left join object live on live.id = ${liveIdOf('o')}
    where s.group_id = ${actor.groupId}`);
  const sepOf = new Map(near.map((row) => [`${row.revisionId}/${row.rowNo}`, row.sepArcsec]));
  return rows
    .map((row) => ({ ...row, sepArcsec: sepOf.get(`${row.revisionId}/${row.rowNo}`) ?? Number.NaN }))
    .sort((a, b) => a.sepArcsec - b.sepArcsec || a.entryId - b.entryId);
}
