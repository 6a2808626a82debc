import { sql } from 'drizzle-orm';
import { inTransaction, type Tx } from '../../db/client';
import { separationArcsec } from '../../shared/astro/sphere';
import type { ColumnMapping } from '../../shared/schemas/mapping';
import type { ObjectAnswer, ObjectDetail, ObjectField, ObjectMember } from '../../shared/schemas/object';
import type { VerdictInForce } from '../../shared/schemas/run';
import type { Context, GroupActor } from '../context';
import { found, refuse } from '../errors';
import { aliasesOf } from './aliases';
import { recordEvent } from './audit';
import { liveIdOf } from './live-object';
import { coneSources, currentRevisionIds, nearestSources } from './near-sources';
import { notesOf } from './notes';
import { historyOf } from './object-history';
import { bigintArray } from './verdict-log';

const MAX_FIELD_SOURCES = 400;
const NEAREST_COUNT = 8;
const NEAREST_LIMIT_ARCSEC = 3600;

interface LiveObject {
  id: number;
  number: number;
  version: number;
  name: string;
  raDeg: number;
  decDeg: number;
  errArcsec: number | null;
  [key: string]: unknown;
}

/** The live object behind a number, and the number it stands under now; refuses 'not-found'. */
export async function liveObject(tx: Tx, actor: GroupActor, number: number): Promise<LiveObject> {
  const { rows } = await tx.execute<LiveObject>(sql`
    select l.id, l.number, l.version, l.name, l.ra_deg as "raDeg", l.dec_deg as "decDeg", l.err_arcsec as "errArcsec"
    from object o join object l on l.id = ${liveIdOf('o')}
    where o.group_id = ${actor.groupId} and o.number = ${number}`);
  return found(rows[0], `object ${number}`);
}

interface BornObject {
  id: number;
  number: number;
  name: string;
  [key: string]: unknown;
}

/** The objects that were born with the entries of a live object, itself among them. */
async function bornObjects(tx: Tx, liveId: number): Promise<BornObject[]> {
  const { rows } = await tx.execute<BornObject>(sql`
    select id, number, name from object where id = ${liveId} or merged_into = ${liveId} order by number`);
  return rows;
}

/** Everything the object page shows; a forwarding number answers where it went. */
export async function getObject(context: Context, actor: GroupActor, number: number): Promise<ObjectAnswer> {
  return inTransaction(context.database, actor, async (tx) => {
    const live = await liveObject(tx, actor, number);
    if (live.number !== number) return { state: 'forwarded', number, forwardsTo: live.number };
    return { state: 'live', object: await describe(tx, actor, live) };
  });
}

async function describe(tx: Tx, actor: GroupActor, live: LiveObject): Promise<ObjectDetail> {
  const born = await bornObjects(tx, live.id);
  const ids = born.map((one) => one.id);
  const members = await membersOf(tx, actor, live, ids);
  return {
    number: live.number,
    version: live.version,
    name: live.name,
    raDeg: live.raDeg,
    decDeg: live.decDeg,
    errArcsec: live.errArcsec,
    members,
    aliases: await aliasesOf(tx, actor, live.id, ids, members),
    notes: await notesOf(tx, ids),
    formerNumbers: born.filter((one) => one.id !== live.id).map((one) => one.number),
    verdicts: await verdictsAmong(tx, ids),
    conflicts: await countConflicts(tx, ids),
    history: await historyOf(tx, actor, born),
  };
}

interface MemberRow extends Omit<ObjectMember, 'sepArcsec' | 'measurements' | 'columns' | 'objectNumber'> {
  mapping: ColumnMapping;
  columnNames: { name: string }[];
  cells: string;
  [key: string]: unknown;
}

async function membersOf(
  tx: Tx,
  actor: GroupActor,
  live: LiveObject,
  entryIds: readonly number[],
): Promise<ObjectMember[]> {
  const revisionIds = await currentRevisionIds(tx, actor);
  const { rows } = await tx.execute<MemberRow>(sql`
    select c.label as catalogue, c.ordinal, r.number as revision, r.epoch_year as "epochYear", r.mapping,
      r.columns as "columnNames", s.entry_id as "entryId", s.row_no as "rowNo", s.designation, s.ra_deg as "raDeg",
      s.dec_deg as "decDeg", s.err_maj_arcsec as "errMajArcsec", s.err_min_arcsec as "errMinArcsec",
      s.err_pa_deg as "errPaDeg", s.pm_ra_mas_yr as "pmRaMasYr", s.pm_dec_mas_yr as "pmDecMasYr", s.cells
    from source s
    join catalogue_revision r on r.id = s.revision_id
    join catalogue c on c.id = r.catalogue_id
    where s.entry_id = any(${bigintArray(entryIds)}) and s.revision_id = any(${sql.param(revisionIds)}::int[])
    order by c.ordinal, s.row_no`);
  return rows.map(({ mapping, columnNames, cells, ...row }) => {
    const written = cells.split('\u001f');
    return {
      ...row,
      objectNumber: live.number,
      sepArcsec: separationArcsec(live.raDeg, live.decDeg, row.raDeg, row.decDeg),
      measurements: measurementsOf(mapping, written),
      columns: columnNames.map(({ name }, i) => ({ name: name === '' ? `column ${i + 1}` : name, cell: written[i] ?? '' })),
    };
  });
}

