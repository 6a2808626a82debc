import { sql } from 'drizzle-orm';
import { inTransaction, type Tx } from '../../db/client';
import type { Today } from '../../shared/schemas/today';
import type { Context, GroupActor } from '../context';
import { listJobs } from './jobs';

const SHOWN_JOBS = 12;
const SHOWN_EVENTS = 12;

/** What waits, what runs, what changed. */
export async function today(context: Context, actor: GroupActor): Promise<Today> {
  const jobs = await listJobs(context, actor, 'all', SHOWN_JOBS);
  return inTransaction(context.database, actor, async (tx) => ({
    ...(await counts(tx, actor)),
    undecided: await undecided(tx, actor),
    jobs,
    recent: await recent(tx, actor),
  }));
}

type Counts = Pick<
  Today,
  'catalogues' | 'sources' | 'setAsideRows' | 'objects' | 'mergedObjects' | 'conflicts' | 'contestedNames'
>;

async function counts(tx: Tx, actor: GroupActor): Promise<Counts> {
  const { rows } = await tx.execute<Record<keyof Counts, number>>(sql`
    select
      (select count(*) from catalogue where group_id = ${actor.groupId}) as catalogues,
      (select coalesce(sum(sources), 0)::bigint from catalogue_revision where group_id = ${actor.groupId} and state = 'ready') as sources,
      (select coalesce(sum(set_aside), 0)::bigint from catalogue_revision where group_id = ${actor.groupId} and state = 'ready') as "setAsideRows",
      (select count(*) from object where group_id = ${actor.groupId} and merged_into is null) as objects,
      (select count(distinct merged_into) from object where group_id = ${actor.groupId} and merged_into is not null) as "mergedObjects",
      (select count(*) from verdict_in_force f join object a on a.id = f.entry_a join object b on b.id = f.entry_b
        where f.group_id = ${actor.groupId} and f.value = 'same'
          and coalesce(a.merged_into, a.id) <> coalesce(b.merged_into, b.id)) as conflicts,
      (select count(*) from (
        select a.key from alias a join object o on o.id = a.object_id
        where a.group_id = ${actor.groupId} and a.retired_at is null
        group by a.key having count(distinct coalesce(o.merged_into, o.id)) > 1) as shared) as "contestedNames"`);
  const row = rows[0];
  if (row === undefined) throw new Error('counts came without a row');
  return row;
}

async function undecided(tx: Tx, actor: GroupActor): Promise<Today['undecided']> {
  const { rows } = await tx.execute<Today['undecided'][number] & Record<string, unknown>>(sql`
    select r.number as run, r.title, count(*) as undecided, count(*) filter (where c.rivals_a + c.rivals_b > 0) as crowded
    from match_run r
    join candidate c on c.run_id = r.id
    left join verdict_in_force f on f.entry_a = least(c.entry_a, c.entry_b) and f.entry_b = greatest(c.entry_a, c.entry_b)
    where r.group_id = ${actor.groupId} and f.verdict_id is null
    group by r.number, r.title order by r.number desc`);
  return rows.map(({ run, title, undecided: open, crowded }) => ({ run, title, undecided: open, crowded }));
}

const LINKS: readonly { pattern: RegExp; link: (match: RegExpExecArray) => string }[] = [
  { pattern: /^object (\d+)$/, link: ([, number]) => `objects/${number}` },
  { pattern: /^catalogue (\S+)$/, link: ([, label]) => `catalogues/${label}` },
  { pattern: /^cross-match (\d+)$/, link: ([, run]) => `cross-match/${run}` },
];

function linkOf(subject: string): string | null {
  for (const { pattern, link } of LINKS) {
    const match = pattern.exec(subject);
    if (match !== null) return link(match);
  }
  return null;
}

async function recent(tx: Tx, actor: GroupActor): Promise<Today['recent']> {
  const { rows } = await tx.execute<{ at: Date; by: string | null; action: string; subject: string }>(sql`
    select e.at, p.name as by, e.action, e.subject from audit_event e left join person p on p.id = e.person_id
    where e.group_id = ${actor.groupId} order by e.id desc limit ${SHOWN_EVENTS}`);
  return rows.map((row) => ({
    at: new Date(row.at).toISOString(),
    by: row.by ?? 'the system',
    what: `${row.action}: ${row.subject}`,
    link: linkOf(row.subject),
  }));
}
