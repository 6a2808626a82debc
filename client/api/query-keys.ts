/**
 * Keys of the query cache. Everything of a group stands below ['group', slug], so that leaving or changing it
 * can drop the whole branch; the noun comes next, so that one change can refresh all lists of that noun:
 * `queryClient.invalidateQueries({ queryKey: keys.objects(group) })`.
 */
export const keys = {
  session: ['session'] as const,
  group: (group: string) => ['group', group] as const,
  groupDetail: (group: string) => ['group', group, 'detail'] as const,
  members: (group: string) => ['group', group, 'members'] as const,
  audit: (group: string) => ['group', group, 'audit'] as const,
  today: (group: string) => ['group', group, 'today'] as const,
  jobs: (group: string) => ['group', group, 'jobs'] as const,
  job: (group: string, jobId: string) => ['group', group, 'jobs', jobId] as const,
  catalogues: (group: string) => ['group', group, 'catalogues'] as const,
  catalogue: (group: string, label: string) => ['group', group, 'catalogues', label] as const,
  runs: (group: string) => ['group', group, 'runs'] as const,
  run: (group: string, run: number) => ['group', group, 'runs', run] as const,
  verdicts: (group: string) => ['group', group, 'verdicts'] as const,
  objects: (group: string) => ['group', group, 'objects'] as const,
  object: (group: string, number: number) => ['group', group, 'objects', number] as const,
  find: (group: string, q: string) => ['group', group, 'find', q] as const,
  exports: (group: string) => ['group', group, 'exports'] as const,
};
