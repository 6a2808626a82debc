import { createReadStream, createWriteStream } from 'node:fs';
import { mkdir, readFile, rename, rm, stat, writeFile } from 'node:fs/promises';
import path from 'node:path';
import type { Readable, Writable } from 'node:stream';

/**
 * Where bytes are kept: uploaded files and rebuildable indexes, under keys made by services
 * ('<uuid>', '<uuid>.index'). Never built from what a person typed.
 */
export interface FileStorage {
  /** Opens a writable stream; the bytes appear under the key only after `commit`. */
  create(key: string): Promise<{ stream: Writable; commit(): Promise<void>; abandon(): Promise<void> }>;
  /** `bytesRead` tells how far a reader has come. */
  open(key: string): Readable & { readonly bytesRead: number };
  read(key: string): Promise<Buffer>;
  write(key: string, bytes: Uint8Array): Promise<void>;
  exists(key: string): Promise<boolean>;
  remove(key: string): Promise<void>;
}

const SAFE_KEY = /^[a-z0-9][a-z0-9.-]{0,120}$/;
const READ_CHUNK_BYTES = 256 * 1024;

/** File storage in a folder of the local disk. */
export function localFileStorage(folder: string): FileStorage {
  const pathOf = (key: string) => {
    if (!SAFE_KEY.test(key)) throw new RangeError(`key is not a storage key: ${JSON.stringify(key)}`);
    return path.join(folder, key);
  };
  // Two writers of one key may be at work at once, in one process or in several; the last to finish wins.
  const partOf = (key: string) => `${pathOf(key)}.${crypto.randomUUID()}.part`;
  return {
    async create(key) {
      await mkdir(folder, { recursive: true });
      const part = partOf(key);
      return {
        stream: createWriteStream(part),
        commit: () => rename(part, pathOf(key)),
        abandon: () => rm(part, { force: true }),
      };
    },
    open: (key) => createReadStream(pathOf(key), { highWaterMark: READ_CHUNK_BYTES }),
    read: (key) => readFile(pathOf(key)),
    async write(key, bytes) {
      await mkdir(folder, { recursive: true });
      const part = partOf(key);
      await writeFile(part, bytes);
      await rename(part, pathOf(key));
    },
    exists: (key) =>
      stat(pathOf(key)).then(
        () => true,
        () => false,
      ),
    remove: (key) => rm(pathOf(key), { force: true }),
  };
}
