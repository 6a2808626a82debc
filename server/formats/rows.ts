import type { Readable } from 'node:stream';
import type { TextDialect } from '../../shared/schemas/mapping';
import { TextReader } from './decode';
import { LineSplitter } from './lines';
import { RecordReader, type RowBatch } from './records';
import { unpackedChunks, type UnpackLimits } from './unpack';

/** Rows are handed on when at least so many wait: enough to make the cost of a turn small, few enough to be small. */
const BATCH_ROWS = 1000;
const NOTHING = Buffer.alloc(0);

/**
 * The data rows of a stored file in batches of about 1,000, at constant memory; the next part is read when the batch
 * has been dealt with. Header, comment lines and blank lines are left out but counted as lines. Reading throws
 * UnreadableFile for what makes the rest unreadable: broken gzip, a line over 1 MiB, bytes of another encoding.
 */
export async function* readRows(
  source: Readable,
  dialect: TextDialect,
  limits: UnpackLimits,
): AsyncGenerator<RowBatch> {
  const text = new TextReader(dialect.encoding);
  const lines = new LineSplitter();
  const records = new RecordReader(dialect);
  for await (const bytes of unpackedChunks(source, dialect.compression, limits)) {
    records.push(lines.push(text.push(bytes, lines.lineOfNext(bytes))));
    if (records.size >= BATCH_ROWS) yield records.take();
  }
  records.push(lines.push(text.end(lines.lineOfNext(NOTHING))));
  records.push(lines.end());
  records.end();
  if (records.size > 0) yield records.take();
}
