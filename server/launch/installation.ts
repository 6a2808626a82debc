import { randomBytes } from 'node:crypto';
import { chmodSync, existsSync, mkdirSync, statSync, writeFileSync } from 'node:fs';
import path from 'node:path';
import { startCluster, type Cluster } from '../../db/cluster';
import { takeLock, type LockHolder, type ProcessLock } from '../../db/cluster-lock';
import { endProcesses, environmentOf, processIds } from '../../db/cluster-processes';
import type { Life } from './lifecycle';
import { PROJECT_ROOT } from './project';
import { say, StartProblem } from './say';

export const DATABASE = 'idem';
export const SECRET_FILE = 'session-secret';
const LEFTOVER_GRACE_MS = 1000;
/** Written into the lock at the end; a new start waits that long for it to be given back. */
const STOPPING = 'stopping';
const STOPPING_LIMIT_MS = 30_000;
/** Every program of an installation carries this in its environment, with the data folder as value. */
const MARK = 'IDEM_INSTALLATION';

/** The data folder of this start: `.data` in the project unless IDEM_DATA_DIR names another. */
export function dataDirOf(env: NodeJS.ProcessEnv): string {
  return path.resolve(PROJECT_ROOT, env.IDEM_DATA_DIR ?? '.data');
}

/** Makes the data folder and takes it for this process; a second starter is told where the first one runs. */
export async function claimDataDir(life: Life, dataDir: string): Promise<ProcessLock> {
  requireOwnInstallation(dataDir);
  try {
    mkdirSync(path.join(dataDir, 'files'), { recursive: true, mode: 0o700 });
    mkdirSync(path.join(dataDir, 'logs'), { recursive: true, mode: 0o700 });
  } catch (error) {
    throw notWritable(dataDir, error);
  }
  const deadline = performance.now() + STOPPING_LIMIT_MS;
  let claim = claimLock(dataDir);
  while (!claim.taken && claim.holder.note === STOPPING && performance.now() < deadline) {
    await new Promise((resolve) => setTimeout(resolve, 50));
    claim = claimLock(dataDir);
  }
  if (!claim.taken) throw new StartProblem(alreadyRuns(claim.holder, dataDir));
  const { lock } = claim;
  life.defer(() => lock.release());
  life.signal.addEventListener('abort', () => lock.write(STOPPING));
  await endLeftovers(dataDir);
  return lock;
}

/** Two accounts on one installation would leave files that the other cannot read; root is no exception. */
function requireOwnInstallation(dataDir: string): void {
  const secret = path.join(dataDir, SECRET_FILE);
  const own = process.getuid?.();
  if (own === undefined || !existsSync(secret)) return;
  const { uid } = statSync(secret);
  if (uid === own) return;
  throw new StartProblem(
    `The installation in ${dataDir} belongs to account number ${uid}, and this is number ${own}. ` +
      'Start Idem as the account that made it, or name another folder in IDEM_DATA_DIR.',
  );
}

function alreadyRuns({ pid, note }: LockHolder, dataDir: string): string {
  const states: Record<string, string> = { '': 'and is still starting', [STOPPING]: 'but is stopping' };
  const where = states[note] ?? `at ${note}`;
  return `Idem already runs ${where} (process ${pid}, data in ${dataDir}). Stop it first: Ctrl-C in its terminal, or kill ${pid}.`;
}

function claimLock(dataDir: string) {
  try {
    return takeLock(path.join(dataDir, 'launcher.lock'));
  } catch (error) {
    throw notWritable(dataDir, error);
  }
}

function notWritable(dataDir: string, error: unknown): Error {
  if (!(error instanceof Error && 'code' in error)) return new Error(String(error));
  if (error.code !== 'EACCES' && error.code !== 'EPERM' && error.code !== 'EROFS') return error;
  return new StartProblem(
    `This account may not write to ${dataDir}. Start Idem as the account that made it, or name another folder in IDEM_DATA_DIR.`,
  );
}

