import { coneJoin } from '../../server/engine/cone-join';
import { buildConeIndex } from '../../server/engine/cone-index';
import type { PositionColumns } from '../../server/engine/positions';
import { samplePair, seededRandom } from '../../server/engine/sample-skies';
import { separationArcsec } from '../../shared/astro/sphere';
import type { Figure } from './figure';

const ROWS = 1_000_000;
const SEED = 20;
const JOIN_RADIUS_ARCSEC = 2;
const JOIN_RUNS = 5;
const JOIN_WARM_UP = 5;
const JOIN_GOAL_RATIO = 1.8;
const CONE_RADIUS_ARCSEC = 60;
const CONES = 2000;
const SCANS = 5;
const CONE_GOAL_RATIO = 0.01;

/** Figures of the engine alone, in this process: no database, no files, one thread. */
export async function engineFigures(): Promise<Figure[]> {
  const sky = samplePair('uniform', ROWS, 0.3, SEED);
  // Lets what waits in the event loop (output of earlier figures) finish before the clock runs.
  await new Promise((resolve) => setImmediate(resolve));
  return [joinFigure(sky.a, sky.b), coneFigure(sky.b)];
}

/** The join beside one plain sort of as many numbers: the ratio hardly depends on the machine. */
function joinFigure(a: PositionColumns, b: PositionColumns): Figure {
  const random = seededRandom(SEED + 1);
  const keys = Float64Array.from({ length: ROWS }, random);
  for (let run = 0; run < JOIN_WARM_UP; run += 1) {
    coneJoin(a, b, JOIN_RADIUS_ARCSEC);
    keys.slice().sort();
  }
  const joins: number[] = [];
  const sorts: number[] = [];
  let pairs = 0;
  // In turns, so that a busy neighbour on the machine slows both.
  for (let run = 0; run < JOIN_RUNS; run += 1) {
    joins.push(secondsOf(() => (pairs = coneJoin(a, b, JOIN_RADIUS_ARCSEC).a.length)));
    const unsorted = keys.slice();
    sorts.push(secondsOf(() => unsorted.sort()));
  }
  const value = median(joins);
  const baselineValue = median(sorts);
  return {
    name: 'engine-cone-match',
    data: `${ROWS} x ${ROWS} rows, uniform sky, ${JOIN_RADIUS_ARCSEC} arcsec, ${pairs} pairs; one thread, median of ${JOIN_RUNS}`,
    value,
    unit: 's',
    baseline: `Float64Array.sort of ${ROWS} random keys in the same process (s)`,
    baselineValue,
    ratio: value / baselineValue,
    goal: `ratio <= ${JOIN_GOAL_RATIO}`,
    met: value / baselineValue <= JOIN_GOAL_RATIO,
    repeat: 'npm run bench -- --only engine-cone-match',
  };
}

/** The slowest 1 % of single cones beside looking at every row. */
function coneFigure(rows: PositionColumns): Figure {
  const index = buildConeIndex(rows);
  const random = seededRandom(SEED + 2);
  const centres = Array.from({ length: CONES }, () => Math.floor(random() * ROWS));
  const cone = (row: number): number =>
    index.cone(rows.raDeg[row] ?? NaN, rows.decDeg[row] ?? NaN, CONE_RADIUS_ARCSEC).rows.length;
  let found = 0;
  for (const row of centres) found += cone(row);
  const times = centres.map((row) => secondsOf(() => cone(row))).sort((one, two) => one - two);
  const value = (times[Math.ceil(CONES * 0.99) - 1] ?? NaN) * 1e6;
  const scans = centres.slice(0, SCANS + 1).map((row) => secondsOf(() => scan(rows, row)));
  const baselineValue = median(scans.slice(1)) * 1e6;
  return {
    name: 'engine-cone-p99',
    data: `${CONES} cones of ${CONE_RADIUS_ARCSEC} arcsec on ${ROWS} rows, ${found} rows found; in process`,
    value,
    unit: 'microseconds (p99)',
    baseline: `separation from every row, median of ${SCANS} (microseconds)`,
    baselineValue,
    ratio: value / baselineValue,
    goal: `ratio <= ${CONE_GOAL_RATIO}`,
    met: value / baselineValue <= CONE_GOAL_RATIO,
    repeat: 'npm run bench -- --only engine-cone-p99',
  };
}

function scan({ raDeg, decDeg }: PositionColumns, centre: number): number {
  const ra = raDeg[centre] ?? NaN;
  const dec = decDeg[centre] ?? NaN;
  let found = 0;
  for (let row = 0; row < raDeg.length; row += 1) {
    if (separationArcsec(ra, dec, raDeg[row] ?? NaN, decDeg[row] ?? NaN) <= CONE_RADIUS_ARCSEC) found += 1;
  }
  return found;
}

function secondsOf(work: () => unknown): number {
  const begin = performance.now();
  work();
  return (performance.now() - begin) / 1000;
}

function median(values: readonly number[]): number {
  const sorted = [...values].sort((one, two) => one - two);
  return sorted[Math.floor(sorted.length / 2)] ?? NaN;
}
