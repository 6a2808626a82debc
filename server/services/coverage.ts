import { healpixCellAreaDeg2, healpixCentre } from '../../shared/astro/healpix';
import type { Coverage } from '../../shared/schemas/catalogue';
import { coarserCoverage, coverageOf } from '../engine/coverage';

/** Cells of 1.7 arcmin: as fine as a picture of a single field needs. */
const FINEST_ORDER = 11;
/** So many squares a picture draws at once without effort. */
const MAX_CELLS = 1000;

/** Density squares of positions: HEALPix cells as fine as their number allows (Górski et al. 2005). */
export function coveragePicture(raDeg: Float64Array, decDeg: Float64Array): Coverage {
  let coverage = coverageOf({ raDeg, decDeg }, FINEST_ORDER);
  while (coverage.cells.length > MAX_CELLS && coverage.order > 0) coverage = coarserCoverage(coverage);
  const cellAreaDeg2 = healpixCellAreaDeg2(coverage.order);
  return {
    cellSizeDeg: Math.sqrt(cellAreaDeg2),
    areaDeg2: cellAreaDeg2 * coverage.cells.length,
    cells: Array.from(coverage.cells, (cell, i) => ({
      ...healpixCentre(coverage.order, cell),
      count: coverage.counts[i] ?? 0,
    })),
  };
}
