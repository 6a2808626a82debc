import type { Route } from '../route';
import { catalogueRoutes } from './catalogues';
import { exportRoutes } from './exports';
import { fileRoutes } from './files';
import { findRoutes } from './find';
import { groupRoutes } from './groups';
import { jobRoutes } from './jobs';
import { noteRoutes } from './notes';
import { objectRoutes } from './objects';
import { registryRoutes } from './registry';
import { runRoutes } from './runs';
import { sessionRoutes } from './session';
import { todayRoutes } from './today';
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
  ...objectRoutes,
  ...noteRoutes,
  ...findRoutes,
  ...exportRoutes,
  ...todayRoutes,
  ...jobRoutes,
];