/** The lock is ours, so programs that still carry our mark belong to a launcher that was killed. */
async function endLeftovers(dataDir: string): Promise<void> {
  const mark = `${MARK}=${dataDir}`;
  const left = processIds().filter((pid) => environmentOf(pid).includes(mark));
  if (left.length === 0) return;
  say('Ending what a killed run left behind …');
  await endProcesses(left, 'SIGTERM', LEFTOVER_GRACE_MS);
}

/** Brings the database up (unless IDEM_DATABASE_URL names one) and to the present schema; returns the application's URL. */
export async function openDatabaseOf(life: Life, dataDir: string, env: NodeJS.ProcessEnv): Promise<string> {
  // The migration code takes about as long to load as the database to start.
  const loading = import('../../db/migrate');
  const ownerUrl = env.IDEM_DATABASE_URL || (await ownCluster(life, dataDir));
  life.signal.throwIfAborted();
  const { migrate } = await loading;
  try {
    return (await migrate(ownerUrl)).appUrl;
  } catch (error) {
    if (!env.IDEM_DATABASE_URL) throw error;
    throw new StartProblem(`The database that IDEM_DATABASE_URL names cannot be used: ${reasonOf(error)}`);
  }
}

/** Failed connections come as an AggregateError, whose own message is empty. */
function reasonOf(error: unknown): string {
  if (error instanceof AggregateError) return error.errors.map(reasonOf).join('; ');
  if (!(error instanceof Error)) return String(error);
  return error.cause === undefined ? error.message : `${error.message}: ${reasonOf(error.cause)}`;
}

async function ownCluster(life: Life, dataDir: string): Promise<string> {
  const isFirst = !existsSync(path.join(dataDir, 'logs', 'postgres.log'));
  if (isFirst) say('Setting up the database …');
  const cluster = await startCluster({ dataDir });
  if (cluster.adopted) {
    throw new StartProblem(
      `Another Idem command uses the database in ${dataDir} just now; start again when it has ended.`,
    );
  }
  keepClusterUp(life, cluster, dataDir);
  return cluster.ensureDatabase(DATABASE);
}

/** A database that dies is started again on its port, where web and worker look for it. */
function keepClusterUp(life: Life, first: Cluster, dataDir: string): void {
  let current: Promise<Cluster> = Promise.resolve(first);
  function watch(cluster: Cluster): void {
    void cluster.exited.then(() => {
      if (life.signal.aborted) return;
      say(
        `The database ended unexpectedly; it is started again. Log: ${path.join(dataDir, 'logs', 'postgres.log')}`,
      );
      current = cluster.stop().then(() => startCluster({ dataDir, port: cluster.port }));
      current.then(watch, (error: unknown) => life.fail(error));
    });
  }
  watch(first);
  life.defer(async () => {
    const cluster = await current.catch(() => null);
    await cluster?.stop();
  });
}

/** What web and worker processes get to know, as environment variables. */
export function programEnvironment(
  env: NodeJS.ProcessEnv,
  settings: { appUrl: string; dataDir: string; host: string; port: number },
): NodeJS.ProcessEnv {
  return {
    ...env,
    // The owner's address is for migrations alone.
    IDEM_DATABASE_URL: undefined,
    [MARK]: settings.dataDir,
    IDEM_APP_DATABASE_URL: settings.appUrl,
    IDEM_DATA_DIR: settings.dataDir,
    IDEM_HOST: settings.host,
    IDEM_PORT: String(settings.port),
    IDEM_SESSION_SECRET_FILE: sessionSecretFile(settings.dataDir),
  };
}

/** The key that signs sessions, made on the first start. */
function sessionSecretFile(dataDir: string): string {
  const file = path.join(dataDir, SECRET_FILE);
  if (!existsSync(file)) writeFileSync(file, `${randomBytes(32).toString('hex')}\n`, { mode: 0o600 });
  chmodSync(file, 0o600);
  return file;
}
