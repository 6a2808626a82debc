import { createHash } from 'node:crypto';
import { Transform, type Readable } from 'node:stream';
import { pipeline } from 'node:stream/promises';
import { and, eq } from 'drizzle-orm';
import { inTransaction } from '../../db/client';
import { storedFile } from '../../db/schema/catalogue';
import type { UploadedFile } from '../../shared/schemas/file';
import type { ColumnMapping, FileInspection, MappingPreview, TextDialect } from '../../shared/schemas/mapping';
import type { Context, GroupActor } from '../context';
import { found, refuse } from '../errors';
import { inspectTextTable } from '../formats/inspect';
import { previewMapping } from '../formats/preview';
import { UnreadableFile } from '../formats/unreadable-file';
import { recordEvent } from './audit';
import { refuseColumnsBeyond } from './mapping-check';

const MIB = 1024 * 1024;

/** Name of a file as a person may see it again: no path, no control characters. */
export function displayName(name: string): string {
  const last = name.split(/[\\/]/).at(-1) ?? '';
  const clean = last.replace(/[\u0000-\u001f\u007f]/g, '').trim().slice(0, 200);
  return clean === '' ? 'unnamed' : clean;
}

/**
 * Keeps an uploaded stream (size limit, sha256), looks at its beginning, and records it. A file that is too large
 * or cannot be read leaves nothing behind.
 */
export async function storeFile(
  context: Context,
  actor: GroupActor,
  name: string,
  bytes: Readable,
): Promise<UploadedFile> {
  const id = crypto.randomUUID();
  const stored = await context.files.create(id);
  const measure = measuringStream(context.config.maxUploadBytes);
  try {
    await pipeline(bytes, measure.stream, stored.stream);
    await stored.commit();
  } catch (error) {
    await stored.abandon();
    throw error;
  }
  try {
    const inspection = await inspect(context, id, {});
    const { sizeBytes, sha256 } = measure.result();
    await inTransaction(context.database, actor, async (tx) => {
      await tx
        .insert(storedFile)
        .values({ id, groupId: actor.groupId, name, sizeBytes, sha256, inspection, uploadedBy: actor.personId });
      await recordEvent(tx, actor, 'file uploaded', `file ${name}`, { sizeBytes, sha256 });
    });
    return { fileId: id, name, sizeBytes, sha256, inspection };
  } catch (error) {
    await context.files.remove(id);
    throw error;
  }
}

function measuringStream(limitBytes: number) {
  const hash = createHash('sha256');
  let sizeBytes = 0;
  const stream = new Transform({
    transform(chunk: Buffer, _encoding, done) {
      sizeBytes += chunk.length;
      if (sizeBytes > limitBytes) {
        done(new UploadTooLarge(limitBytes));
        return;
      }
      hash.update(chunk);
      done(null, chunk);
    },
  });
  return { stream, result: () => ({ sizeBytes, sha256: hash.digest('hex') }) };
}

/** Thrown inside the stream; `refuseUpload` gives it its words. */
class UploadTooLarge extends Error {
  readonly limitBytes: number;
  constructor(limitBytes: number) {
    super('upload too large');
    this.limitBytes = limitBytes;
  }
}

/** The refusal of an upload that broke off, when there is one to give. */
export function refuseUpload(error: unknown): never {
  if (error instanceof UploadTooLarge) {
    const mib = Math.floor(error.limitBytes / MIB);
    const limit = mib > 0 ? `${mib} MiB` : `${error.limitBytes} bytes`;
    refuse('file-too-large', `The file is larger than the limit of ${limit}.`);
  }
  throw error;
}

/** Runs a reader of files; a file that cannot be read becomes a refusal with the reader's own words. */
async function readable<T>(read: () => Promise<T>): Promise<T> {
  try {
    return await read();
  } catch (error) {
    if (error instanceof UnreadableFile) {
      refuse('file-unreadable', error.message, { hint: error.hint, errors: [{ path: 'file', message: error.code }] });
    }
    throw error;
  }
}

/** The columns of a stored file under a dialect; refuses a file that cannot be read so. */
export async function columnsUnder(context: Context, fileId: string, dialect: TextDialect) {
  return (await inspect(context, fileId, dialect)).columns;
}

function inspect(context: Context, fileId: string, dialect: Partial<TextDialect>): Promise<FileInspection> {
  return readable(() =>
    inspectTextTable(() => context.files.open(fileId), { maxUnpackedBytes: context.config.maxUnpackedBytes, dialect }),
  );
}

/** A stored file of the group. */
export async function storedFileOf(context: Context, actor: GroupActor, fileId: string) {
  return inTransaction(context.database, actor, async (tx) => {
    const [row] = await tx
      .select()
      .from(storedFile)
      .where(and(eq(storedFile.id, fileId), eq(storedFile.groupId, actor.groupId)));
    return found(row, 'file');
  });
}

/** Looks at the file again with parts of the dialect set by hand. */
export async function inspectFileAgain(
  context: Context,
  actor: GroupActor,
  fileId: string,
  dialect: Partial<TextDialect>,
): Promise<UploadedFile> {
  const row = await storedFileOf(context, actor, fileId);
  const inspection = await inspect(context, fileId, dialect);
  return { fileId, name: row.name, sizeBytes: row.sizeBytes, sha256: row.sha256, inspection };
}

/** The first rows as they will be understood under a mapping, and the first refusals. */
export async function previewFile(
  context: Context,
  actor: GroupActor,
  fileId: string,
  dialect: TextDialect,
  mapping: ColumnMapping,
): Promise<MappingPreview> {
  await storedFileOf(context, actor, fileId);
  refuseColumnsBeyond(mapping, (await columnsUnder(context, fileId, dialect)).length);
  return readable(() =>
    previewMapping(() => context.files.open(fileId), dialect, mapping, {
      maxUnpackedBytes: context.config.maxUnpackedBytes,
    }),
  );
}
