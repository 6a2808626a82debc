/** The places of the application, in the order of the rail. */
export const PLACES = [
  { path: 'today', name: 'Today' },
  { path: 'catalogues', name: 'Catalogues' },
  { path: 'cross-match', name: 'Cross-match' },
  { path: 'review', name: 'Review' },
  { path: 'objects', name: 'Objects' },
  { path: 'references', name: 'References' },
  { path: 'editions', name: 'Editions' },
  { path: 'group', name: 'Group' },
] as const;

export type PlacePath = (typeof PLACES)[number]['path'];

/** The address of the same place in another group: what belongs to one group (a number, a label) is left behind. */
export function placeInGroup(pathname: string, group: string): string {
  const part = pathname.split('/')[3] ?? '';
  const place = PLACES.find(({ path }) => path === part)?.path ?? 'today';
  return `/g/${encodeURIComponent(group)}/${place}`;
}
