import path from 'node:path';
import { announce, browserUrl } from './launch/announce';
import { ensureClientBuilt } from './launch/client-build';
import { setUpDemo } from './launch/demo';
import { claimDataDir, dataDirOf, openDatabaseOf, programEnvironment } from './launch/installation';
import { keepRunning } from './launch/keeper';
import { live } from './launch/lifecycle';
import { saysReady } from './launch/log-line';
import { choosePort } from './launch/port';
import { PROJECT_ROOT } from './launch/project';
import { say } from './launch/say';

const USUAL_PORT = 8440;

/** The start command: database up and migrated, client built, web and worker process running until told to stop. */
live(async (life) => {
  const env = process.env;
  const dataDir = dataDirOf(env);
  const lock = await claimDataDir(life, dataDir);
  const host = env.IDEM_HOST || '127.0.0.1';
  const port = await choosePort(env.IDEM_PORT, USUAL_PORT, host);
  const appUrl = await openDatabaseOf(life, dataDir, env);
  await ensureClientBuilt(() => say('Building the client …'), life.signal);
  life.signal.throwIfAborted();

  const settings = { appUrl, dataDir, host, port };
  const program = (name: 'web' | 'worker') =>
    keepRunning(life, {
      name: `${name} process`,
      args: ['--import', 'tsx', path.join('server', `${name}.ts`)],
      env: programEnvironment(env, settings),
      cwd: PROJECT_ROOT,
      logFile: path.join(dataDir, 'logs', `${name}.log`),
      isReady: saysReady,
    });
  await Promise.all([program('web'), program('worker')]);

  const webUrl = browserUrl(host, port);
  const url = env.IDEM_PUBLIC_URL || webUrl;
  lock.write(url);
  const signIns = await setUpDemo({ appUrl, dataDir, webUrl }, env);
  life.signal.throwIfAborted();
  await announce(url, webUrl, signIns);
});
