import { isAscii, isUtf8 } from 'node:buffer';
import type { TextDialect } from '../../shared/schemas/mapping';
import { UnreadableFile } from './unreadable-file';

/** Windows-1252 for 0x80..0x9f, where Latin-1 has no printable character; '' marks the five unused places. */
const WINDOWS_1252 = '€\u0081‚ƒ„…†‡ˆ‰Š‹Œ\u008dŽ\u008f\u0090‘’“”•–—˜™š›œ\u009džŸ';
const HIGH_CONTROLS = /[\u0080-\u009f]/g;
const LINE_FEED = 10;
const CARRIAGE_RETURN = 13;

/** Turns bytes into text, chunk by chunk; a character cut by a chunk border is kept for the next chunk. */
export class TextReader {
  private readonly encoding: TextDialect['encoding'];
  private carried: Buffer = Buffer.alloc(0);
  private started = false;

  constructor(encoding: TextDialect['encoding']) {
    this.encoding = encoding;
  }

  /**
   * Text of the next bytes. `line` is the number of the line in which they begin: bytes that aren't UTF-8 throw
   * UnreadableFile 'file-encoding' with their line.
   */
  push(bytes: Buffer, line: number): string {
    const whole = this.carried.length > 0 ? Buffer.concat([this.carried, bytes]) : bytes;
    if (!this.started && whole.length < 3) {
      this.carried = whole;
      return '';
    }
    const start = this.started ? 0 : bomLength(whole);
    this.started = true;
    const end = this.encoding === 'utf-8' ? whole.length - unfinishedTail(whole) : whole.length;
    this.carried = whole.subarray(end);
    return this.decode(whole.subarray(start, end), line);
  }

  /** Text of what is left; an unfinished character at the end of the file is refused like other bad bytes. */
  end(line: number): string {
    const rest = this.carried;
    this.carried = Buffer.alloc(0);
    return this.decode(rest, line);
  }

  private decode(bytes: Buffer, line: number): string {
    if (isAscii(bytes)) return bytes.toString('latin1');
    if (this.encoding === 'latin1') {
      return bytes
        .toString('latin1')
        .replace(HIGH_CONTROLS, (char) => WINDOWS_1252.charAt(char.charCodeAt(0) - 0x80));
    }
    if (isUtf8(bytes)) return bytes.toString('utf8');
    const badLine = line + lineBreaksBefore(bytes, badLineStart(bytes));
    throw new UnreadableFile(
      'file-encoding',
      `Line ${badLine} holds bytes that are not UTF-8 text.`,
      'Choose Latin-1 as the encoding, or save the file as UTF-8.',
      badLine,
    );
  }
}

/** Length of the UTF-8 byte order mark at the start of a file: 3 or 0. */
export function bomLength(bytes: Buffer): number {
  return bytes[0] === 0xef && bytes[1] === 0xbb && bytes[2] === 0xbf ? 3 : 0;
}

/** How many bytes at the end begin a UTF-8 character that isn't complete (0..3). */
export function unfinishedTail(bytes: Buffer): number {
  for (let back = 1; back <= Math.min(3, bytes.length); back += 1) {
    const byte = bytes[bytes.length - back] ?? 0;
    if (byte < 0x80) return 0;
    if (byte < 0xc0) continue;
    const needed = byte >= 0xf0 ? 4 : byte >= 0xe0 ? 3 : 2;
    return needed > back ? back : 0;
  }
  return 0;
}

/** Where the first line with bad bytes begins; no UTF-8 character holds the byte of a line end. */
function badLineStart(bytes: Buffer): number {
  let start = 0;
  for (let at = 0; at < bytes.length; at += 1) {
    const byte = bytes[at];
    if (byte !== LINE_FEED && byte !== CARRIAGE_RETURN) continue;
    if (!isUtf8(bytes.subarray(start, at))) return start;
    start = at + 1;
  }
  return start;
}

function lineBreaksBefore(bytes: Buffer, end: number): number {
  let breaks = 0;
  for (let at = 0; at < end; at += 1) {
    const byte = bytes[at];
    if (byte === LINE_FEED || (byte === CARRIAGE_RETURN && bytes[at + 1] !== LINE_FEED)) breaks += 1;
  }
  return breaks;
}
