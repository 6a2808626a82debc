import type { UnreadableFileCode } from '../../shared/schemas/mapping';

/**
 * A file that can't be read as a table at all. The message is one sentence for people; `hint` says what to do;
 * `line` is the line of the file (counted from 1) when the trouble has a place.
 */
export class UnreadableFile extends Error {
  readonly code: UnreadableFileCode;
  readonly hint: string;
  readonly line: number | null;

  constructor(code: UnreadableFileCode, message: string, hint: string, line: number | null = null) {
    super(message);
    this.name = 'UnreadableFile';
    this.code = code;
    this.hint = hint;
    this.line = line;
  }
}
