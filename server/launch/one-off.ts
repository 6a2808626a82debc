import { existsSync } from 'node:fs';
import path from 'node:path';
import { startCluster } from '../../db/cluster';
import { appUrlOf, migrate } from '../../db/migrate';
import { DATABASE, dataDirOf, SECRET_FILE } from './installation';
import { StartProblem } from './say';

/**
 * Runs `work` with the application's database address, for commands that are not the server: the database of the
 * running installation, one that is brought up for the time of `work`, or the one that the environment names.
 */
export async function withInstallationDatabase<T>(
  env: NodeJS.ProcessEnv,
  work: (appUrl: string) => Promise<T>,
): Promise<T> {
  if (env.IDEM_APP_DATABASE_URL) return work(env.IDEM_APP_DATABASE_URL);
  if (env.IDEM_DATABASE_URL) return work(appUrlOf(env.IDEM_DATABASE_URL));
  const dataDir = dataDirOf(env);
  if (!existsSync(path.join(dataDir, SECRET_FILE))) {
    throw new StartProblem(`There is no installation in ${dataDir} yet: npm start makes one.`);
  }
  const cluster = await startCluster({ dataDir });
  try {
    const ownerUrl = await cluster.ensureDatabase(DATABASE);
    // A running installation has migrated already; its schema is not changed under it.
    const appUrl = cluster.adopted ? appUrlOf(ownerUrl) : (await migrate(ownerUrl)).appUrl;
    return await work(appUrl);
  } finally {
    await cluster.stop();
  }
}
