import { queryOptions, useMutation, useQueryClient, useSuspenseQuery } from '@tanstack/react-query';
import { sessionState, type SessionState, type SetUp, type SignIn } from '../../shared/schemas/session';
import { keys } from './query-keys';
import { request } from './request';
import { sessionEnd } from './session-end';

export const sessionQuery = queryOptions({
  queryKey: keys.session,
  queryFn: async ({ signal, client }) => {
    const heard = await request({ path: '/api/session', answer: sessionState, signal });
    const known = client.getQueryData<SessionState>(keys.session);
    if (heard.person !== null || !known?.person) return heard;
    // Ended elsewhere while a page is open: the page stays and the sign-in comes over it.
    sessionEnd.announce();
    return known;
  },
  staleTime: 60_000,
});

/** Who is signed in. The guards of the routes have loaded it before any page is drawn. */
export function useSession(): SessionState {
  return useSuspenseQuery(sessionQuery).data;
}

/** Signs in and answers with the new session. */
export function useSignIn() {
  const queryClient = useQueryClient();
  return useMutation({
    mutationFn: async (body: SignIn) => {
      await request({ method: 'POST', path: '/api/session', body });
      return queryClient.fetchQuery({ ...sessionQuery, staleTime: 0 });
    },
  });
}

/** Makes the first account and its group; the new owner is signed in afterwards. */
export function useSetUp() {
  const queryClient = useQueryClient();
  return useMutation({
    mutationFn: async (body: SetUp) => {
      await request({ method: 'POST', path: '/api/setup', body });
      return queryClient.fetchQuery({ ...sessionQuery, staleTime: 0 });
    },
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
