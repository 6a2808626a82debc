import { readFirstRows } from './first-rows';
import type { BenchServer } from './bench-server';
import type { Figure } from './figure';
import { bigTablePath } from './import-figures';

const CLIENTS = 8;
const REQUESTS = 4000;
const WARM_UP = 400;
const GOAL_MS = 20;

/** Name and cone searches over the registry of a million objects, eight clients at once, timed at the client. */
export async function searchFigures(server: BenchServer): Promise<Figure[]> {
  const rows = readFirstRows(bigTablePath(server), REQUESTS);
  const byName = rows.map((row) => server.api(`find?q=${encodeURIComponent(row.name)}`));
  const byCone = rows.map((row) => server.api(`objects?ra=${row.ra}&dec=${row.dec}&radiusArcsec=10`));
  const floor = rows.map(() => '/healthz');
  const floorMs = percentile99(await timings(server, floor));
  return [
    figure('search-name-p99', 'exact name in the find field', percentile99(await timings(server, byName)), floorMs),
    figure('search-cone-p99', 'cone of 10 arcsec on the registry', percentile99(await timings(server, byCone)), floorMs),
  ];
}

function figure(name: string, what: string, valueMs: number, floorMs: number): Figure {
  return {
    name,
    data: `${what}; 1,000,000 objects, ${CLIENTS} clients, ${REQUESTS} requests at different places`,
    value: valueMs,
    unit: 'ms p99',
    baseline: 'p99 of an answer without any work (GET /healthz), the same clients (ms)',
    baselineValue: floorMs,
    ratio: valueMs / floorMs,
    goal: `<= ${GOAL_MS} ms`,
    met: valueMs <= GOAL_MS,
    repeat: `npm run bench -- --only ${name}`,
  };
}

async function timings(server: BenchServer, paths: string[]): Promise<number[]> {
  await oneRound(server, paths.slice(0, WARM_UP));
  return oneRound(server, paths);
}

async function oneRound(server: BenchServer, paths: string[]): Promise<number[]> {
  const times: number[] = [];
  let next = 0;
  const client = async () => {
    for (let i = next++; i < paths.length; i = next++) {
      const begin = performance.now();
      const answer = await server.fetch(paths[i] ?? '');
      await answer.arrayBuffer();
      if (!answer.ok) throw new Error(`${answer.status} ${paths[i]}`);
      times.push(performance.now() - begin);
    }
  };
  await Promise.all(Array.from({ length: CLIENTS }, client));
  return times;
}

function percentile99(times: number[]): number {
  const sorted = [...times].sort((a, b) => a - b);
  return sorted[Math.floor(sorted.length * 0.99)] ?? Number.NaN;
}
