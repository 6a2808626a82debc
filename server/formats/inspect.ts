import type { Readable } from 'node:stream';
import type { FileInspection } from '../../shared/schemas/mapping';
import { describedColumn, MAX_EXAMPLE_LENGTH, profileColumn } from './column-profile';
import { readHead, type HeadOptions } from './file-head';
import { storableText } from './shown-text';
import { suggestMapping } from './suggest-mapping';
import { readTableHead } from './table-head';
import { UnreadableFile } from './unreadable-file';

export { UnreadableFile };

const SAMPLE_ROWS = 20;

/**
 * Looks at the beginning of a stored file, at most 4 MiB of text and 5,000 rows: how it is laid out, what its columns
 * look like, and what they may mean. Parts of the dialect in `options` are taken as given. `openStream` must open the
 * file anew each time. Throws UnreadableFile with a code, a sentence and a hint.
 */
export async function inspectTextTable(
  openStream: () => Readable,
  options: HeadOptions,
): Promise<FileInspection> {
  const head = await readHead(openStream, options);
  const table = readTableHead(head, options.dialect ?? {});
  const { dialect, names, batch } = table;
  const rows = batch.cells.filter((row) => row !== null).filter((row) => row.length >= names.length);
  const profiles = names.map((name, index) => profileColumn(rows, index, name, dialect.decimalComma));
  const suggestedMapping = suggestMapping(profiles, {
    decimalComma: dialect.decimalComma,
    whole: table.whole,
  });
  if (names.length === 1 && suggestedMapping === null) {
    throw new UnreadableFile(
      'file-one-column',
      'The file has only one column, and it holds no positions.',
      'Check the separator of the cells; a table needs a right ascension and a declination.',
    );
  }
  return {
    dialect,
    columns: profiles.map(describedColumn),
    rowsSeen: batch.lines.length,
    wholeFileSeen: table.whole,
    suggestedMapping,
    sample: batch.cells
      .filter((row) => row !== null)
      .slice(0, SAMPLE_ROWS)
      .map((row) => row.map((cell) => storableText(cell, MAX_EXAMPLE_LENGTH))),
  };
}
