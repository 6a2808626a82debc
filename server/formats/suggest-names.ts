import type { ColumnMapping } from '../../shared/schemas/mapping';
import type { ColumnProfile } from './column-profile';
import type { ReadColumn } from './suggest-position';

type Names = ColumnMapping['names'];

/** 'NGC 1234', 'HR2326', 'J1234-567', 'ESO 56-115', '[ABC] 12': letters, then a number. */
const DESIGNATION = /^\[?\p{L}[\p{L}\p{N}.+*[\]:]*[\s_-]*[\p{L}]?[\s_+-]?\d/u;
const DESIGNATION_SHARE = 0.8;
const MIN_FILLED_SHARE = 0.05;
const MIN_DISTINCT_SHARE = 0.5;
const MAX_NAMES = 20;
/** Words for a mere counter of rows: a key only for lack of a better one. */
const COUNTER = /^(?:recno|rec|seq|index|idx|row|no|nr|num|number|#)$/i;
const SEPARATORS = [';', '|', ',', '/'] as const;

/** Name columns and the key column among the columns that are not taken by something else. */
export function suggestNames(
  columns: readonly ReadColumn[],
  taken: ReadonlySet<number>,
): { names: Names; keyColumn: number | null } {
  const free = columns.filter(({ profile }) => !taken.has(profile.index) && profile.kind !== 'empty');
  const names = free.filter(isNameColumn).map(({ profile }) => nameMapping(profile));
  const keyColumn = keyOf(free, names);
  if (names.length === 0 && keyColumn !== null && columns[keyColumn]?.profile.kind === 'text') {
    names.push({ column: keyColumn, separator: null });
  }
  // The first name is the one that is shown, so a name that is the key comes first.
  names.sort(
    (a, b) => Number(b.column === keyColumn) - Number(a.column === keyColumn) || a.column - b.column,
  );
  return { names: names.slice(0, MAX_NAMES), keyColumn };
}

function isNameColumn({ profile, header }: ReadColumn): boolean {
  if (header.isError) return false;
  if (header.role === 'name') return profile.kind === 'text' || isIntegers(profile);
  if (profile.kind !== 'text' || (header.role !== null && header.role !== 'key')) return false;
  const designations = profile.values.filter((value) => DESIGNATION.test(value)).length;
  return (
    designations >= DESIGNATION_SHARE * profile.values.length &&
    profile.values.length >= MIN_FILLED_SHARE * profile.rows &&
    profile.distinctShare > MIN_DISTINCT_SHARE
  );
}

function nameMapping(profile: ColumnProfile): Names[number] {
  return { column: profile.index, separator: separatorOf(profile) };
}

/**
 * The sign between several names in one cell. ',' and '/' also stand inside of names, so all parts must then look
 * like designations.
 */
function separatorOf({ values }: ColumnProfile): string | null {
  for (const separator of SEPARATORS) {
    const split = values.filter((value) => value.includes(separator)).map((value) => value.split(separator));
    if (split.length === 0) continue;
    const strict = separator === ',' || separator === '/';
    const good = split.filter((parts) =>
      parts.every((part) => part.trim() !== '' && (!strict || DESIGNATION.test(part.trim()))),
    );
    if (good.length >= DESIGNATION_SHARE * split.length) return separator;
  }
  return null;
}

/** The best column of which every row has a value of its own: an identifier, a name, a row counter, a first number. */
function keyOf(free: readonly ReadColumn[], names: Names): number | null {
  const single = new Set(names.filter(({ separator }) => separator === null).map(({ column }) => column));
  let best: { index: number; rank: number } | null = null;
  for (const { profile, header } of free) {
    if (!isUnique(profile)) continue;
    const isCounter = COUNTER.test(profile.name.trim());
    const rank =
      header.role === 'key' && !isCounter
        ? 4
        : single.has(profile.index)
          ? 3
          : isCounter
            ? 2
            : profile.index === 0
              ? 1
              : 0;
    if (rank > (best?.rank ?? 0)) best = { index: profile.index, rank };
  }
  return best?.index ?? null;
}

function isUnique(profile: ColumnProfile): boolean {
  const complete = profile.values.length === profile.rows && profile.distinctShare === 1;
  return complete && (profile.kind === 'text' || isIntegers(profile));
}

function isIntegers({ kind, values }: ColumnProfile): boolean {
  return kind === 'number' && values.every((value) => /^\d+$/.test(value));
}
