import { createWriteStream, existsSync, mkdirSync, renameSync, statSync, type WriteStream } from 'node:fs';
import path from 'node:path';

const LIMIT_BYTES = 20 * 1024 * 1024;

export interface LogFile {
  file: string;
  writeLine(line: string): void;
}

/** A log that is appended to; at 20 MiB it moves to `<file>.1`, so that two files are all there ever are. */
export function openLogFile(file: string): LogFile {
  mkdirSync(path.dirname(file), { recursive: true, mode: 0o700 });
  let sizeBytes = existsSync(file) ? statSync(file).size : 0;
  let stream = open();

  function open(): WriteStream {
    const opened = createWriteStream(file, { flags: 'a', mode: 0o600 });
    // A full disk must not end the installation; what the children say is then lost.
    opened.on('error', () => undefined);
    return opened;
  }
  return {
    file,
    writeLine(line) {
      if (sizeBytes > LIMIT_BYTES) {
        stream.end();
        renameSync(file, `${file}.1`);
        sizeBytes = 0;
        stream = open();
      }
      sizeBytes += Buffer.byteLength(line) + 1;
      stream.write(`${line}\n`);
    },
  };
}
