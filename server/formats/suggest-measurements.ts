import type { ColumnMapping } from '../../shared/schemas/mapping';
import { rangeOf, type ColumnProfile } from './column-profile';
import type { HeaderRole } from './header-words';
import type { ReadColumn } from './suggest-position';

type ErrorMapping = ColumnMapping['error'];
type Photometry = ColumnMapping['photometry'];

const MAX_BANDS = 40;
const RANGE_SHARE = 0.9;
/** Motions of stars in arcsec/yr are below these; in mas/yr a list of them is not. Barnard's star moves 10.4 arcsec/yr. */
const ARCSEC_MOTION = { max: 12, median: 0.3 };
/** Redshifts are smaller than this, magnitudes in the z band larger. */
const Z_BAND_MEDIAN = 7.5;

/** Columns of numbers with this role. */
function withRole(columns: readonly ReadColumn[], role: HeaderRole, isError = false): ReadColumn[] {
  return columns.filter(
    ({ header, profile }) => header.role === role && header.isError === isError && profile.kind === 'number',
  );
}

/** The positional error: an ellipse before errors along the axes before a circle. */
export function suggestError(columns: readonly ReadColumn[]): ErrorMapping {
  const [major, minor] = (['error-major', 'error-minor'] as const).map((role) =>
    firstError(withRole(columns, role)),
  );
  if (major !== undefined && minor !== undefined) {
    return {
      kind: 'ellipse',
      majorColumn: major.profile.index,
      minorColumn: minor.profile.index,
      paColumn: withRole(columns, 'error-pa')[0]?.profile.index ?? null,
      unit: angleUnitOf(major),
      meaning: major.header.meaning,
    };
  }
  const [ra, dec] = (['ra', 'dec'] as const).map((role) => firstError(withRole(columns, role, true)));
  if (ra !== undefined && dec !== undefined) {
    return {
      kind: 'axes',
      raColumn: ra.profile.index,
      decColumn: dec.profile.index,
      raUnit: ra.header.unit?.kind === 'time-second' ? 'time-second' : angleUnitOf(ra),
      decUnit: angleUnitOf(dec),
      meaning: 'sigma',
    };
  }
  const circle = firstError(withRole(columns, 'position-error'));
  if (circle === undefined) return null;
  const { profile, header } = circle;
  return { kind: 'circle', column: profile.index, unit: angleUnitOf(circle), meaning: header.meaning };
}

function firstError(columns: readonly ReadColumn[]): ReadColumn | undefined {
  return columns.find(({ profile }) => rangeOf(profile.numbers).min >= 0);
}

/** Without a stated unit errors are taken for arcsec. */
function angleUnitOf({ header }: ReadColumn): 'deg' | 'arcmin' | 'arcsec' | 'mas' {
  return header.unit?.kind === 'angle' ? header.unit.unit : 'arcsec';
}

export function suggestProperMotion(columns: readonly ReadColumn[]): ColumnMapping['properMotion'] {
  const [ra] = withRole(columns, 'pm-ra');
  const [dec] = withRole(columns, 'pm-dec');
  if (ra === undefined || dec === undefined) return null;
  const stated = ra.header.unit?.kind === 'motion' ? ra.header.unit.unit : null;
  return {
    raColumn: ra.profile.index,
    decColumn: dec.profile.index,
    unit: stated ?? (looksLikeArcsec(dec.profile) ? 'arcsec/yr' : 'mas/yr'),
    raIncludesCosDec: true,
  };
}

function looksLikeArcsec({ numbers }: ColumnProfile): boolean {
  const sizes = numbers.map(Math.abs);
  return (
    rangeOf(sizes).max < ARCSEC_MOTION.max && medianOf(sizes) < ARCSEC_MOTION.median && medianOf(sizes) > 0
  );
}

function medianOf(numbers: readonly number[]): number {
  return [...numbers].sort((a, b) => a - b)[Math.floor(numbers.length / 2)] ?? 0;
}

/** Magnitudes and fluxes with their errors, in the order of the file. */
export function suggestPhotometry(columns: readonly ReadColumn[]): Photometry {
  const bands = columns.flatMap((column): Photometry => {
    const { profile, header } = column;
    if (profile.kind !== 'number' || header.isError) return [];
    if (header.role === 'flux') return [bandOf(column, columns, 'flux', header.band, 'unstated')];
    if (header.role === 'magnitude' && looksLikeMagnitude(profile)) {
      return [bandOf(column, columns, 'magnitude', header.band, 'mag')];
    }
    return isZBand(column) ? [bandOf(column, columns, 'magnitude', 'z', 'mag')] : [];
  });
  return bands.slice(0, MAX_BANDS);
}

function bandOf(
  { profile, header }: ReadColumn,
  columns: readonly ReadColumn[],
  kind: 'magnitude' | 'flux',
  band: string,
  defaultUnit: string,
): Photometry[number] {
  const errors = columns.filter((other) => other.header.isError && other.profile.kind === 'number');
  const error = errors.find(
    (other) => other.header.role === header.role && other.header.band === header.band,
  );
  const unit = header.unit?.kind === 'other' ? header.unit.text.slice(0, 30).trim() : defaultUnit;
  return { column: profile.index, errorColumn: error?.profile.index ?? null, kind, band, unit };
}

function looksLikeMagnitude({ numbers }: ColumnProfile): boolean {
  const inside = numbers.filter((value) => value > -30 && value < 40).length;
  return inside >= RANGE_SHARE * numbers.length;
}

function isZBand({ profile, header }: ReadColumn): boolean {
  return header.role === 'redshift' && !header.isError && medianOf(profile.numbers) > Z_BAND_MEDIAN;
}

export function suggestRedshift(columns: readonly ReadColumn[]): ColumnMapping['redshift'] {
  for (const [role, kind] of [
    ['redshift', 'redshift'],
    ['velocity', 'velocity-km-s'],
  ] as const) {
    const column = withRole(columns, role).find((candidate) => !isZBand(candidate));
    if (column === undefined) continue;
    const error = withRole(columns, role, true)[0];
    return { column: column.profile.index, errorColumn: error?.profile.index ?? null, kind };
  }
  return null;
}
