import { createBrowserRouter, redirect, type RouteObject } from 'react-router-dom';
import {
  needsEmptyInstallation,
  needsMembership,
  needsNobody,
  needsPerson,
  toFirstAddress,
} from './api/guards';
import { Loading } from './components/loading';
import { NotFound, RouteProblem } from './components/route-problem';
import { Shell } from './components/shell';

/** Pages below /g/:group, each loaded when it is first opened. */
const groupPages: RouteObject[] = [
  { index: true, loader: ({ params }) => redirect(`/g/${params.group ?? ''}/today`), Component: Loading },
  { path: 'today', lazy: async () => ({ Component: (await import('./pages/today/today-page')).TodayPage }) },
  {
    path: 'catalogues',
    lazy: async () => ({ Component: (await import('./pages/catalogues/catalogues-page')).CataloguesPage }),
  },
  {
    path: 'catalogues/new',
    lazy: async () => ({ Component: (await import('./pages/catalogues/add-page')).AddCataloguePage }),
  },
  {
    path: 'catalogues/:label',
    lazy: async () => ({ Component: (await import('./pages/catalogues/catalogue-page')).CataloguePage }),
  },
  {
    path: 'cross-match',
    lazy: async () => ({ Component: (await import('./pages/crossmatch/runs-page')).RunsPage }),
  },
  {
    path: 'cross-match/new',
    lazy: async () => ({ Component: (await import('./pages/crossmatch/new-run-page')).NewRunPage }),
  },
  {
    path: 'cross-match/:run',
    lazy: async () => ({ Component: (await import('./pages/crossmatch/run-page')).RunPage }),
  },
  {
    path: 'review',
    lazy: async () => ({ Component: (await import('./pages/review/review-page')).ReviewPage }),
  },
  {
    path: 'review/:run',
    lazy: async () => ({ Component: (await import('./pages/review/desk-page')).DeskPage }),
  },
  {
    path: 'objects',
    lazy: async () => ({ Component: (await import('./pages/objects/objects-page')).ObjectsPage }),
  },
  {
    path: 'objects/:number',
    lazy: async () => ({ Component: (await import('./pages/objects/object-page')).ObjectPage }),
  },
  { path: 'find', lazy: async () => ({ Component: (await import('./pages/objects/find-page')).FindPage }) },
  {
    path: 'references',
    lazy: async () => ({ Component: (await import('./pages/references/references-page')).ReferencesPage }),
  },
  {
    path: 'editions',
    lazy: async () => ({ Component: (await import('./pages/editions/editions-page')).EditionsPage }),
  },
  { path: 'group', lazy: async () => ({ Component: (await import('./pages/group/group-page')).GroupPage }) },
  { path: '*', Component: NotFound },
];

/** The whole route table. */
export const router = createBrowserRouter([
  {
    ErrorBoundary: RouteProblem,
    HydrateFallback: () => <Loading label="Opening Idem" />,
    children: [
      { path: '/', loader: toFirstAddress, Component: Loading },
      {
        path: '/sign-in',
        loader: needsNobody,
        lazy: async () => ({ Component: (await import('./pages/entry/sign-in-page')).SignInPage }),
      },
      {
        path: '/set-up',
        loader: needsEmptyInstallation,
        lazy: async () => ({ Component: (await import('./pages/entry/set-up-page')).SetUpPage }),
      },
      {
        path: '/groups',
        loader: needsPerson,
        lazy: async () => ({ Component: (await import('./pages/entry/groups-page')).GroupsPage }),
      },
      {
        path: '/g/:group',
        loader: needsMembership,
        // Filters and sorting live in the query; they change nothing about who may look.
        shouldRevalidate: ({ currentUrl, nextUrl }) => currentUrl.pathname !== nextUrl.pathname,
        Component: Shell,
        // A page that fails keeps the shell around it: the boundary stands one level below.
        children: [{ ErrorBoundary: RouteProblem, children: groupPages }],
      },
      { path: '*', Component: NotFound },
    ],
  },
]);
