import { MutationCache, QueryCache, QueryClient } from '@tanstack/react-query';
import { ProblemError } from './problem-error';
import { sessionEnd } from './session-end';

const RETRIES = 2;

function noteSessionEnd(error: unknown): void {
  if (error instanceof ProblemError && error.code === 'not-signed-in') sessionEnd.announce();
}

/** A refusal stays a refusal when it is asked again; only a lost connection or a failing server is worth another try. */
export function worthRetrying(failures: number, error: unknown): boolean {
  if (failures >= RETRIES || !(error instanceof ProblemError)) return false;
  return error.code === 'no-connection' || error.status >= 500;
}

/** The one cache of the application; a 401 anywhere brings up the sign-in over the page. */
export const queryClient = new QueryClient({
  queryCache: new QueryCache({ onError: noteSessionEnd }),
  mutationCache: new MutationCache({ onError: noteSessionEnd }),
  defaultOptions: {
    queries: { staleTime: 10_000, retry: worthRetrying, refetchOnWindowFocus: true },
    mutations: { retry: false },
  },
});
