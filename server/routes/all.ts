import type { Route } from '../route';
import { catalogueRoutes } from './catalogues';
import { fileRoutes } from './files';
import { groupRoutes } from './groups';
import { jobRoutes } from './jobs';
import { registryRoutes } from './registry';
import { runRoutes } from './runs';
import { sessionRoutes } from './session';
import { verdictRoutes } from './verdicts';

/** Every route of the API, in the order in which they are mounted; the permission test walks over this list. */
export const ALL_ROUTES: readonly Route[] = [
  ...sessionRoutes,
  ...groupRoutes,
  ...fileRoutes,
  ...catalogueRoutes,
  ...runRoutes,
  ...verdictRoutes,
  ...registryRoutes,
  ...jobRoutes,
];
