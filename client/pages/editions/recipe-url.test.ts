import { describe, expect, it } from 'vitest';
import type { ExportOptions } from '../../../shared/schemas/export';
import { firstRecipe, recipeOfUrl } from './recipe-url';

const options: ExportOptions = {
  objects: 3,
  catalogues: [
    { label: 'AAA', title: 'A', ordinal: 0, columns: Array.from({ length: 6 }, (_, index) => ({ index, name: `c${index}` })) },
  ],
};

describe('the recipe in the address', () => {
  it('comes back as it was written', () => {
    const recipe = { ...firstRecipe(options), minEntries: 2, standingIn: ['AAA'] };
    expect(recipeOfUrl(JSON.stringify(recipe), options)).toEqual(recipe);
  });

  it('loses catalogues that are gone, and falls back to the first recipe when it is no recipe', () => {
    const gone = { ...firstRecipe(options), catalogues: [{ label: 'GONE', columns: [1] }], standingIn: ['GONE'] };
    expect(recipeOfUrl(JSON.stringify(gone), options)).toMatchObject({ catalogues: [], standingIn: [] });
    expect(recipeOfUrl('{', options)).toEqual(firstRecipe(options));
    expect(recipeOfUrl('{"aliases":"all"}', options)).toEqual(firstRecipe(options));
    expect(recipeOfUrl(null, options).catalogues[0]?.columns).toEqual([0, 1, 2, 3]);
  });
});
