import { raErrorArcsec, sigmaFromRadiusArcsec } from '../../shared/astro/errors';
import { cosDeg } from '../../shared/astro/sphere';
import type { ColumnMapping, UnderstoodRow } from '../../shared/schemas/mapping';
import { readNumber } from './number-text';
import { shownCell } from './shown-text';
import type { Refusal, Step, TableShape } from './understand';
import { checkColumns, inColumn } from './understand-position';

type ErrorMapping = NonNullable<ColumnMapping['error']>;
type Of<K extends ErrorMapping['kind']> = Extract<ErrorMapping, { kind: K }>;

const ARCSEC_PER: Readonly<Record<'deg' | 'arcmin' | 'arcsec' | 'mas', number>> = {
  deg: 3600,
  arcmin: 60,
  arcsec: 1,
  mas: 0.001,
};
/** Speed of light, km/s; exact by the definition of the metre. */
const LIGHT_KM_S = 299_792.458;

/** The steps that read positional error, proper motion, photometry and redshift; they come after the position. */
export function compileMeasurements(mapping: ColumnMapping, shape: TableShape): Step[] {
  const steps: Step[] = [];
  if (mapping.error !== null) steps.push(compileError(mapping.error, shape));
  if (mapping.properMotion !== null) steps.push(compileProperMotion(mapping.properMotion, shape));
  mapping.photometry.forEach((band, index) => steps.push(compilePhotometry(band, index, shape)));
  if (mapping.redshift !== null) steps.push(compileRedshift(mapping.redshift, shape));
  return steps;
}

function compileError(error: ErrorMapping, shape: TableShape): Step {
  switch (error.kind) {
    case 'constant': {
      const sigma = sigmaFromRadiusArcsec(error.valueArcsec, error.meaning);
      return (_cells, _rowNumber, out) => setEllipse(out, sigma, sigma, 0);
    }
    case 'circle':
      return compileCircle(error, shape);
    case 'axes':
      return compileAxes(error, shape);
    case 'ellipse':
      return compileEllipse(error, shape);
  }
}

function compileCircle({ column, unit, meaning }: Of<'circle'>, shape: TableShape): Step {
  checkColumns([column], shape);
  const scale = ARCSEC_PER[unit] * sigmaFromRadiusArcsec(1, meaning);
  return (cells, _rowNumber, out) => {
    const error = readNumber(cells[column] ?? '', shape.decimalComma);
    if (error === null) return setEllipse(out, null, null, null);
    if (!(error >= 0)) return badError(error, cells, column, shape);
    return setEllipse(out, error * scale, error * scale, 0);
  };
}

/** Errors along RA and Dec are an ellipse whose axes lie east-west and north-south. */
function compileAxes(error: Of<'axes'>, shape: TableShape): Step {
  const { raColumn, decColumn, raUnit } = error;
  checkColumns([raColumn, decColumn], shape);
  const share = sigmaFromRadiusArcsec(1, error.meaning);
  const decScale = ARCSEC_PER[error.decUnit] * share;
  const raScale = raUnit === 'time-second' ? share : ARCSEC_PER[raUnit] * share;
  return (cells, _rowNumber, out) => {
    const ra = readNumber(cells[raColumn] ?? '', shape.decimalComma);
    if (ra !== null && !(ra >= 0)) return badError(ra, cells, raColumn, shape);
    const dec = readNumber(cells[decColumn] ?? '', shape.decimalComma);
    if (dec !== null && !(dec >= 0)) return badError(dec, cells, decColumn, shape);
    if (ra === null || dec === null) return setEllipse(out, null, null, null);
    const east = raUnit === 'time-second' ? raErrorArcsec(ra * raScale, out.decDeg) : ra * raScale;
    const north = dec * decScale;
    return east > north ? setEllipse(out, east, north, 90) : setEllipse(out, north, east, 0);
  };
}

