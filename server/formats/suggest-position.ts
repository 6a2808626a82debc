import { parseDec, parseRa, splitCombinedPosition } from '../../shared/astro/angles';
import type { ColumnMapping } from '../../shared/schemas/mapping';
import { rangeOf, type ColumnProfile } from './column-profile';
import type { HeaderMeaning } from './header-words';
import { MAX_COMBINED_LENGTH } from './understand-position';

type Position = ColumnMapping['position'];

/** A column with what its header says. */
export interface ReadColumn {
  profile: ColumnProfile;
  header: HeaderMeaning;
}

export interface SuggestContext {
  decimalComma: boolean;
  /** True when all rows of the file were looked at. */
  whole: boolean;
}

/** Of the values of a coordinate, so large a share must lie where the coordinate can lie. */
const RANGE_SHARE = 0.9;
const COMBINED_SAMPLE = 50;
/** Without header words, coordinates are told from other numbers by their decimals. */
const MIN_DECIMALS = 3;

/** The columns that hold the position: by header words, then as one column, then by values alone. */
export function suggestPosition(columns: readonly ReadColumn[], context: SuggestContext): Position | null {
  return pairByHeader(columns, context) ?? oneColumn(columns, context) ?? pairByValues(columns, context);
}

function pairByHeader(columns: readonly ReadColumn[], context: SuggestContext): Position | null {
  const ras = columns.filter(
    ({ header, profile }) => header.role === 'ra' && !header.isError && canBeRa(profile),
  );
  const decs = columns.filter(
    ({ header, profile }) => header.role === 'dec' && !header.isError && canBeDec(profile),
  );
  let best: { position: Position; rank: number } | null = null;
  for (const ra of ras) {
    for (const dec of decs) {
      const rank = pairRank(ra, dec);
      if (best === null || rank > best.rank) best = { position: pairOf(ra, dec, context), rank };
    }
  }
  return best?.position ?? null;
}

/** Equinox 2000 before 1950, both written alike, decimal before sexagesimal, and neighbours. */
function pairRank(ra: ReadColumn, dec: ReadColumn): number {
  const modern = (ra.header.is1950 ? 0 : 8) + (dec.header.is1950 ? 0 : 8);
  const alike = ra.profile.kind === dec.profile.kind ? 4 : 0;
  const decimal = ra.profile.kind === 'number' ? 1 : 0;
  const degrees = ra.header.unit?.kind === 'angle' ? 1 : 0;
  const distance = Math.abs(dec.profile.index - ra.profile.index - 1);
  return modern + alike + decimal + degrees - Math.min(distance, 100) / 100;
}

function pairOf(ra: ReadColumn, dec: ReadColumn, context: SuggestContext): Position {
  return {
    kind: 'two-columns',
    raColumn: ra.profile.index,
    decColumn: dec.profile.index,
    raNotation: raNotation(ra, context),
    decNotation: dec.profile.kind === 'sexagesimal' ? 'sexagesimal-degrees' : 'degrees',
  };
}

function raNotation({ profile, header }: ReadColumn, context: SuggestContext): Position['raNotation'] {
  if (profile.kind === 'sexagesimal') {
    const { values, degrees } = profile.angles;
    return degrees || rangeOf(values).max > 24 ? 'sexagesimal-degrees' : 'sexagesimal-hours';
  }
  if (header.unit?.kind === 'angle') return 'degrees';
  if (header.unit?.kind === 'hours' || header.unit?.kind === 'sexagesimal') return 'hours';
  return looksLikeHours(profile, context) ? 'hours' : 'degrees';
}

/**
 * Values that fill 0..24 and never go beyond are hours. The beginning of a longer file that is sorted by RA tells
 * nothing: degrees below 24 come first in it.
 */
function looksLikeHours({ numbers }: ColumnProfile, { whole }: SuggestContext): boolean {
  const { min, max } = rangeOf(numbers);
  if (max > 24 || max - min < 15) return false;
  let rising = 0;
  for (let i = 1; i < numbers.length; i += 1) if ((numbers[i] ?? 0) >= (numbers[i - 1] ?? 0)) rising += 1;
  return whole || rising < 0.8 * numbers.length;
}

function canBeRa(profile: ColumnProfile): boolean {
  return liesWithin(profile, 0, 360);
}

function canBeDec(profile: ColumnProfile): boolean {
  return liesWithin(profile, -90, 90);
}

function liesWithin(profile: ColumnProfile, min: number, max: number): boolean {
  const values = profile.kind === 'number' ? profile.numbers : profile.angles.values;
  const inside = values.filter((value) => value >= min && value <= max).length;
  return inside > 0 && inside >= RANGE_SHARE * values.length;
}

function oneColumn(columns: readonly ReadColumn[], { decimalComma }: SuggestContext): Position | null {
  const named = columns.filter(({ header }) => header.role === 'position' && !header.isError);
  for (const { profile } of [...named, ...columns]) {
    if (profile.kind !== 'text') continue;
    const parts = profile.values
      .slice(0, COMBINED_SAMPLE)
      .map((value) =>
        value.length > MAX_COMBINED_LENGTH ? null : splitCombinedPosition(value, { decimalComma }),
      );
    for (const [raNotation, decNotation] of [
      ['degrees', 'degrees'],
      ['sexagesimal-hours', 'sexagesimal-degrees'],
      ['sexagesimal-degrees', 'sexagesimal-degrees'],
    ] as const) {
      const good = parts.filter(
        (pair) =>
          pair !== null &&
          parseRa(pair[0], raNotation, { decimalComma }).ok &&
          parseDec(pair[1], decNotation, { decimalComma }).ok,
      );
      if (good.length > 0 && good.length >= RANGE_SHARE * parts.length) {
        return { kind: 'one-column', column: profile.index, raNotation, decNotation };
      }
    }
  }
  return null;
}

/** Two neighbours that are written as angles, or have the decimals of angles, and lie where angles lie. */
function pairByValues(columns: readonly ReadColumn[], context: SuggestContext): Position | null {
  for (const [i, ra] of columns.entries()) {
    const dec = columns[i + 1];
    if (dec === undefined || ra.profile.kind !== dec.profile.kind) continue;
    if (ra.header.role !== null || dec.header.role !== null) continue;
    if (!canBeRa(ra.profile) || !canBeDec(dec.profile)) continue;
    const isAngle =
      ra.profile.kind === 'sexagesimal' || (hasDecimals(ra.profile) && hasDecimals(dec.profile));
    if (isAngle) return pairOf(ra, dec, context);
  }
  return null;
}

function hasDecimals({ values, distinctShare }: ColumnProfile): boolean {
  const long = values.filter((value) => (/[.,](\d+)$/.exec(value)?.[1] ?? '').length >= MIN_DECIMALS).length;
  return long >= RANGE_SHARE * values.length && distinctShare > 0.5;
}
