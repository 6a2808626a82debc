import path from 'node:path';
import { announce, browserUrl } from './launch/announce';
import { setUpDemo } from './launch/demo';
import { claimDataDir, dataDirOf, openDatabaseOf, programEnvironment } from './launch/installation';
import { keepRunning } from './launch/keeper';
import { live } from './launch/lifecycle';
import { saysReady } from './launch/log-line';
import { choosePort } from './launch/port';
import { PROJECT_ROOT } from './launch/project';

const HOST = '127.0.0.1';
const USUAL_API_PORT = 8440;
const USUAL_CLIENT_PORT = 5173;

/** The development command: like start, but server and worker restart on a change and Vite serves the client. */
live(async (life) => {
  const env = process.env;
  const dataDir = dataDirOf(env);
  const lock = await claimDataDir(life, dataDir);
  const port = await choosePort(env.IDEM_PORT, USUAL_API_PORT, HOST);
  const clientPort = await choosePort(undefined, USUAL_CLIENT_PORT, HOST);
  const appUrl = await openDatabaseOf(life, dataDir, env);
  const webUrl = browserUrl(HOST, port);
  const clientUrl = browserUrl(HOST, clientPort);

  const programEnv = {
    ...programEnvironment(env, { appUrl, dataDir, host: HOST, port }),
    IDEM_API_ORIGIN: webUrl,
    NO_COLOR: '1',
  };
  const run = (name: string, logName: string, args: string[], isReady: (line: string) => boolean) =>
    keepRunning(life, {
      name,
      args,
      env: programEnv,
      cwd: PROJECT_ROOT,
      logFile: path.join(dataDir, 'logs', `${logName}.log`),
      isReady,
    });
  const watch = [path.join('node_modules', 'tsx', 'dist', 'cli.mjs'), 'watch', '--clear-screen=false'];
  const vite = [
    path.join('node_modules', 'vite', 'bin', 'vite.js'),
    '--port',
    String(clientPort),
    '--strictPort',
  ];
  await Promise.all([
    run('web process', 'web', [...watch, 'server/web.ts'], saysReady),
    run('worker process', 'worker', [...watch, 'server/worker.ts'], saysReady),
    run('client server', 'client', vite, (line) => line.includes('Local:')),
  ]);

  lock.write(clientUrl);
  const signIns = await setUpDemo({ appUrl, dataDir, webUrl }, env);
  life.signal.throwIfAborted();
  await announce(clientUrl, webUrl, signIns);
});