/** Magnitudes, fluxes and redshift of a row as written, by the mapping of its revision. */
function measurementsOf(mapping: ColumnMapping, cells: readonly string[]): ObjectMember['measurements'] {
  const cell = (index: number | null) => (index === null ? '' : (cells[index] ?? '').trim());
  const list = mapping.photometry.map((band) => ({
    quantity: `${band.kind} ${band.band}`,
    value: cell(band.column),
    error: cell(band.errorColumn) || null,
    unit: band.unit,
  }));
  const { redshift } = mapping;
  if (redshift !== null) {
    list.push({
      quantity: redshift.kind === 'redshift' ? 'redshift' : 'velocity',
      value: cell(redshift.column),
      error: cell(redshift.errorColumn) || null,
      unit: redshift.kind === 'redshift' ? '' : 'km/s',
    });
  }
  return list.filter((one) => one.value !== '');
}

interface VerdictRow extends Omit<VerdictInForce, 'at' | 'by' | 'origin'> {
  entryA: number;
  entryB: number;
  designationA: string;
  designationB: string;
  at: Date;
  by: string;
  policyId: number | null;
  [key: string]: unknown;
}

async function verdictsAmong(tx: Tx, ids: readonly number[]): Promise<ObjectDetail['verdicts']> {
  const { rows } = await tx.execute<VerdictRow>(sql`
    select v.id, f.value, f.grade, v.flags, v.remark, v.at, p.name as by, v.policy_id as "policyId",
      f.entry_a as "entryA", f.entry_b as "entryB", a.name as "designationA", b.name as "designationB"
    from verdict_in_force f
    join verdict v on v.id = f.verdict_id
    join person p on p.id = v.person_id
    join object a on a.id = f.entry_a
    join object b on b.id = f.entry_b
    where f.entry_a = any(${bigintArray(ids)}) and f.entry_b = any(${bigintArray(ids)})
    order by v.id`);
  return rows.map(({ policyId, at, ...row }) => ({
    ...row,
    at: new Date(at).toISOString(),
    origin: policyId === null ? ('person' as const) : ('policy' as const),
  }));
}

/** 'Same' verdicts in force that lead out of the object: they could not be carried out. */
async function countConflicts(tx: Tx, ids: readonly number[]): Promise<number> {
  const list = bigintArray(ids);
  const { rows } = await tx.execute<{ n: number }>(sql`
    select count(*) as n from verdict_in_force f
    where f.value = 'same' and (f.entry_a = any(${list})) <> (f.entry_b = any(${list}))
      and (f.entry_a = any(${list}) or f.entry_b = any(${list}))`);
  return Number(rows[0]?.n ?? 0);
}

/** Sources around an object for its finding chart, and the nearest that are not its own. */
export async function objectField(
  context: Context,
  actor: GroupActor,
  number: number,
  radiusArcsec: number,
): Promise<ObjectField> {
  return inTransaction(context.database, actor, async (tx) => {
    const live = await liveObject(tx, actor, number);
    const own = new Set((await bornObjects(tx, live.id)).map((one) => one.id));
    const revisionIds = await currentRevisionIds(tx, actor);
    const centre = { raDeg: live.raDeg, decDeg: live.decDeg };
    const around = await coneSources(context, tx, actor, revisionIds, { ...centre, radiusArcsec }, MAX_FIELD_SOURCES);
    const near = await nearestSources(
      context,
      tx,
      actor,
      revisionIds,
      { ...centre, maxArcsec: NEAREST_LIMIT_ARCSEC },
      NEAREST_COUNT + own.size,
    );
    return {
      radiusArcsec,
      sources: around.map(({ revisionId: _revisionId, ...source }) => ({ ...source, member: own.has(source.entryId) })),
      nearest: near
        .filter((source) => !own.has(source.entryId))
        .slice(0, NEAREST_COUNT)
        .map(({ revisionId: _revisionId, epochYear: _epoch, pmRaMasYr: _ra, pmDecMasYr: _dec, ...source }) => source),
    };
  });
}

/** Gives an object a preferred name, for the version a person has seen. */
export async function renameObject(
  context: Context,
  actor: GroupActor,
  number: number,
  version: number,
  name: string,
): Promise<void> {
  await inTransaction(context.database, actor, async (tx) => {
    const live = await liveObject(tx, actor, number);
    const changed = await tx.execute(sql`
      update object set name = ${name}, name_chosen = true, version = version + 1
      where id = ${live.id} and version = ${version} and merged_into is null`);
    if (changed.rowCount === 0) refuse('stale-version', `Object ${live.number} is at version ${live.version} by now.`);
    await recordEvent(tx, actor, 'preferred name chosen', `object ${live.number}`, { name, before: live.name });
  });
}
