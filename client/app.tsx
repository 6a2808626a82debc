import { lazy, Suspense, useSyncExternalStore } from 'react';
import { QueryClientProvider } from '@tanstack/react-query';
import { RouterProvider } from 'react-router-dom';
import { queryClient } from './api/query-client';
import { sessionEnd } from './api/session-end';
import { router } from './routes';

const SessionEndDialog = lazy(async () => ({
  default: (await import('./pages/entry/session-end-dialog')).SessionEndDialog,
}));

/** Providers around the route table, and the sign-in that comes over a page whose session has ended. */
export function App() {
  const ended = useSyncExternalStore(sessionEnd.subscribe, sessionEnd.get);
  return (
    <QueryClientProvider client={queryClient}>
      <RouterProvider router={router} />
      {ended && (
        <Suspense>
          <SessionEndDialog />
        </Suspense>
      )}
    </QueryClientProvider>
  );
}
