import { once } from 'node:events';
import { createReadStream, createWriteStream } from 'node:fs';
import { createInterface } from 'node:readline';
import { finished } from 'node:stream/promises';
import { randomFrom, type Random } from './random';

export interface BigTable {
  rows: number;
  seed: number;
  /** A table of the same kind: 60 % of the rows are its rows, moved by 0.3 arcsec per axis, the rest are independent. */
  copyOf?: string;
}

/** The twelve columns of a big table. */
export const BIG_TABLE_HEADER = 'id,name,ra,dec,err,gmag,gmag_err,rmag,rmag_err,imag,imag_err,flag';

const COPIED_SHARE = 0.6;
const SCATTER_DEG = 0.3 / 3600;
const CHUNK_ROWS = 2000;
const DEGREES = 180 / Math.PI;

/** Writes a CSV table of invented sources all over the sky, for measurements; constant memory. */
export async function writeBigTable(path: string, table: BigTable): Promise<void> {
  const random = randomFrom(table.seed);
  const out = createWriteStream(path, { highWaterMark: 1 << 20 });
  out.write(`${BIG_TABLE_HEADER}\n`);
  const copied = table.copyOf === undefined ? null : positionsOf(table.copyOf);
  const prefix = table.copyOf === undefined ? 'A' : 'B';
  let chunk = '';
  for (let i = 0; i < table.rows; i += 1) {
    const place = copied === null ? null : (await copied.next()).value;
    chunk += row(random, `${prefix}${i}`, `BIG${prefix} ${String(i).padStart(8, '0')}`, place ?? null);
    if (i % CHUNK_ROWS === CHUNK_ROWS - 1) {
      if (!out.write(chunk)) await once(out, 'drain');
      chunk = '';
    }
  }
  await copied?.return(undefined);
  out.end(chunk);
  await finished(out);
}

interface Place {
  raDeg: number;
  decDeg: number;
}

async function* positionsOf(path: string): AsyncGenerator<Place, undefined> {
  const lines = createInterface({ input: createReadStream(path) });
  let header = true;
  for await (const line of lines) {
    if (!header) {
      const cells = line.split(',');
      yield { raDeg: Number(cells[2]), decDeg: Number(cells[3]) };
    }
    header = false;
  }
  return undefined;
}

function row(random: Random, id: string, name: string, like: Place | null): string {
  const copied = like !== null && random.chance(COPIED_SHARE);
  let raDeg = random.next() * 360;
  let decDeg = Math.asin(2 * random.next() - 1) * DEGREES;
  if (copied) {
    decDeg = Math.max(-90, Math.min(90, like.decDeg + random.normal() * SCATTER_DEG));
    raDeg = (like.raDeg + (random.normal() * SCATTER_DEG) / Math.cos(decDeg / DEGREES) + 360) % 360;
  }
  const magnitude = 14 + 9 * Math.sqrt(random.next());
  const bands = [magnitude, magnitude - 0.6 * random.next(), magnitude - 1.1 * random.next()].map(
    (value) => `${value.toFixed(3)},${(0.01 + 0.2 * random.next()).toFixed(3)}`,
  );
  const error = (0.05 + 0.3 * random.next()).toFixed(3);
  const flag = random.chance(0.1) ? 'b' : '';
  return `${id},${name},${raDeg.toFixed(7)},${decDeg.toFixed(7)},${error},${bands.join(',')},${flag}\n`;
}
