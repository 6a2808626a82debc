/** Where on the sky a catalogue has sources: counts in equal-area cells (HEALPix, nested). */
import { healpixCell, MAX_HEALPIX_ORDER } from '../../shared/astro/healpix';
import { checkPositions, type PositionColumns } from './positions';

/** Cells that hold sources, ascending by their nested number. */
export interface Coverage {
  readonly order: number;
  readonly cells: Uint32Array;
  readonly counts: Uint32Array;
}

/** Counts per cell at an order 0..14. Throws RangeError for the order or positions off the sky. */
export function coverageOf(positions: PositionColumns, order: number): Coverage {
  checkPositions('positions', positions);
  if (!Number.isInteger(order) || order < 0 || order > MAX_HEALPIX_ORDER) {
    throw new RangeError(`order must be an integer 0..${MAX_HEALPIX_ORDER}, not ${order}`);
  }
  const { raDeg, decDeg } = positions;
  const cellOfRow = new Uint32Array(raDeg.length);
  for (let row = 0; row < raDeg.length; row += 1) {
    cellOfRow[row] = healpixCell(order, raDeg[row] ?? NaN, decDeg[row] ?? NaN);
  }
  cellOfRow.sort();
  return countRuns(order, cellOfRow, null);
}

/** The same sky one order coarser: four cells become one. */
export function coarserCoverage({ order, cells, counts }: Coverage): Coverage {
  if (order === 0) throw new RangeError('order 0 has no coarser one');
  return countRuns(
    order - 1,
    cells.map((cell) => cell >>> 2),
    counts,
  );
}

/** Adds up runs of equal cells in an ascending list; without weights each item counts one. */
function countRuns(order: number, ascending: Uint32Array, weights: Uint32Array | null): Coverage {
  const cells = new Uint32Array(ascending.length);
  const counts = new Uint32Array(ascending.length);
  let used = 0;
  for (let item = 0; item < ascending.length; item += 1) {
    const cell = ascending[item] as number;
    if (used === 0 || cells[used - 1] !== cell) {
      cells[used] = cell;
      used += 1;
    }
    counts[used - 1] = (counts[used - 1] as number) + (weights ? (weights[item] as number) : 1);
  }
  return { order, cells: cells.slice(0, used), counts: counts.slice(0, used) };
}
