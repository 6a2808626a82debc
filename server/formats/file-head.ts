import { isUtf8 } from 'node:buffer';
import type { Readable } from 'node:stream';
import type { TextDialect } from '../../shared/schemas/mapping';
import { bomLength, TextReader, unfinishedTail } from './decode';
import { LineSplitter } from './lines';
import { unpackedChunks } from './unpack';
import { UnreadableFile } from './unreadable-file';

const HEAD_BYTES = 4 * 1024 * 1024;
const FIRST_BYTES = 512;
const LOOKED_AT_BYTES = 64 * 1024;
/** Text has none of these; so few may be slips that concern their row only. */
const MAX_NUL_SHARE = 0.001;
const MAX_CONTROL_SHARE = 0.05;

export interface HeadOptions {
  /** Largest size of the text of a packed file, in bytes. */
  maxUnpackedBytes: number;
  /** Parts of the dialect that are known, because a person has set them. */
  dialect?: Partial<TextDialect>;
}

/** The beginning of a file as lines. */
export interface FileHead {
  compression: TextDialect['compression'];
  encoding: TextDialect['encoding'];
  lines: string[];
  /** True when these are all lines of the file. */
  whole: boolean;
}

/** Reads at most the first 4 MiB of text of a stored file. Throws UnreadableFile for what is no text. */
export async function readHead(openStream: () => Readable, options: HeadOptions): Promise<FileHead> {
  const known = options.dialect ?? {};
  const first = await readStart(openStream(), FIRST_BYTES);
  if (first.bytes.length === 0) throw emptyFile('The file is empty.');
  const compression = known.compression ?? (isGzip(first.bytes) ? 'gzip' : 'none');
  const head = await readStart(unpackedChunks(openStream(), compression, options), HEAD_BYTES);
  refuseNoText(head.bytes);
  const encoding = known.encoding ?? guessEncoding(head.bytes);
  const lines = linesOf(head.bytes, encoding, head.whole);
  if (lines.every((line) => line.trim() === '')) throw emptyFile('The file holds nothing but blanks.');
  return { compression, encoding, lines, whole: head.whole };
}

/** The refusal of a file in which there is nothing to read. */
export function emptyFile(sentence: string): UnreadableFile {
  return new UnreadableFile(
    'file-empty',
    sentence,
    'Upload a table with a header and one row for each source.',
  );
}

async function readStart(
  chunks: AsyncIterable<unknown>,
  limit: number,
): Promise<{ bytes: Buffer; whole: boolean }> {
  const parts: Buffer[] = [];
  let length = 0;
  // Leaving the loop early closes the stream.
  for await (const chunk of chunks) {
    if (!(chunk instanceof Uint8Array)) throw new TypeError('a stored file must be read as bytes');
    parts.push(Buffer.from(chunk.buffer, chunk.byteOffset, chunk.byteLength));
    length += chunk.byteLength;
    if (length > limit) return { bytes: Buffer.concat(parts).subarray(0, limit), whole: false };
  }
  return { bytes: Buffer.concat(parts), whole: true };
}

function isGzip(bytes: Buffer): boolean {
  return bytes[0] === 0x1f && bytes[1] === 0x8b;
}

/** All lines, or the complete ones when the bytes are only the beginning of a file. */
function linesOf(bytes: Buffer, encoding: TextDialect['encoding'], whole: boolean): string[] {
  const text = new TextReader(encoding);
  const splitter = new LineSplitter();
  const { lines } = splitter.push(text.push(bytes, 1));
  if (!whole) return lines;
  const rest = splitter.push(text.end(splitter.line)).lines;
  return [...lines, ...rest, ...splitter.end().lines];
}

/** UTF-8 unless bytes say otherwise; a text with good UTF-8 characters and few bad bytes is UTF-8 with bad bytes. */
function guessEncoding(bytes: Buffer): TextDialect['encoding'] {
  const complete = bytes.subarray(0, bytes.length - unfinishedTail(bytes));
  if (isUtf8(complete) || bomLength(bytes) > 0) return 'utf-8';
  const decoded = complete.toString('utf8');
  const bad = decoded.match(/\ufffd/g)?.length ?? 0;
  const good = decoded.match(/[^\u0000-\u007f\ufffd]/gu)?.length ?? 0;
  return good > 4 * bad ? 'utf-8' : 'latin1';
}

const OTHER_KINDS: readonly (readonly [string, string, string])[] = [
  ['PK\u0003\u0004', 'a zip file or a spreadsheet', 'Save the table as CSV and upload that.'],
  ['%PDF-', 'a PDF document', 'Ask for the table as text.'],
  ['BZh', 'packed with bzip2', 'Unpack it, or pack it with gzip.'],
  ['\u00fd7zXZ', 'packed with xz', 'Unpack it, or pack it with gzip.'],
  ['(\u00b5/\u00fd', 'packed with zstd', 'Unpack it, or pack it with gzip.'],
  ['\u001f\u008b', 'a gzip file inside of a gzip file', 'Unpack it once and upload the result.'],
  ['SIMPLE  =', 'a FITS file', 'Export the table as CSV and upload that.'],
  ['<?xml', 'an XML document', 'Export the table as CSV and upload that.'],
  ['<!DOCTYPE', 'a web page', 'Save the table itself, as CSV.'],
  ['<html', 'a web page', 'Save the table itself, as CSV.'],
  ['{', 'a JSON document', 'Export the table as CSV and upload that.'],
];

function refuseNoText(bytes: Buffer): void {
  const start = bytes
    .subarray(bomLength(bytes), bomLength(bytes) + 16)
    .toString('latin1')
    .trimStart();
  const other = OTHER_KINDS.find(([sign]) => start.startsWith(sign));
  if (other !== undefined) throw binaryFile(`The file is ${other[1]}, not a text table.`, other[2]);
  if (isUtf16(bytes)) {
    throw new UnreadableFile(
      'file-encoding',
      'The file is text in UTF-16, which is not read here.',
      'Save it as UTF-8 (in a spreadsheet: “CSV UTF-8”).',
    );
  }
  const looked = bytes.subarray(0, LOOKED_AT_BYTES);
  const nuls = bytes.reduce((count, byte) => (byte === 0 ? count + 1 : count), 0);
  const controls = looked.reduce((count, byte) => (isControl(byte) ? count + 1 : count), 0);
  if (nuls > MAX_NUL_SHARE * bytes.length || controls > MAX_CONTROL_SHARE * looked.length) {
    throw binaryFile(
      'The file holds binary data, not a text table.',
      'Export the table as CSV and upload that.',
    );
  }
}

function binaryFile(sentence: string, hint: string): UnreadableFile {
  return new UnreadableFile('file-binary', sentence, hint);
}

function isControl(byte: number): boolean {
  return byte < 32 && byte !== 9 && byte !== 10 && byte !== 13 && byte !== 12;
}

/** A byte order mark of UTF-16 or UTF-32, or zero bytes in nearly every other place and only there. */
function isUtf16(bytes: Buffer): boolean {
  if ((bytes[0] === 0xff && bytes[1] === 0xfe) || (bytes[0] === 0xfe && bytes[1] === 0xff)) return true;
  const looked = bytes.subarray(0, LOOKED_AT_BYTES);
  const zeros = [0, 0];
  looked.forEach((byte, at) => {
    if (byte === 0) zeros[at % 2] = (zeros[at % 2] ?? 0) + 1;
  });
  const [even = 0, odd = 0] = zeros;
  return Math.max(even, odd) > 0.4 * (looked.length / 2) && Math.min(even, odd) < 0.05 * (looked.length / 2);
}
