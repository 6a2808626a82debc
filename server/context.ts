import type { Logger } from 'pino';
import type { Role } from '../shared/words';
import type { Database } from '../db/client';
import type { FileStorage } from './adapters/file-storage';
import type { Config } from './config';
import type { JobFeed } from './services/job-feed';

/** What services work with: opened once per process. */
export interface Context {
  config: Config;
  database: Database;
  files: FileStorage;
  jobFeed: JobFeed;
  log: Logger;
}

/** A signed-in person. */
export interface PersonActor {
  personId: number;
  name: string;
  email: string;
  sessionId: string;
}

/** A person acting in a group with a role; what services take instead of raw ids. Usable as a transaction scope. */
export interface GroupActor {
  personId: number;
  groupId: number;
  group: string;
  role: Role;
}
