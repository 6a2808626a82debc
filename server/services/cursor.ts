import type { z } from 'zod';
import { refuse } from '../errors';

/** A keyset cursor as an opaque word for the URL. */
export function encodeCursor(value: unknown): string {
  return Buffer.from(JSON.stringify(value)).toString('base64url');
}

/** Reads a cursor back; refuses one that this server did not make. */
export function decodeCursor<T extends z.ZodType>(schema: T, cursor: string): z.output<T> {
  try {
    return schema.parse(JSON.parse(Buffer.from(cursor, 'base64url').toString('utf8')));
  } catch {
    refuse('bad-request', 'The page marker is not one of ours.', { hint: 'Begin again at the first page.' });
  }
}
