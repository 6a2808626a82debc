import { z } from 'zod';
import type { pageQuery } from '../../shared/schemas/page';
import type { SetAsideRow } from '../../shared/schemas/mapping';
import type { Context, GroupActor } from '../context';
import { csvLine } from '../formats/csv-writer';
import { setAsideRows } from './catalogues';
import { decodeCursor, encodeCursor } from './cursor';

const PAGE_ROWS = 1000;
const BEFORE_FIRST = -1;
const seqCursor = z.number().int();

/** One page of the set-aside rows of a catalogue, in the order of the file. */
export async function setAsidePageOf(
  context: Context,
  actor: GroupActor,
  label: string,
  query: z.output<typeof pageQuery>,
): Promise<{ items: SetAsideRow[]; next: string | null; total: number }> {
  const after = query.after === undefined ? BEFORE_FIRST : decodeCursor(seqCursor, query.after);
  const { rows, total } = await setAsideRows(context, actor, label, after, query.limit + 1);
  const shown = rows.slice(0, query.limit);
  const last = shown.at(-1);
  return {
    items: shown.map(({ seq: _seq, ...row }) => row),
    next: rows.length > query.limit && last !== undefined ? encodeCursor(last.seq) : null,
    total,
  };
}

/** All set-aside rows as lines of a CSV file; refuses an unknown catalogue before the first line. */
export async function setAsideCsv(
  context: Context,
  actor: GroupActor,
  label: string,
): Promise<AsyncIterable<string>> {
  const first = await setAsideRows(context, actor, label, BEFORE_FIRST, PAGE_ROWS);
  return lines();

  async function* lines() {
    yield csvLine(['line', 'column', 'code', 'reason', 'raw']);
    let { rows } = first;
    while (rows.length > 0) {
      yield rows.map((row) => csvLine([row.line, row.column, row.code, row.message, row.raw])).join('');
      const last = rows.at(-1)?.seq ?? 0;
      rows = rows.length < PAGE_ROWS ? [] : (await setAsideRows(context, actor, label, last, PAGE_ROWS)).rows;
    }
  }
}
