import type { Route } from '../route';
import { groupRoutes } from './groups';
import { jobRoutes } from './jobs';
import { sessionRoutes } from './session';

/** Every route of the API, in the order in which they are mounted; the permission test walks over this list. */
export const ALL_ROUTES: readonly Route[] = [...sessionRoutes, ...groupRoutes, ...jobRoutes];
