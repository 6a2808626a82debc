import { Readable } from 'node:stream';
import { pipeline } from 'node:stream/promises';
import { sql } from 'drizzle-orm';
import { from as copyFrom } from 'pg-copy-streams';
import type { Tx } from '../../db/client';
import { found } from '../errors';

/** One candidate on its way into the database; what the columns mean stands in db/schema/run.ts. */
export interface CandidateRow {
  entryA: number;
  entryB: number;
  revisionA: number;
  revisionB: number;
  rowA: number;
  rowB: number;
  sepArcsec: number;
  /** NaN where the position angle is not defined. */
  paDeg: number;
  rankA: number;
  rankB: number;
  rivalsA: number;
  rivalsB: number;
  mutualBest: boolean;
}

const COLUMNS =
  'group_id, run_id, seq, entry_a, entry_b, revision_a, revision_b, row_a, row_b, sep_arcsec, pa_deg, rank_a, rank_b, rivals_a, rivals_b, mutual_best';
const COLUMN_COUNT = COLUMNS.split(',').length;
/** Eleven integers of 4 bytes, four fields of 8, one of 1, a length before each, and the count of fields. */
const MAX_ROW_BYTES = 2 + COLUMN_COUNT * 4 + 11 * 4 + 4 * 8 + 1;
const ROWS_PER_BATCH = 4096;
const NULL_LENGTH = -1;
const TWO_TO_32 = 4294967296;

/**
 * Writes the candidates of a run into a partition of their own by binary COPY (PostgreSQL manual, "COPY", binary
 * format) and attaches it; `seq` counts from 1 in the order given. All inside the caller's transaction.
 */
export async function copyCandidates(
  tx: Tx,
  place: { groupId: number; runId: number },
  count: number,
  rowAt: (index: number, row: CandidateRow) => void,
  report: (done: number) => Promise<void>,
): Promise<void> {
  const { rows } = await tx.execute<{ part: string }>(
    sql`select open_partition('candidate', ${place.runId}) as part`,
  );
  const { part } = found(rows[0], 'partition');
  await pipeline(
    Readable.from(encodedBatches(place, count, rowAt, report)),
    // The table was made in this transaction, so its rows may be written frozen: no later pass over them.
    tx.$client.query(copyFrom(`copy ${part} (${COLUMNS}) from stdin (format binary, freeze)`)),
  );
  await tx.execute(sql`select attach_partition('candidate', ${place.runId})`);
}

async function* encodedBatches(
  place: { groupId: number; runId: number },
  count: number,
  rowAt: (index: number, row: CandidateRow) => void,
  report: (done: number) => Promise<void>,
): AsyncGenerator<Uint8Array> {
  yield header();
  for (let from = 0; from < count; from += ROWS_PER_BATCH) {
    const to = Math.min(count, from + ROWS_PER_BATCH);
    yield encodeBatch(place, from, to, rowAt);
    await report(to);
  }
  yield trailer();
}

/** Signature, no flags, no extension. */
function header(): Uint8Array {
  return Buffer.concat([Buffer.from('PGCOPY\n\xff\r\n\0', 'latin1'), Buffer.alloc(8)]);
}

function trailer(): Uint8Array {
  return Buffer.from([0xff, 0xff]);
}

function blankRow(): CandidateRow {
  return {
    entryA: 0,
    entryB: 0,
    revisionA: 0,
    revisionB: 0,
    rowA: 0,
    rowB: 0,
    sepArcsec: 0,
    paDeg: NaN,
    rankA: 0,
    rankB: 0,
    rivalsA: 0,
    rivalsB: 0,
    mutualBest: false,
  };
}

function encodeBatch(
  place: { groupId: number; runId: number },
  from: number,
  to: number,
  rowAt: (index: number, row: CandidateRow) => void,
): Uint8Array {
  const bytes = new Uint8Array((to - from) * MAX_ROW_BYTES);
  const view = new DataView(bytes.buffer);
  const row = blankRow();
  let at = 0;
  const int = (value: number) => {
    view.setInt32(at, 4);
    view.setInt32(at + 4, value);
    at += 8;
  };
  const bigint = (value: number) => {
    view.setInt32(at, 8);
    view.setInt32(at + 4, Math.floor(value / TWO_TO_32));
    view.setUint32(at + 8, value % TWO_TO_32);
    at += 12;
  };
  const double = (value: number) => {
    if (Number.isNaN(value)) {
      view.setInt32(at, NULL_LENGTH);
      at += 4;
      return;
    }
    view.setInt32(at, 8);
    view.setFloat64(at + 4, value);
    at += 12;
  };
  for (let index = from; index < to; index += 1) {
    rowAt(index, row);
    view.setInt16(at, COLUMN_COUNT);
    at += 2;
    int(place.groupId);
    int(place.runId);
    int(index + 1);
    bigint(row.entryA);
    bigint(row.entryB);
    int(row.revisionA);
    int(row.revisionB);
    int(row.rowA);
    int(row.rowB);
    double(row.sepArcsec);
    double(row.paDeg);
    int(row.rankA);
    int(row.rankB);
    int(row.rivalsA);
    int(row.rivalsB);
    view.setInt32(at, 1);
    view.setUint8(at + 4, row.mutualBest ? 1 : 0);
    at += 5;
  }
  return bytes.subarray(0, at);
}
