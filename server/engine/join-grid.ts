/**
 * Second level of the join: inside one bucket, rows of B lie in cells of a local grid, cell by cell in one array.
 * Declination zones are equally high. RA cells hold about equally many rows: the RA range is cut into sectors, each
 * with as many cells as its share of rows, so that clumps and empty sky cost nothing.
 */
import { cosDeg } from '../../shared/astro/sphere';
import { RECORD_SIZE } from './join-buckets';
import { paddedHalfWidthDeg, type JoinRadius } from './join-radius';

const SECTORS = 512;
/** So many rows of a bucket are enough to see how they spread over the sectors. */
const SAMPLE_ROWS = 4096;
const CELLS_PER_ROW = 1.5;
const MAX_ZONES = 8192;
/** A zone is at least this many radii high, so that few rows of B touch two zones. */
const MIN_ZONE_IN_RADII = 8;
/** Beyond this declination one half width for a whole zone is too coarse: NaN in `zoneHalfWidth` asks for one per row. */
const POLAR_DEC_DEG = 85;

/** A grid and its memory, which the next bucket uses again. */
export interface JoinGrid {
  decMin: number;
  zonesPerDeg: number;
  zones: number;
  /** RA where the sectors begin and how many there are in a degree: the same for all buckets of a join. */
  readonly raMin: number;
  readonly sectorsPerDeg: number;
  /** Cells of one zone. */
  cells: number;
  readonly firstCell: Int32Array;
  readonly cellsOfSector: Int32Array;
  readonly rowsInSector: Int32Array;
  readonly zoneHalfWidth: Float64Array;
  /** Records of cell i are `cellStart[i]` to `cellStart[i + 1]` in `records`. */
  cellStart: Int32Array;
  records: Float64Array;
  /** Per row of the bucket: its first cell, and how many zones further it reaches. */
  slotOfRow: Int32Array;
  moreZones: Uint16Array;
}

/** An empty grid for rows of B between two right ascensions (degrees). */
export function createJoinGrid(raMin: number, raMax: number): JoinGrid {
  return {
    decMin: 0,
    zonesPerDeg: 0,
    zones: 0,
    raMin,
    sectorsPerDeg: raMax > raMin ? SECTORS / (raMax - raMin) : 0,
    cells: 0,
    firstCell: new Int32Array(SECTORS),
    cellsOfSector: new Int32Array(SECTORS),
    rowsInSector: new Int32Array(SECTORS),
    zoneHalfWidth: new Float64Array(MAX_ZONES),
    cellStart: new Int32Array(0),
    records: new Float64Array(0),
    slotOfRow: new Int32Array(0),
    moreZones: new Uint16Array(0),
  };
}

/**
 * Zone of a declination, clamped; it never falls when the declination grows. This and `cellIn` take plain numbers
 * rather than the grid, so that loops read its fields once and not for every row.
 */
export function zoneIn(dec: number, decMin: number, zonesPerDeg: number, zones: number): number {
  const zone = ((dec - decMin) * zonesPerDeg) | 0;
  return zone < 0 ? 0 : zone >= zones ? zones - 1 : zone;
}

/** Cell (within its zone) of a right ascension, clamped; it never falls when the right ascension grows. */
export function cellIn(
  ra: number,
  raMin: number,
  sectorsPerDeg: number,
  cells: number,
  firstCell: Int32Array,
  cellsOfSector: Int32Array,
): number {
  const place = (ra - raMin) * sectorsPerDeg;
  if (place <= 0) return 0;
  if (place >= SECTORS) return cells - 1;
  const sector = place | 0;
  const cell = (firstCell[sector] as number) + (((place - sector) * (cellsOfSector[sector] as number)) | 0);
  return cell < cells ? cell : cells - 1;
}

/** Fills the grid with records `from` to `to` of B, for rows of A between two declinations. */
export function fillJoinGrid(
  grid: JoinGrid,
  bRecords: Float64Array,
  from: number,
  to: number,
  aDecMin: number,
  aDecMax: number,
  radius: JoinRadius,
): void {
  const rows = to - from;
  const occupied = sampleSectors(grid, bRecords, from, to);
  shapeZones(grid, occupied, rows, aDecMin, aDecMax, radius);
  shareCells(grid, Math.ceil((CELLS_PER_ROW * rows) / grid.zones), rows);
  makeRoom(grid, rows);
  countCells(grid, bRecords, from, to, radius.paddedDeg);
  placeRecords(grid, bRecords, from, to);
}

/** Rows in each sector, from a sample; returns the width in RA (degrees) of the sectors that are not empty. */
function sampleSectors(grid: JoinGrid, bRecords: Float64Array, from: number, to: number): number {
  const { rowsInSector, raMin, sectorsPerDeg } = grid;
  rowsInSector.fill(0);
  const stride = Math.max(1, Math.floor((to - from) / SAMPLE_ROWS));
  for (let at = from * RECORD_SIZE; at < to * RECORD_SIZE; at += RECORD_SIZE * stride) {
    const place = (((bRecords[at] as number) - raMin) * sectorsPerDeg) | 0;
    const sector = place < SECTORS ? place : SECTORS - 1;
    rowsInSector[sector] = (rowsInSector[sector] as number) + stride;
  }
  let occupied = 0;
  for (let sector = 0; sector < SECTORS; sector += 1) if ((rowsInSector[sector] as number) > 0) occupied += 1;
  return sectorsPerDeg > 0 ? occupied / sectorsPerDeg : 0;
}

