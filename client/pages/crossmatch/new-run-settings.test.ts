import { describe, expect, it } from 'vitest';
import { settingsOfSearch } from './new-run-settings';

describe('settingsOfSearch', () => {
  it('takes catalogues in the order of the address, each once, and only ready ones', () => {
    const search = new URLSearchParams({ catalogues: 'C,A,C,gone', radius: '1.5', title: 'again' });
    expect(settingsOfSearch(search, ['A', 'B', 'C'])).toEqual({
      catalogues: ['C', 'A'],
      radius: '1.5',
      title: 'again',
    });
  });

  it('begins empty without settings', () => {
    expect(settingsOfSearch(new URLSearchParams(), ['A'])).toEqual({ catalogues: [], radius: '', title: '' });
  });
});
