import { sql } from 'drizzle-orm';
import { to as copyTo } from 'pg-copy-streams';
import { inTransaction } from '../../db/client';
import { buildConeIndex, loadConeIndex, type ConeIndex, type ConeRows } from '../engine/cone-index';
import type { Context, GroupActor } from '../context';

/** The positions of one revision as plain columns; index i belongs to row_no i + 1. */
export interface RevisionPositions {
  rowCount: number;
  raDeg: Float64Array;
  decDeg: Float64Array;
  /** Entry ids, exact in a double. */
  entryIds: Float64Array;
}

export interface NearRow {
  revisionId: number;
  rowNo: number;
  sepArcsec: number;
}

const COLUMNS = 3;
const BYTES = Float64Array.BYTES_PER_ELEMENT;
/** What a process keeps in memory before it forgets the revision that was used longest ago. */
const CACHE_BYTES = 256 * 1024 * 1024;

const positionsKey = (revisionId: number) => `revision-${revisionId}.positions`;
const conesKey = (revisionId: number) => `revision-${revisionId}.cones`;

/** Positions of a ready revision, from its column file; the file is made from the database when it is missing. */
export async function revisionPositions(
  context: Context,
  actor: GroupActor,
  revisionId: number,
): Promise<RevisionPositions> {
  const key = positionsKey(revisionId);
  if (!(await context.files.exists(key))) await buildRevisionIndex(context, actor, revisionId);
  return positionsFromBytes(await context.files.read(key));
}

/**
 * Reads the positions of a revision once by binary COPY and keeps them, with the cone index over them, beside
 * the stored files. Everything here can be built again at any time.
 */
export async function buildRevisionIndex(
  context: Context,
  actor: GroupActor,
  revisionId: number,
): Promise<RevisionPositions> {
  const positions = await readPositions(context, actor, revisionId);
  await context.files.write(conesKey(revisionId), buildConeIndex(positions).bytes);
  await context.files.write(positionsKey(revisionId), positionsToBytes(positions));
  return positions;
}

function positionsToBytes(positions: RevisionPositions): Uint8Array {
  const all = new Float64Array(positions.rowCount * COLUMNS);
  all.set(positions.raDeg, 0);
  all.set(positions.decDeg, positions.rowCount);
  all.set(positions.entryIds, 2 * positions.rowCount);
  return new Uint8Array(all.buffer);
}

function positionsFromBytes(bytes: Buffer): RevisionPositions {
  const rowCount = bytes.byteLength / BYTES / COLUMNS;
  if (!Number.isInteger(rowCount)) throw new RangeError(`a column file has ${bytes.byteLength} bytes`);
  // A pooled Buffer may begin anywhere; typed arrays need their own aligned memory.
  const all = new Float64Array(rowCount * COLUMNS);
  new Uint8Array(all.buffer).set(bytes);
  return {
    rowCount,
    raDeg: all.subarray(0, rowCount),
    decDeg: all.subarray(rowCount, 2 * rowCount),
    entryIds: all.subarray(2 * rowCount),
  };
}

const COPY_HEADER_BYTES = 19;
/** int16 field count, then three fields of int32 length and 8 bytes. */
const COPY_RECORD_BYTES = 2 + COLUMNS * (4 + BYTES);

