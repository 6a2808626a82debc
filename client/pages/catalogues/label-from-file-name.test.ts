import { describe, expect, it } from 'vitest';
import { catalogueLabel } from '../../../shared/schemas/catalogue';
import { labelFromFileName } from './label-from-file-name';

describe('a label to begin with', () => {
  it.each([
    ['lantern optical v2.csv.gz', 'lantern-optical-v2'],
    ['2020_survey.tsv', 'survey'],
    ['a very long name of a table of sources.txt', 'a-very-long-name-of-'],
  ])('%s gives %s', (name, label) => {
    expect(labelFromFileName(name)).toBe(label);
    expect(catalogueLabel.safeParse(label).success).toBe(true);
  });
});