function compileEllipse(error: Of<'ellipse'>, shape: TableShape): Step {
  const { majorColumn, minorColumn, paColumn } = error;
  checkColumns([majorColumn, minorColumn, paColumn], shape);
  const scale = ARCSEC_PER[error.unit] * sigmaFromRadiusArcsec(1, error.meaning);
  return (cells, _rowNumber, out) => {
    const first = readNumber(cells[majorColumn] ?? '', shape.decimalComma);
    if (first !== null && !(first >= 0)) return badError(first, cells, majorColumn, shape);
    const second = readNumber(cells[minorColumn] ?? '', shape.decimalComma);
    if (second !== null && !(second >= 0)) return badError(second, cells, minorColumn, shape);
    const paDeg = paColumn === null ? 0 : readNumber(cells[paColumn] ?? '', shape.decimalComma);
    if (paColumn !== null && Number.isNaN(paDeg)) return unreadable(cells, paColumn, shape);
    if (first === null || second === null) return setEllipse(out, null, null, null);
    const turned = second > first ? 90 : 0;
    const pa = ((((paDeg ?? 0) + turned) % 180) + 180) % 180;
    return setEllipse(out, Math.max(first, second) * scale, Math.min(first, second) * scale, pa);
  };
}

/** Fills in one sigma per axis; gives null, so that a step can end with it. */
function setEllipse(out: UnderstoodRow, maj: number | null, min: number | null, paDeg: number | null): null {
  out.errMajArcsec = maj;
  out.errMinArcsec = min;
  out.errPaDeg = paDeg;
  return null;
}

/** A motion of which one component is missing is no motion. */
function compileProperMotion(motion: NonNullable<ColumnMapping['properMotion']>, shape: TableShape): Step {
  const { raColumn, decColumn, raIncludesCosDec } = motion;
  checkColumns([raColumn, decColumn], shape);
  const scale = motion.unit === 'arcsec/yr' ? 1000 : 1;
  return (cells, _rowNumber, out) => {
    const ra = readNumber(cells[raColumn] ?? '', shape.decimalComma);
    if (Number.isNaN(ra)) return unreadable(cells, raColumn, shape);
    const dec = readNumber(cells[decColumn] ?? '', shape.decimalComma);
    if (Number.isNaN(dec)) return unreadable(cells, decColumn, shape);
    const known = ra !== null && dec !== null;
    out.pmRaMasYr = known ? ra * scale * (raIncludesCosDec ? 1 : cosDeg(out.decDeg)) : null;
    out.pmDecMasYr = known ? dec * scale : null;
    return null;
  };
}

/** A negative error of a magnitude or flux is a usual sign for "none" and is read as such. */
function compilePhotometry(
  band: ColumnMapping['photometry'][number],
  index: number,
  shape: TableShape,
): Step {
  const { column, errorColumn } = band;
  checkColumns([column, errorColumn], shape);
  return (cells, _rowNumber, out) => {
    const value = readNumber(cells[column] ?? '', shape.decimalComma);
    if (Number.isNaN(value)) return unreadable(cells, column, shape);
    const error = errorColumn === null ? null : readNumber(cells[errorColumn] ?? '', shape.decimalComma);
    if (errorColumn !== null && Number.isNaN(error)) return unreadable(cells, errorColumn, shape);
    const measured = out.photometry[index];
    if (measured !== undefined) {
      measured.value = value;
      measured.error = error !== null && error < 0 ? null : error;
    }
    return null;
  };
}

/** A velocity v becomes the redshift v / c, the convention in which catalogues state velocities of galaxies (cz). */
function compileRedshift(redshift: NonNullable<ColumnMapping['redshift']>, shape: TableShape): Step {
  const { column, errorColumn, kind } = redshift;
  checkColumns([column, errorColumn], shape);
  const scale = kind === 'velocity-km-s' ? 1 / LIGHT_KM_S : 1;
  return (cells, _rowNumber, out) => {
    const value = readNumber(cells[column] ?? '', shape.decimalComma);
    if (Number.isNaN(value)) return unreadable(cells, column, shape);
    const error = errorColumn === null ? null : readNumber(cells[errorColumn] ?? '', shape.decimalComma);
    if (errorColumn !== null && Number.isNaN(error)) return unreadable(cells, errorColumn, shape);
    out.redshift = value === null ? null : value * scale;
    return null;
  };
}

function unreadable(cells: readonly string[], column: number, shape: TableShape): Refusal {
  const message = `${inColumn(column, shape)}: “${shownCell(cells[column] ?? '')}” is not a number.`;
  return { code: 'unreadable-number', column, message };
}

function badError(error: number, cells: readonly string[], column: number, shape: TableShape): Refusal {
  if (Number.isNaN(error)) return unreadable(cells, column, shape);
  const message = `${inColumn(column, shape)}: “${shownCell(cells[column] ?? '')}” is negative, an error can’t be.`;
  return { code: 'negative-error', column, message };
}
