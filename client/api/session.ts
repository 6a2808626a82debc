import { queryOptions, useMutation, useQueryClient, useSuspenseQuery } from '@tanstack/react-query';
import { sessionState, type SessionState, type SetUp, type SignIn } from '../../shared/schemas/session';
import { keys } from './query-keys';
import { request } from './request';

export const sessionQuery = queryOptions({
  queryKey: keys.session,
  queryFn: ({ signal }) => request({ path: '/api/session', answer: sessionState, signal }),
  staleTime: 60_000,
});

/** Who is signed in. The guards of the routes have loaded it before any page is drawn. */
export function useSession(): SessionState {
  return useSuspenseQuery(sessionQuery).data;
}

/** Signs in; the session is known again when the promise ends. */
export function useSignIn() {
  const queryClient = useQueryClient();
  return useMutation({
    mutationFn: (body: SignIn) => request({ method: 'POST', path: '/api/session', body }),
    onSuccess: () => queryClient.fetchQuery({ ...sessionQuery, staleTime: 0 }),
  });
}

/** Makes the first account and its group; the new owner is signed in afterwards. */
export function useSetUp() {
  const queryClient = useQueryClient();
  return useMutation({
    mutationFn: (body: SetUp) => request({ method: 'POST', path: '/api/setup', body }),
    onSuccess: () => queryClient.fetchQuery({ ...sessionQuery, staleTime: 0 }),
  });
}

/** Signs out here or on every device, then starts the page afresh so that nothing of the group stays in memory. */
export function useSignOut() {
  return useMutation({
    mutationFn: (where: 'here' | 'everywhere') =>
      request({ method: 'DELETE', path: where === 'here' ? '/api/session' : '/api/session/all' }),
    onSuccess: () => window.location.assign('/sign-in'),
  });
}
