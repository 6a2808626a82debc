import { sql } from 'drizzle-orm';
import type { Tx } from '../../db/client';
import type { ObjectDetail } from '../../shared/schemas/object';
import type { GroupActor } from '../context';
import { bigintArray } from './verdict-log';

type Event = ObjectDetail['history'][number];
const MAX_EVENTS = 200;

interface Row {
  at: Date;
  by: string | null;
  what: string;
  detail: string;
  [key: string]: unknown;
}

/** What happened to an object and to those merged into it, the newest first. */
export async function historyOf(
  tx: Tx,
  actor: GroupActor,
  born: readonly { id: number; number: number }[],
): Promise<Event[]> {
  const ids = bigintArray(born.map((one) => one.id));
  const subjects = born.map((one) => `object ${one.number}`);
  const { rows } = await tx.execute<Row>(sql`
    select * from (
      select r.registered_at as at, p.name as by, 'born as #' || o.number as what, c.label || ', ' || e.key as detail
      from object o join entry e on e.id = o.id join catalogue c on c.id = e.catalogue_id
        join catalogue_revision r on r.catalogue_id = c.id and r.number = 1 join person p on p.id = r.created_by
      where o.id = any(${ids}) and r.registered_at is not null
      union all
      select v.at, p.name, case when v.takes_back is not null then 'verdict taken back'
          when v.policy_id is not null then 'automatic verdict: ' || v.value else 'verdict: ' || v.value end,
        a.name || ' and ' || b.name || coalesce(', ' || v.grade, '') || case when v.remark = '' then '' else ': ' || v.remark end
      from verdict v join person p on p.id = v.person_id join object a on a.id = v.entry_a join object b on b.id = v.entry_b
      where v.entry_a = any(${ids}) or v.entry_b = any(${ids})
      union all
      select t.at, p.name, t.action, t.subject || coalesce(': ' || (t.detail ->> 'name'), '')
        || coalesce(' (#' || (select string_agg(n, ', #') from jsonb_array_elements_text(
             case when jsonb_typeof(t.detail -> 'objects') = 'array' then t.detail -> 'objects' end) as n) || ')', '')
      from audit_event t left join person p on p.id = t.person_id
      where t.group_id = ${actor.groupId} and t.subject = any(${sql.param(subjects)}::text[])
    ) as events order by at desc, what limit ${MAX_EVENTS}`);
  return rows.map((row) => ({
    at: new Date(row.at).toISOString(),
    by: row.by ?? 'the system',
    what: row.what,
    detail: row.detail,
  }));
}
