import { readFileSync } from 'node:fs';
import path from 'node:path';
import { gzipSync } from 'node:zlib';
import { build } from 'vite';
import type { Figure } from './figure';

const GOAL_BYTES = 200_000;

/** Gzip size of the JavaScript a browser loads before any lazy page: the entry and what it imports or preloads. */
export async function clientFigures(): Promise<Figure[]> {
  await build({ logLevel: 'silent' });
  const dist = path.join(import.meta.dirname, '..', '..', 'dist', 'client');
  const page = readFileSync(path.join(dist, 'index.html'), 'utf8');
  const scripts = [...page.matchAll(/(?:src|href)="\/([^"]+\.js)"/g)].map((match) => match[1] ?? '');
  const plainBytes = scripts.reduce((sum, name) => sum + readFileSync(path.join(dist, name)).byteLength, 0);
  const gzipBytes = scripts.reduce((sum, name) => sum + gzipSync(readFileSync(path.join(dist, name))).byteLength, 0);
  return [
    {
      name: 'client-first-load',
      data: `scripts named by the built page: ${scripts.length} files`,
      value: gzipBytes / 1000,
      unit: 'kB gzip',
      baseline: 'the same files unpacked (kB)',
      baselineValue: plainBytes / 1000,
      ratio: gzipBytes / plainBytes,
      goal: `<= ${GOAL_BYTES / 1000} kB`,
      met: gzipBytes <= GOAL_BYTES,
      repeat: 'npm run bench -- --only client-first-load',
    },
  ];
}
