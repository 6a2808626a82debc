import { pipeline, type Readable } from 'node:stream';
import { createGunzip } from 'node:zlib';
import type { TextDialect } from '../../shared/schemas/mapping';
import { UnreadableFile } from './unreadable-file';

const MIB = 1024 * 1024;
const CHUNK_BYTES = 256 * 1024;
/** Text tables pack about 3:1 to 20:1; beyond this much text a higher ratio than this one is taken for a bomb. */
const MAX_RATIO = 200;
const RATIO_FREE_BYTES = 100_000_000;

export interface UnpackLimits {
  /** Largest size of the text of a packed file, in bytes. */
  maxUnpackedBytes: number;
}

/**
 * The bytes of a stored file, unpacked, chunk by chunk. Ends the source when the reader stops early.
 * Throws UnreadableFile: 'file-gzip-broken', 'file-gzip-bomb'; other errors of the source come through as they are.
 */
export async function* unpackedChunks(
  source: Readable,
  compression: TextDialect['compression'],
  limits: UnpackLimits,
): AsyncGenerator<Buffer> {
  if (compression === 'none') {
    for await (const chunk of source) yield bytesOf(chunk);
    return;
  }
  const gunzip = createGunzip({ chunkSize: CHUNK_BYTES });
  // An error of the source or of the unpacking reaches the loop below, because the pipeline destroys `gunzip` with it.
  pipeline(source, gunzip, () => undefined);
  let unpackedBytes = 0;
  try {
    for await (const chunk of gunzip) {
      const bytes = bytesOf(chunk);
      unpackedBytes += bytes.length;
      refuseBomb(unpackedBytes, gunzip.bytesWritten, limits.maxUnpackedBytes);
      yield bytes;
    }
  } catch (error) {
    throw isZlibError(error)
      ? new UnreadableFile(
          'file-gzip-broken',
          'The gzip file is damaged or cut short, so it can’t be unpacked.',
          'Pack the table again, or upload it unpacked.',
        )
      : error;
  }
}

function refuseBomb(unpackedBytes: number, packedBytes: number, maxUnpackedBytes: number): void {
  if (unpackedBytes > maxUnpackedBytes) {
    const limit =
      maxUnpackedBytes >= MIB ? `${Math.floor(maxUnpackedBytes / MIB)} MiB` : `${maxUnpackedBytes} bytes`;
    throw new UnreadableFile(
      'file-gzip-bomb',
      `The gzip file unpacks to more than the limit of ${limit}.`,
      'Split the table into smaller files.',
    );
  }
  if (unpackedBytes > RATIO_FREE_BYTES && unpackedBytes > MAX_RATIO * packedBytes) {
    throw new UnreadableFile(
      'file-gzip-bomb',
      `The gzip file unpacks to more than ${MAX_RATIO} times its size, which no table of sources does.`,
      'Upload the table unpacked if it really is one.',
    );
  }
}

function bytesOf(chunk: unknown): Buffer {
  if (Buffer.isBuffer(chunk)) return chunk;
  if (chunk instanceof Uint8Array) return Buffer.from(chunk.buffer, chunk.byteOffset, chunk.byteLength);
  throw new TypeError('a stored file must be read as bytes, not as text or objects');
}

function isZlibError(error: unknown): boolean {
  return (
    error instanceof Error && 'code' in error && typeof error.code === 'string' && error.code.startsWith('Z_')
  );
}
