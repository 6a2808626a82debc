import { usePrefetchQuery } from '@tanstack/react-query';
import type { taskQuery } from './use-desk';

/** Loads the next candidate while this one is looked at; draws nothing. */
export function NextTask({ query }: { query: ReturnType<typeof taskQuery> }) {
  usePrefetchQuery(query);
  return null;
}
