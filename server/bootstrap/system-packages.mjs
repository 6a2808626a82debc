import { spawnSync } from 'node:child_process';
import { existsSync, mkdirSync, writeFileSync } from 'node:fs';
import path from 'node:path';
import { findPostgres, MINIMUM_MAJOR } from '../../db/cluster-binaries.mjs';
import { say, SetupProblem } from './say.mjs';

/** The browser of the tests; IDEM_CHROMIUM names another one. */
const CHROMIUM = process.env.IDEM_CHROMIUM ?? '/usr/bin/chromium';

const APT_OPTIONS = ['-y', '-q', '--no-install-recommends'];
const CREATE_CLUSTER_CONFIG = '/etc/postgresql-common/createcluster.d/idem-no-main.conf';

/** Makes sure that the programs of a PostgreSQL server are there. */
export function ensurePostgres(command) {
  if (findPostgres() !== null) return;
  requireInstaller('postgresql', `PostgreSQL ${MINIMUM_MAJOR} or newer is not installed.`, command);
  // Debian would start a database of its own on port 5432; Idem keeps its own one elsewhere.
  mkdirSync(path.dirname(CREATE_CLUSTER_CONFIG), { recursive: true });
  writeFileSync(CREATE_CLUSTER_CONFIG, 'create_main_cluster = false\n');
  install('postgresql');
  if (findPostgres() === null) {
    throw new SetupProblem(
      `Debian's postgresql is older than ${MINIMUM_MAJOR}. Set IDEM_DATABASE_URL to use another server.`,
    );
  }
}

/** Makes sure that Chromium, which the browser tests drive, is there. */
export function ensureChromium(command) {
  if (existsSync(CHROMIUM)) return;
  requireInstaller('chromium', `${CHROMIUM} is missing (the browser tests need it).`, command);
  install('chromium');
}

/** Only root can install; everybody else is told what to type. */
function requireInstaller(name, problem, command) {
  if (process.getuid?.() === 0 && hasApt()) return;
  const remedy = hasApt()
    ? `Type this, then ${command} again:\n  sudo apt-get update && sudo apt-get install ${APT_OPTIONS.join(' ')} ${name}`
    : `Install the package ${name} of your system, then ${command} again.`;
  throw new SetupProblem(`${problem} ${remedy}`);
}

function hasApt() {
  return existsSync('/usr/bin/apt-get');
}

function install(name) {
  say(`Installing ${name} with apt-get (some seconds) …`);
  const env = { ...process.env, DEBIAN_FRONTEND: 'noninteractive' };
  // A failed update is no reason to stop: the lists of an earlier one may do.
  apt(['update', '-q'], env);
  const { ok, output } = apt(['install', ...APT_OPTIONS, name], env);
  if (!ok) throw new SetupProblem(`apt-get could not install ${name}:\n${output}`);
}

function apt(args, env) {
  const result = spawnSync('apt-get', args, {
    env,
    encoding: 'utf8',
    stdio: ['ignore', 'pipe', 'pipe'],
    cwd: '/',
  });
  return { ok: result.status === 0, output: `${result.stdout}${result.stderr}`.trim() };
}
