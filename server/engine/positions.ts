/** Position columns, the input of everything in this folder, and the checks at its door. */

/** One row per source: right ascension 0..360 and declination -90..90, degrees. The row number is the id. */
export interface PositionColumns {
  readonly raDeg: Float64Array;
  readonly decDeg: Float64Array;
}

/** The smallest box that holds some positions, degrees. Infinities for no positions at all. */
export interface PositionRange {
  raMin: number;
  raMax: number;
  decMin: number;
  decMax: number;
}

/**
 * Throws RangeError, with name, value and index, for columns of unequal length or positions that are not on the sky.
 * Returns their range, which costs nothing more.
 */
export function checkPositions(name: string, { raDeg, decDeg }: PositionColumns): PositionRange {
  if (raDeg.length !== decDeg.length) {
    throw new RangeError(`${name}: raDeg has ${raDeg.length} rows, decDeg has ${decDeg.length}`);
  }
  let raMin = Infinity;
  let raMax = -Infinity;
  let decMin = Infinity;
  let decMax = -Infinity;
  for (let row = 0; row < raDeg.length; row += 1) {
    const ra = raDeg[row] as number;
    const dec = decDeg[row] as number;
    // Written so that NaN fails.
    if (!(ra >= 0 && ra <= 360)) throw new RangeError(`${name}.raDeg[${row}] must be 0..360, not ${ra}`);
    if (!(dec >= -90 && dec <= 90))
      throw new RangeError(`${name}.decDeg[${row}] must be -90..90, not ${dec}`);
    if (ra < raMin) raMin = ra;
    if (ra > raMax) raMax = ra;
    if (dec < decMin) decMin = dec;
    if (dec > decMax) decMax = dec;
  }
  return { raMin, raMax, decMin, decMax };
}

/** Throws RangeError for a radius (arcsec) that is not above 0 and at most `maxArcsec`. */
export function checkRadius(radiusArcsec: number, maxArcsec: number): void {
  if (!(radiusArcsec > 0 && radiusArcsec <= maxArcsec)) {
    throw new RangeError(`radiusArcsec must be above 0 and at most ${maxArcsec}, not ${radiusArcsec}`);
  }
}
