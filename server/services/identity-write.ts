import { sql } from 'drizzle-orm';
import type { Tx } from '../../db/client';
import type { GroupActor } from '../context';
import { bigintArray } from './verdict-log';

/** An object that began or ended to forward; numbers of the live objects before and after (its own when live). */
export interface Move {
  number: number;
  wasPartOf: number;
  isPartOf: number;
}

/** What a pass over the registry did. */
export interface Written {
  /** Objects whose row changed in any way. */
  changed: number;
  /** Objects that moved, by number; at most `MAX_MOVES` of them. */
  moves: Move[];
}

const MAX_MOVES = 500;
const MANY_ENTRIES = 2000;

/**
 * Writes the given components to the registry, set-based: the live object of a component is the one with the
 * lowest number and the others forward to it; position, error and entries are those of the component, the name
 * is the designation of the object's own entry unless a person chose one. Rows that do not change are not written.
 *
 * Position: mean of the members' unit vectors with weights 1/sigma², sigma² = major * minor axis; members that
 * state no error count only where none does, and rows of older revisions only where no member is in a current
 * one. Error: 1/sqrt(sum of weights), one sigma per axis (inverse-variance mean, methods handbook section 10,
 * with circular errors).
 */
export async function writeComponents(
  tx: Tx,
  actor: GroupActor,
  components: readonly (readonly number[])[],
): Promise<Written> {
  const ids = components.flat();
  if (ids.length === 0) return { changed: 0, moves: [] };
  const componentOf = components.flatMap((members, i) => members.map(() => i));
  const { ready, current } = await selectRevisions(tx, actor);
  await fillParts(tx, ids, componentOf);
  const { rows } = await tx.execute<{ changed: number; moves: Move[] | null }>(sql`
    with born as materialized (
      select p.component, o.id, o.number, o.merged_into, o.name, o.ra_deg, o.dec_deg, o.err_arcsec,
        first_value(o.id) over by_number as root_id, first_value(o.number) over by_number as root_number,
        count(*) over (partition by p.component) as members
      from identity_part p join object o on o.id = p.id and o.group_id = ${actor.groupId}
      window by_number as (partition by p.component order by o.number)),
    latest as materialized (
      select distinct on (s.entry_id) p.component, s.entry_id, s.designation, s.ra_deg, s.dec_deg,
        sqrt(nullif(s.err_maj_arcsec::float8 * coalesce(s.err_min_arcsec, s.err_maj_arcsec)::float8, 0)) as sigma,
        s.revision_id = any(${bigintArray(current)}) as is_current
      from identity_part p join source s on s.entry_id = p.id and s.group_id = ${actor.groupId}
        and s.revision_id = any(${bigintArray(ready)}::int[])
      order by s.entry_id, s.revision_id desc),
    ranked as (
      select l.*, standing, max(standing) over (partition by component) as best
      from latest l cross join lateral (select is_current::int * 2 + (sigma is not null)::int) as s (standing)),
    weighed as (
      select component, entry_id, ra_deg, dec_deg, sigma, coalesce(1 / (sigma * sigma), 1) as weight
      from ranked where standing = best),
    mean as (
      select distinct on (component) component, ra_deg, dec_deg, sigma, count(*) over ordered as used,
        sum(weight * cosd(dec_deg) * cosd(ra_deg)) over ordered as x,
        sum(weight * cosd(dec_deg) * sind(ra_deg)) over ordered as y,
        sum(weight * sind(dec_deg)) over ordered as z,
        sum(weight) over ordered as total
      from weighed
      -- A fixed order of summation: the same members always give the same last digits.
      window ordered as (partition by component order by entry_id rows between unbounded preceding and unbounded following)
      order by component, entry_id),
    place as (
      select component,
        case when used = 1 then ra_deg when atan2d(y, x) >= 0 then atan2d(y, x)
          when atan2d(y, x) + 360 < 360 then atan2d(y, x) + 360 else 0 end as ra_deg,
        case when used = 1 then dec_deg else atan2d(z, sqrt(x * x + y * y)) end as dec_deg,
        case when sigma is null or used = 1 then sigma else 1 / sqrt(total) end as err_arcsec
      from mean),
    next as (
      select b.id, coalesce(was.number, b.number) as was_number, b.root_number as is_number,
        nullif(b.root_id, b.id) as merged_into,
        case when b.id = b.root_id then b.members else 0 end as entries,
        coalesce(l.designation, b.name) as designation,
        case when b.id = b.root_id and pl.component is not null then pl.ra_deg else b.ra_deg end as ra_deg,
        case when b.id = b.root_id and pl.component is not null then pl.dec_deg else b.dec_deg end as dec_deg,
        case when b.id = b.root_id and pl.component is not null then pl.err_arcsec else b.err_arcsec end as err_arcsec
      from born b
      left join latest l on l.entry_id = b.id
      left join place pl on pl.component = b.component
      left join object was on was.id = b.merged_into),
    written as (
      -- The name is decided on the row as it is when its turn comes: somebody may be renaming it just now.
      update object o set merged_into = n.merged_into, entries = n.entries, ra_deg = n.ra_deg, dec_deg = n.dec_deg,
        err_arcsec = n.err_arcsec, name = case when o.name_chosen then o.name else n.designation end,
        version = o.version + 1
      from next n
      where o.id = n.id and (o.merged_into, o.entries, o.ra_deg, o.dec_deg, o.err_arcsec, o.name) is distinct from
        (n.merged_into, n.entries, n.ra_deg, n.dec_deg, n.err_arcsec,
          case when o.name_chosen then o.name else n.designation end)
      returning o.number, n.was_number, n.is_number),
    moved as (
      select json_build_object('number', number, 'wasPartOf', was_number, 'isPartOf', is_number) as move
      from written where was_number <> is_number order by number limit ${MAX_MOVES})
    select (select count(*) from written) as changed, (select json_agg(move) from moved) as moves`);
  await tx.execute(sql`set local enable_nestloop = on`);
  return { changed: rows[0]?.changed ?? 0, moves: rows[0]?.moves ?? [] };
}

/**
 * Lays the components out as a temporary table with statistics. The joins above are between intermediate results whose
 * size the planner cannot know; for many entries nested loops, good for a few, would take the square of the time.
 */
async function fillParts(tx: Tx, ids: readonly number[], componentOf: readonly number[]): Promise<void> {
  await tx.execute(
    sql`create temp table if not exists identity_part (id bigint primary key, component bigint not null) on commit drop`,
  );
  await tx.execute(sql`truncate identity_part`);
  await tx.execute(
    sql`insert into identity_part select * from unnest(${bigintArray(ids)}, ${bigintArray(componentOf)})`,
  );
  await tx.execute(sql`analyze identity_part`);
  if (ids.length > MANY_ENTRIES) await tx.execute(sql`set local enable_nestloop = off`);
}

/** Ids of the group's ready revisions, and of those that are the newest of their catalogue. */
async function selectRevisions(tx: Tx, actor: GroupActor): Promise<{ ready: number[]; current: number[] }> {
  const { rows } = await tx.execute<{ id: number; newest: boolean }>(sql`
    select id, number = max(number) over (partition by catalogue_id) as newest from catalogue_revision
    where group_id = ${actor.groupId} and state = 'ready' order by id`);
  return { ready: rows.map((row) => row.id), current: rows.filter((row) => row.newest).map((row) => row.id) };
}
