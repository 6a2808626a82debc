import { formatDec, formatRa } from '../../shared/astro/angles';
import { separationArcsec } from '../../shared/astro/sphere';
import type { ExportRecipe } from '../../shared/schemas/export';

export interface MergedObject {
  id: number;
  number: number;
  name: string;
  raDeg: number;
  decDeg: number;
  errArcsec: number | null;
  entries: number;
}

export interface MergedMember {
  live: number;
  label: string;
  raDeg: number;
  decDeg: number;
  cells: string;
}

export interface MergedParts {
  members: readonly MergedMember[];
  /** Null label: a name that a person gave. */
  names: readonly { live: number; label: string | null; name: string }[];
  /** One for each 'same' verdict that holds the object together. */
  grades: readonly { live: number; grade: string | null }[];
}

type Cell = string | number | null;
/** From the surest to the least sure. */
const GRADES = ['certain', 'probable', 'possible'];
const NO_GRADE = 'without grade';
/** A tenth of a microarcsecond: no catalogue is better. */
const DEGREE_DIGITS = 9;
const SEPARATION_DIGITS = 4;
const JOINER = '; ';

/**
 * Makes the rows of a merged table under a recipe: one row per object. Several sources of one catalogue in one object
 * share their cells, joined by '; ' in the order of their rows.
 */
export class MergedRowWriter {
  private readonly recipe: ExportRecipe;
  private readonly catalogues: { label: string; columns: { index: number; name: string }[] }[];

  constructor(recipe: ExportRecipe, known: readonly { label: string; columns: readonly { name: string }[] }[]) {
    this.recipe = recipe;
    // The order is the catalogues' own, whatever order the recipe names them in; what is gone is left out.
    this.catalogues = known.flatMap(({ label, columns }) => {
      const wanted = recipe.catalogues.find((one) => one.label === label);
      if (wanted === undefined) return [];
      const chosen = wanted.columns.filter((index) => index < columns.length);
      return [{ label, columns: chosen.map((index) => ({ index, name: nameOf(columns[index]?.name, index) })) }];
    });
  }

  header(): string[] {
    const { recipe, catalogues } = this;
    return [
      'object',
      'name',
      ...(recipe.position === 'sexagesimal' ? [] : ['ra_deg', 'dec_deg']),
      ...(recipe.position === 'degrees' ? [] : ['ra', 'dec']),
      'err_arcsec',
      'entries',
      ...(recipe.aliases === 'one-cell' ? ['aliases'] : [...catalogues.map((one) => `${one.label}.name`), 'other_names']),
      ...(recipe.grades ? ['grade', 'verdicts'] : []),
      ...catalogues.flatMap((one) => [
        ...(recipe.separations ? [`${one.label}.sep_arcsec`] : []),
        ...one.columns.map((column) => `${one.label}.${column.name}`),
      ]),
    ];
  }

  /** The cells of each object, in the order of the header. */
  rows(objects: readonly MergedObject[], parts: MergedParts): Cell[][] {
    const members = grouped(parts.members);
    const names = grouped(parts.names);
    const grades = grouped(parts.grades);
    return objects.map((object) =>
      this.row(object, members.get(object.id) ?? [], names.get(object.id) ?? [], grades.get(object.id) ?? []),
    );
  }

  private row(
    object: MergedObject,
    members: readonly MergedMember[],
    names: readonly { label: string | null; name: string }[],
    verdicts: readonly { grade: string | null }[],
  ): Cell[] {
    const { recipe, catalogues } = this;
    const degrees = [object.raDeg, object.decDeg].map((value) => Number(value.toFixed(DEGREE_DIGITS)));
    return [
      object.number,
      object.name,
      ...(recipe.position === 'sexagesimal' ? [] : degrees),
      ...(recipe.position === 'degrees' ? [] : [formatRa(object.raDeg, 4), formatDec(object.decDeg, 3)]),
      object.errArcsec === null ? null : Number(object.errArcsec.toFixed(SEPARATION_DIGITS)),
      object.entries,
      ...this.nameCells(names),
      ...(recipe.grades ? [lowestGrade(verdicts), verdicts.length] : []),
      ...catalogues.flatMap((catalogue) => this.catalogueCells(object, catalogue, members)),
    ];
  }

  private nameCells(names: readonly { label: string | null; name: string }[]): Cell[] {
    const joined = (some: readonly { name: string }[]) => [...new Set(some.map((one) => one.name))].join(JOINER) || null;
    if (this.recipe.aliases === 'one-cell') return [joined(names)];
    const labels = this.catalogues.map((one) => one.label);
    return [
      ...labels.map((label) => joined(names.filter((one) => one.label === label))),
      joined(names.filter((one) => one.label === null || !labels.includes(one.label))),
    ];
  }

  private catalogueCells(
    object: MergedObject,
    catalogue: { label: string; columns: { index: number }[] },
    members: readonly MergedMember[],
  ): Cell[] {
    const own = members.filter((member) => member.label === catalogue.label);
    const written = own.map((member) => member.cells.split('\u001f'));
    const separations = own.map((member) =>
      separationArcsec(object.raDeg, object.decDeg, member.raDeg, member.decDeg).toFixed(SEPARATION_DIGITS),
    );
    return [
      ...(this.recipe.separations ? [shared(separations)] : []),
      ...catalogue.columns.map(({ index }) => shared(written.map((cells) => (cells[index] ?? '').trim()))),
    ];
  }
}

function lowestGrade(verdicts: readonly { grade: string | null }[]): string | null {
  if (verdicts.length === 0) return null;
  if (verdicts.some((one) => one.grade === null)) return NO_GRADE;
  return GRADES[Math.max(...verdicts.map((one) => GRADES.indexOf(one.grade ?? '')))] ?? NO_GRADE;
}

/** One value as it is, several joined, none as an empty cell. */
function shared(values: readonly string[]): string | null {
  const joined = values.length > 1 && values.some((value) => value !== '') ? values.join(JOINER) : (values[0] ?? '');
  return joined === '' ? null : joined;
}

function nameOf(name: string | undefined, index: number): string {
  return name === undefined || name === '' ? `column${index + 1}` : name;
}

function grouped<T extends { live: number }>(rows: readonly T[]): Map<number, T[]> {
  const groups = new Map<number, T[]>();
  for (const row of rows) {
    const group = groups.get(row.live);
    if (group === undefined) groups.set(row.live, [row]);
    else group.push(row);
  }
  return groups;
}
