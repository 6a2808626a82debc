/** Innermost part of the join: rows of A against the cells of one grid. */
import { separationArcsec } from '../../shared/astro/sphere';
import { RECORD_SIZE } from './join-buckets';
import { cellIn, zoneIn, type JoinGrid } from './join-grid';
import {
  paddedHalfWidthDeg,
  SERIES_LIMIT_DEG,
  separationOfSmallHaversine,
  smallHaversine,
  type JoinRadius,
} from './join-radius';
import { growPairBuffer, type PairBuffer } from './pair-columns';

/**
 * Appends the pairs of records `from` to `to` of A with the grid's records of B. A window of RA that runs over 0/360
 * is scanned in two parts. In each part the RA difference is taken without wrapping, so no row of B can pass in both.
 * Returns the record to go on with: `to`, or an earlier one when there are `enough` pairs already.
 */
export function scanRows(
  aRecords: Float64Array,
  from: number,
  to: number,
  grid: JoinGrid,
  radius: JoinRadius,
  pairs: PairBuffer,
  enough: number,
): number {
  const { zoneHalfWidth, cellStart, records, cells, decMin, zonesPerDeg, zones } = grid;
  const { raMin, sectorsPerDeg, firstCell, cellsOfSector } = grid;
  const { paddedDeg } = radius;
  for (let at = from * RECORD_SIZE; at < to * RECORD_SIZE; at += RECORD_SIZE) {
    if (pairs.length >= enough) return at / RECORD_SIZE;
    const ra = aRecords[at] as number;
    const dec = aRecords[at + 1] as number;
    const zone = zoneIn(dec, decMin, zonesPerDeg, zones);
    const halfOfZone = zoneHalfWidth[zone] as number;
    const halfWidth = halfOfZone > 0 ? halfOfZone : paddedHalfWidthDeg(radius, dec);
    const low = ra - halfWidth;
    const high = ra + halfWidth;
    if (low < 0 || high >= 360) {
      scanAcrossZero(ra, dec, aRecords[at + 2] as number, halfWidth, zone, grid, radius, pairs);
      continue;
    }
    const zoneStart = zone * cells;
    const lastCell = cellIn(high, raMin, sectorsPerDeg, cells, firstCell, cellsOfSector);
    const firstOwn = cellIn(low, raMin, sectorsPerDeg, cells, firstCell, cellsOfSector);
    const stop = cellStart[zoneStart + lastCell + 1] as number;
    for (let place = cellStart[zoneStart + firstOwn] as number; place < stop; place += 1) {
      const other = place * RECORD_SIZE;
      const dDec = (records[other + 1] as number) - dec;
      if (dDec > paddedDeg || dDec < -paddedDeg) continue;
      const dRa = (records[other] as number) - ra;
      if (dRa > halfWidth || dRa < -halfWidth) continue;
      testPair(ra, dec, aRecords[at + 2] as number, dRa, dDec, records, other, radius, pairs);
    }
  }
  return to;
}

/** The same for a row whose window holds RA 0, or every RA. */
function scanAcrossZero(
  ra: number,
  dec: number,
  row: number,
  halfWidth: number,
  zone: number,
  grid: JoinGrid,
  radius: JoinRadius,
  pairs: PairBuffer,
): void {
  if (halfWidth >= 180) {
    scanWindow(ra, dec, row, 0, -1, 361, 361, zone, grid, radius, pairs);
    return;
  }
  const low = ra - halfWidth;
  const high = ra + halfWidth;
  scanWindow(ra, dec, row, 0, low, high, halfWidth, zone, grid, radius, pairs);
  // 360 is taken off the larger of the two right ascensions: that difference is exact.
  if (low < 0) scanWindow(ra, dec, row, 360, low + 360, 361, halfWidth, zone, grid, radius, pairs);
  if (high >= 360) scanWindow(ra - 360, dec, row, 0, -1, high - 360, halfWidth, zone, grid, radius, pairs);
}

/** Records of one zone with RA between `low` and `high`; `shift` is taken off the RA of B before the difference. */
function scanWindow(
  ra: number,
  dec: number,
  row: number,
  shift: number,
  low: number,
  high: number,
  halfWidth: number,
  zone: number,
  grid: JoinGrid,
  radius: JoinRadius,
  pairs: PairBuffer,
): void {
  const { records, cellStart, cells, raMin, sectorsPerDeg, firstCell, cellsOfSector } = grid;
  const zoneStart = zone * cells;
  const lastCell = cellIn(high, raMin, sectorsPerDeg, cells, firstCell, cellsOfSector);
  const firstOwn = cellIn(low, raMin, sectorsPerDeg, cells, firstCell, cellsOfSector);
  const stop = cellStart[zoneStart + lastCell + 1] as number;
  for (let place = cellStart[zoneStart + firstOwn] as number; place < stop; place += 1) {
    const other = place * RECORD_SIZE;
    const dDec = (records[other + 1] as number) - dec;
    if (dDec > radius.paddedDeg || dDec < -radius.paddedDeg) continue;
    const dRa = (records[other] as number) - shift - ra;
    if (dRa > halfWidth || dRa < -halfWidth) continue;
    testPair(ra, dec, row, dRa, dDec, records, other, radius, pairs);
  }
}

/** Takes or leaves a pair that passed the filters; the record of B begins at `other`, differences are B minus A. */
function testPair(
  ra: number,
  dec: number,
  row: number,
  dRa: number,
  dDec: number,
  records: Float64Array,
  other: number,
  radius: JoinRadius,
  pairs: PairBuffer,
): void {
  let sepArcsec: number;
  const near = dRa < SERIES_LIMIT_DEG && dRa > -SERIES_LIMIT_DEG;
  const haversine = near ? smallHaversine(dRa, dDec, dec + dDec / 2) : radius.insideHaversine;
  if (haversine > radius.outsideHaversine) return;
  if (haversine < radius.insideHaversine) {
    sepArcsec = separationOfSmallHaversine(haversine);
  } else {
    sepArcsec = separationArcsec(ra, dec, records[other] as number, records[other + 1] as number);
    if (!(sepArcsec <= radius.arcsec)) return;
  }
  if (pairs.length === pairs.a.length) growPairBuffer(pairs);
  const slot = pairs.length;
  pairs.a[slot] = row;
  pairs.b[slot] = records[other + 2] as number;
  pairs.sepArcsec[slot] = sepArcsec;
  pairs.length = slot + 1;
}
