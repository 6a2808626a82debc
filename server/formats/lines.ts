import { UnreadableFile } from './unreadable-file';

/** Longest line that is read, in characters; a table of sources has lines of some hundred. */
export const MAX_LINE_LENGTH = 1024 * 1024;

const LINE_FEED = 10;

export interface LineBlock {
  /** Number of the first of the lines in the file, counted from 1. */
  firstLine: number;
  lines: string[];
  /** True when some of the lines may hold a double quote. */
  quotes: boolean;
}

/** Cuts text into lines, whatever mixture of LF, CR LF and CR ends them. */
export class LineSplitter {
  private rest = '';
  /** Number of the line that comes next, counted from 1. */
  line = 1;

  /** Number of the line in which the next bytes of the file begin: a CR that was held back has ended a line, unless LF follows. */
  lineOfNext(bytes: Buffer): number {
    return this.rest.endsWith('\r') && bytes[0] !== LINE_FEED ? this.line + 1 : this.line;
  }

  /** The lines that are complete with this text. Throws UnreadableFile 'file-row-too-long'. */
  push(text: string): LineBlock {
    const held = this.rest + text;
    // A CR at the very end may be the first half of CR LF.
    const open = held.endsWith('\r') ? '\r' : '';
    const lines = splitLines(open === '' ? held : held.slice(0, -1));
    this.rest = (lines.pop() ?? '') + open;
    if (held.length > MAX_LINE_LENGTH) this.refuseLong(lines);
    return this.block(lines, held);
  }

  /** The last line when nothing ends it; no line after a final line end. */
  end(): LineBlock {
    const held = this.rest;
    this.rest = '';
    const lines = splitLines(held);
    if (lines.at(-1) === '') lines.pop();
    return this.block(lines, held);
  }

  private block(lines: string[], text: string): LineBlock {
    const firstLine = this.line;
    this.line += lines.length;
    return { firstLine, lines, quotes: text.includes('"') };
  }

  private refuseLong(lines: readonly string[]): void {
    const inside = lines.findIndex((line) => line.length > MAX_LINE_LENGTH);
    const index = inside >= 0 ? inside : this.rest.length > MAX_LINE_LENGTH ? lines.length : -1;
    if (index < 0) return;
    const line = this.line + index;
    throw new UnreadableFile(
      'file-row-too-long',
      `Line ${line} is longer than 1 MiB, which no row of a table of sources is.`,
      'Check that the file is a text table and that its lines are broken as they should be.',
      line,
    );
  }
}

function splitLines(text: string): string[] {
  if (!text.includes('\r')) return text.split('\n');
  const unified = text.replaceAll('\r\n', '\n');
  return (unified.includes('\r') ? unified.replaceAll('\r', '\n') : unified).split('\n');
}
