/** Settings that a new cross-match begins with. */
export interface RunSettings {
  catalogues: string[];
  /** As typed. */
  radius: string;
  title: string;
}

/** Settings out of the address (`catalogues=A,B&radius=1.5&title=…`); labels that are not ready are left out. */
export function settingsOfSearch(search: URLSearchParams, ready: readonly string[]): RunSettings {
  const wanted = (search.get('catalogues') ?? '').split(',');
  return {
    catalogues: [...new Set(wanted)].filter((label) => ready.includes(label)),
    radius: search.get('radius') ?? '',
    title: search.get('title') ?? '',
  };
}
