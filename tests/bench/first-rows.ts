import { closeSync, openSync, readSync } from 'node:fs';

const HEAD_BYTES = 4 * 1024 * 1024;

/** Name, RA and Dec of the first rows of a big table, by the names of its columns. */
export function readFirstRows(file: string, count: number): { name: string; ra: string; dec: string }[] {
  const buffer = Buffer.alloc(HEAD_BYTES);
  const descriptor = openSync(file, 'r');
  const length = readSync(descriptor, buffer);
  closeSync(descriptor);
  const [header = '', ...lines] = buffer.toString('utf8', 0, length).split('\n');
  const names = header.trim().split(',');
  const at = { name: names.indexOf('name'), ra: names.indexOf('ra'), dec: names.indexOf('dec') };
  if (at.name < 0 || at.ra < 0 || at.dec < 0) throw new Error(`no name, ra and dec in: ${header}`);
  return lines.slice(0, count).map((line) => {
    const cells = line.split(',');
    return { name: cells[at.name] ?? '', ra: cells[at.ra] ?? '', dec: cells[at.dec] ?? '' };
  });
}
