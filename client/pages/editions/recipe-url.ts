import { exportRecipe, type ExportOptions, type ExportRecipe } from '../../../shared/schemas/export';

/** So many original columns of each catalogue are chosen to begin with. */
const FIRST_COLUMNS = 4;

/** What is chosen before a person has chosen anything. */
export function firstRecipe(options: ExportOptions): ExportRecipe {
  return {
    aliases: 'one-cell',
    position: 'degrees',
    separations: true,
    grades: true,
    catalogues: options.catalogues.map(({ label, columns }) => ({
      label,
      columns: columns.slice(0, FIRST_COLUMNS).map((column) => column.index),
    })),
    minEntries: 1,
    standingIn: [],
  };
}

/** The recipe of the address; the first one when there is none or it cannot be read any more. */
export function recipeOfUrl(text: string | null, options: ExportOptions): ExportRecipe {
  if (text === null) return firstRecipe(options);
  try {
    const recipe = exportRecipe.parse(JSON.parse(text));
    const known = new Map(options.catalogues.map((one) => [one.label, one.columns.length]));
    return {
      ...recipe,
      catalogues: recipe.catalogues.filter((one) => known.has(one.label)),
      standingIn: recipe.standingIn.filter((label) => known.has(label)),
    };
  } catch {
    return firstRecipe(options);
  }
}