function shapeZones(
  grid: JoinGrid,
  occupiedRaDeg: number,
  rows: number,
  aDecMin: number,
  aDecMax: number,
  radius: JoinRadius,
): void {
  const heightDeg = aDecMax - aDecMin;
  const widthDeg = Math.max(occupiedRaDeg * cosDeg((aDecMin + aDecMax) / 2), 2 * radius.paddedDeg);
  const squareCell = Math.sqrt((heightDeg * widthDeg) / rows);
  const zoneHeight = Math.max(squareCell, MIN_ZONE_IN_RADII * radius.paddedDeg);
  grid.decMin = aDecMin;
  grid.zones = Math.max(1, Math.min(MAX_ZONES, Math.floor(heightDeg / zoneHeight)));
  grid.zonesPerDeg = heightDeg > 0 ? grid.zones / heightDeg : 0;
  for (let zone = 0; zone < grid.zones; zone += 1) {
    const middle = aDecMin + (zone + 0.5) * (heightDeg / grid.zones);
    // A little further than the edge itself, which is subject to rounding.
    const farEdge = Math.abs(middle) + (heightDeg / grid.zones) * 0.5 + radius.paddedDeg * 1e-3;
    grid.zoneHalfWidth[zone] = farEdge > POLAR_DEC_DEG ? NaN : paddedHalfWidthDeg(radius, farEdge);
  }
}

/** Gives each sector that has rows its share of `wanted` cells, at least one. */
function shareCells(grid: JoinGrid, wanted: number, rows: number): void {
  const { rowsInSector, firstCell, cellsOfSector } = grid;
  const cellsPerRow = wanted / rows;
  let cells = 0;
  let owed = 0;
  for (let sector = 0; sector < SECTORS; sector += 1) {
    // What one sector gets too little, the next one gets: few wanted cells may span several sectors.
    owed += (rowsInSector[sector] as number) * cellsPerRow;
    const own = owed | 0;
    owed -= own;
    firstCell[sector] = cells;
    cellsOfSector[sector] = own;
    cells += own;
  }
  grid.cells = cells + 1;
}

function makeRoom(grid: JoinGrid, rows: number): void {
  const tableSize = grid.zones * grid.cells + 2;
  if (grid.cellStart.length < tableSize) grid.cellStart = new Int32Array(tableSize * 2);
  else grid.cellStart.fill(0, 0, tableSize);
  if (grid.slotOfRow.length < rows) {
    grid.slotOfRow = new Int32Array(rows * 2);
    grid.moreZones = new Uint16Array(rows * 2);
  }
}

/**
 * First half of a counting sort; a row counts in every zone that its declination +- the radius touches.
 * Counts stand two places further on: after the sums, cellStart[i + 1] is where cell i is filled next, and when all is
 * filled, cellStart[i] is where cell i begins.
 */
function countCells(grid: JoinGrid, bRecords: Float64Array, from: number, to: number, haloDeg: number): void {
  const { cellStart, cells, slotOfRow, moreZones, decMin, zonesPerDeg, zones } = grid;
  const { raMin, sectorsPerDeg, firstCell, cellsOfSector } = grid;
  for (let row = from, at = from * RECORD_SIZE; row < to; row += 1, at += RECORD_SIZE) {
    const dec = bRecords[at + 1] as number;
    const first = zoneIn(dec - haloDeg, decMin, zonesPerDeg, zones);
    const last = zoneIn(dec + haloDeg, decMin, zonesPerDeg, zones);
    const cell = cellIn(bRecords[at] as number, raMin, sectorsPerDeg, cells, firstCell, cellsOfSector);
    const slot = first * cells + cell;
    slotOfRow[row - from] = slot;
    moreZones[row - from] = last - first;
    for (let zone = first, of = slot + 2; zone <= last; zone += 1, of += cells) {
      cellStart[of] = (cellStart[of] as number) + 1;
    }
  }
  const end = zones * cells + 2;
  let sum = 0;
  for (let slot = 2; slot < end; slot += 1) {
    sum += cellStart[slot] as number;
    cellStart[slot] = sum;
  }
}

/** Second half: every record to its cells. */
function placeRecords(grid: JoinGrid, bRecords: Float64Array, from: number, to: number): void {
  const { cellStart, cells, slotOfRow, moreZones } = grid;
  const total = (cellStart[grid.zones * cells + 1] as number) * RECORD_SIZE;
  if (grid.records.length < total) grid.records = new Float64Array(total * 2);
  const { records } = grid;
  for (let row = from, at = from * RECORD_SIZE; row < to; row += 1, at += RECORD_SIZE) {
    let slot = (slotOfRow[row - from] as number) + 1;
    for (let more = moreZones[row - from] as number; more >= 0; more -= 1, slot += cells) {
      const place = cellStart[slot] as number;
      cellStart[slot] = place + 1;
      const target = place * RECORD_SIZE;
      records[target] = bRecords[at] as number;
      records[target + 1] = bRecords[at + 1] as number;
      records[target + 2] = bRecords[at + 2] as number;
    }
  }
}
