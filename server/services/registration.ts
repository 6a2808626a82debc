import { Transform } from 'node:stream';
import { pipeline } from 'node:stream/promises';
import { eq, sql } from 'drizzle-orm';
import { from as copyFrom, to as copyTo } from 'pg-copy-streams';
import { inTransaction, type Tx } from '../../db/client';
import { catalogueRevision } from '../../db/schema/catalogue';
import { researchGroup } from '../../db/schema/group';
import { nameKey } from '../../shared/astro/designations';
import type { ColumnMapping } from '../../shared/schemas/mapping';
import type { Context, GroupActor } from '../context';
import { copyTextEscape, copyTextUnescape } from '../formats/copy-text';
import { namesInCells } from '../formats/understand-names';

const CHUNK_CHARACTERS = 65_536;

interface Registrable {
  revisionId: number;
  label: string;
  mapping: ColumnMapping;
}

/**
 * Gives every new entry of a ready revision its object (with the group's next numbers, in row order) and its
 * aliases, in one transaction; a revision is registered once.
 */
export async function registerRevision(
  context: Context,
  actor: GroupActor,
  revision: Registrable,
  report: (done: number) => Promise<void>,
): Promise<void> {
  await inTransaction(context.database, actor, async (tx) => {
    const [row] = await tx
      .select({ registeredAt: catalogueRevision.registeredAt })
      .from(catalogueRevision)
      .where(eq(catalogueRevision.id, revision.revisionId))
      .for('update');
    if (row === undefined || row.registeredAt !== null) return;
    await insertObjects(tx, actor, revision.revisionId);
    await insertAliases(context, tx, actor, revision, report);
    await tx
      .update(catalogueRevision)
      .set({ registeredAt: sql`now()` })
      .where(eq(catalogueRevision.id, revision.revisionId));
  });
}

async function insertObjects(tx: Tx, actor: GroupActor, revisionId: number): Promise<void> {
  // The group's row is the lock on its numbers.
  const [group] = await tx
    .select({ next: researchGroup.nextObjectNumber })
    .from(researchGroup)
    .where(eq(researchGroup.id, actor.groupId))
    .for('update');
  const inserted = await tx.execute(sql`
    insert into object (id, group_id, number, ra_deg, dec_deg, err_arcsec, name)
    select s.entry_id, s.group_id, ${group?.next ?? 1}::bigint - 1 + row_number() over (order by s.row_no),
      s.ra_deg, s.dec_deg, sqrt(s.err_maj_arcsec::float8 * s.err_min_arcsec::float8), s.designation
    from source s
    where s.revision_id = ${revisionId} and not exists (select 1 from object o where o.id = s.entry_id)`);
  await tx
    .update(researchGroup)
    .set({ nextObjectNumber: sql`${researchGroup.nextObjectNumber} + ${inserted.rowCount ?? 0}` })
    .where(eq(researchGroup.id, actor.groupId));
}

/** Names are split and keyed outside the database, so they are streamed through this process in constant memory. */
async function insertAliases(
  context: Context,
  tx: Tx,
  actor: GroupActor,
  revision: Registrable,
  report: (done: number) => Promise<void>,
): Promise<void> {
  await tx.execute(
    sql`create temp table alias_load (object_id bigint not null, name text not null, key text not null) on commit drop`,
  );
  const into = tx.$client.query(copyFrom('copy alias_load (object_id, name, key) from stdin'));
  await inTransaction(context.database, actor, async (reading) => {
    const out = reading.$client.query(
      copyTo(`copy (select entry_id, designation, cells from source where revision_id = ${Math.trunc(revision.revisionId)}
        order by row_no) to stdout`),
    );
    await pipeline(out, aliasLines(revision, report), into);
  });
  await tx.execute(sql`
    insert into alias (group_id, object_id, name, key, origin)
    select ${actor.groupId}::int, l.object_id, l.name, l.key, 'entry' from alias_load l
    where not exists (select 1 from alias a where a.object_id = l.object_id and a.name = l.name)`);
}

/** Turns lines 'entry, designation, cells' into lines 'entry, name, key', one for each name of the entry. */
function aliasLines(revision: Registrable, report: (done: number) => Promise<void>): Transform {
  let rest = '';
  let done = 0;
  const decoder = new TextDecoder();
  const linesOf = (text: string) => {
    let out = '';
    const lines = text.split('\n');
    rest = lines.pop() ?? '';
    for (const line of lines) {
      out += aliasesOfRow(revision, line);
      done += 1;
    }
    return out;
  };
  return new Transform({
    readableHighWaterMark: CHUNK_CHARACTERS,
    transform(chunk: Buffer, _encoding, next) {
      let out: string;
      try {
        out = linesOf(rest + decoder.decode(chunk, { stream: true }));
      } catch (error) {
        next(error instanceof Error ? error : new Error(String(error)));
        return;
      }
      report(done).then(
        () => next(null, out),
        (error: unknown) => next(error instanceof Error ? error : new Error(String(error))),
      );
    },
  });
}

function aliasesOfRow(revision: Registrable, line: string): string {
  const [entryId = '', designation = '', cells = ''] = line.split('\t');
  const names = namesInCells(revision.mapping, copyTextUnescape(cells).split('\u001f'));
  const written = names.length > 0 ? names : [copyTextUnescape(designation)];
  let out = '';
  for (const name of written) {
    const key = nameKey(name);
    if (key !== '') out += `${entryId}\t${copyTextEscape(name)}\t${copyTextEscape(key)}\n`;
  }
  return out;
}