/** Reads ra, dec and entry id of every row in row order (PostgreSQL's binary COPY format, its manual, "COPY"). */
async function readPositions(context: Context, actor: GroupActor, revisionId: number): Promise<RevisionPositions> {
  return inTransaction(context.database, actor, async (tx) => {
    const counted = await tx.execute<{ n: number }>(
      sql`select count(*) as n from source where revision_id = ${revisionId}`,
    );
    const rowCount = Number(counted.rows[0]?.n ?? 0);
    const positions: RevisionPositions = {
      rowCount,
      raDeg: new Float64Array(rowCount),
      decDeg: new Float64Array(rowCount),
      entryIds: new Float64Array(rowCount),
    };
    const stream = tx.$client.query(
      // COPY takes no parameters; the id is a number by type.
      copyTo(`copy (select ra_deg, dec_deg, entry_id from source where revision_id = ${Math.trunc(revisionId)}
        order by row_no) to stdout (format binary)`),
    );
    let rest: Buffer = Buffer.alloc(0);
    let headerRead = false;
    let row = 0;
    for await (const chunk of stream as AsyncIterable<Buffer>) {
      const bytes = rest.length === 0 ? chunk : Buffer.concat([rest, chunk]);
      let at = 0;
      if (!headerRead) {
        if (bytes.length < COPY_HEADER_BYTES) {
          rest = bytes;
          continue;
        }
        at = COPY_HEADER_BYTES;
        headerRead = true;
      }
      for (; at + COPY_RECORD_BYTES <= bytes.length && row < rowCount; at += COPY_RECORD_BYTES, row += 1) {
        positions.raDeg[row] = bytes.readDoubleBE(at + 6);
        positions.decDeg[row] = bytes.readDoubleBE(at + 18);
        positions.entryIds[row] = bytes.readUInt32BE(at + 30) * 4294967296 + bytes.readUInt32BE(at + 34);
      }
      rest = bytes.subarray(at);
    }
    if (row !== rowCount) throw new RangeError(`read ${row} of ${rowCount} positions of revision ${revisionId}`);
    return positions;
  });
}

const cached = new Map<string, { index: ConeIndex; bytes: number }>();

/** The cone index of a revision, from memory, from its file, or built anew. */
async function coneIndex(context: Context, actor: GroupActor, revisionId: number): Promise<ConeIndex> {
  const key = conesKey(revisionId);
  const cacheKey = `${context.config.filesDir}/${key}`;
  const known = cached.get(cacheKey);
  if (known !== undefined) {
    cached.delete(cacheKey);
    cached.set(cacheKey, known);
    return known.index;
  }
  if (!(await context.files.exists(key))) await buildRevisionIndex(context, actor, revisionId);
  const bytes = await context.files.read(key);
  const index = loadConeIndex(bytes);
  cached.set(cacheKey, { index, bytes: bytes.byteLength });
  forgetOldest();
  return index;
}

function forgetOldest(): void {
  let total = 0;
  for (const entry of cached.values()) total += entry.bytes;
  for (const [key, entry] of cached) {
    if (total <= CACHE_BYTES || cached.size === 1) return;
    cached.delete(key);
    total -= entry.bytes;
  }
}

/** Rows of the revisions within a cone, the nearest first, at most `limit`. Separations in arcsec. */
export async function rowsInCone(
  context: Context,
  actor: GroupActor,
  revisionIds: readonly number[],
  centre: { raDeg: number; decDeg: number; radiusArcsec: number },
  limit: number,
): Promise<NearRow[]> {
  const all: NearRow[] = [];
  for (const revisionId of revisionIds) {
    const index = await coneIndex(context, actor, revisionId);
    collect(all, revisionId, index.cone(centre.raDeg, centre.decDeg, centre.radiusArcsec));
  }
  return nearestFirst(all).slice(0, limit);
}

/** The k nearest rows of the revisions within a limit, the nearest first. Separations in arcsec. */
export async function nearestRows(
  context: Context,
  actor: GroupActor,
  revisionIds: readonly number[],
  place: { raDeg: number; decDeg: number; maxArcsec: number },
  k: number,
): Promise<NearRow[]> {
  const all: NearRow[] = [];
  for (const revisionId of revisionIds) {
    const index = await coneIndex(context, actor, revisionId);
    collect(all, revisionId, index.nearest(place.raDeg, place.decDeg, k, place.maxArcsec));
  }
  return nearestFirst(all).slice(0, k);
}

function collect(all: NearRow[], revisionId: number, hits: ConeRows): void {
  hits.rows.forEach((row, i) => all.push({ revisionId, rowNo: row + 1, sepArcsec: hits.sepArcsec[i] ?? Number.NaN }));
}

function nearestFirst(rows: NearRow[]): NearRow[] {
  return rows.sort((a, b) => a.sepArcsec - b.sepArcsec || a.revisionId - b.revisionId || a.rowNo - b.rowNo);
}
