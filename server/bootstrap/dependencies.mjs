import { spawnSync } from 'node:child_process';
import { createHash } from 'node:crypto';
import { existsSync, readFileSync, writeFileSync } from 'node:fs';
import path from 'node:path';
import { say, SetupProblem } from './say.mjs';

const MINIMUM_NODE = [20, 19];

export function requireNode() {
  const [major = 0, minor = 0] = process.versions.node.split('.').map(Number);
  if (major > MINIMUM_NODE[0] || (major === MINIMUM_NODE[0] && minor >= MINIMUM_NODE[1])) return;
  throw new SetupProblem(
    `Idem needs Node ${MINIMUM_NODE.join('.')} or newer; this is Node ${process.versions.node}.`,
  );
}

/** Installs what package-lock.json lists, unless node_modules holds just that already. */
export function ensureDependencies(root) {
  const lockFile = path.join(root, 'package-lock.json');
  const stampFile = path.join(root, 'node_modules', '.idem-lock-hash');
  const lockText = readFileSync(lockFile, 'utf8');
  const hash = createHash('sha256').update(lockText).digest('hex');
  if (readIfThere(stampFile) === hash) return;
  if (!matchesInstalled(root, lockText)) {
    say('Installing dependencies from package-lock.json (once, up to a minute) …');
    npmCi(root);
  }
  writeFileSync(stampFile, hash);
}

function readIfThere(file) {
  return existsSync(file) ? readFileSync(file, 'utf8') : null;
}

/** True when npm's own record of what it installed agrees with the lock file, as after a developer's `npm install`. */
function matchesInstalled(root, lockText) {
  const recordText = readIfThere(path.join(root, 'node_modules', '.package-lock.json'));
  if (recordText === null) return false;
  const installed = JSON.parse(recordText).packages ?? {};
  return Object.entries(JSON.parse(lockText).packages ?? {}).every(([place, wanted]) => {
    if (place === '') return true;
    const found = installed[place];
    // Packages for other systems are in the lock file but never installed here.
    return found === undefined ? wanted.optional === true : found.version === wanted.version;
  });
}

function npmCi(root) {
  const npm = process.env.npm_execpath;
  const [command, prefix] = npm === undefined ? ['npm', []] : [process.execPath, [npm]];
  const args = [...prefix, 'ci', '--include=dev', '--no-audit', '--no-fund'];
  const { status, error } = spawnSync(command, args, { cwd: root, stdio: ['ignore', 2, 2] });
  if (status === 0) return;
  const why = error === undefined ? `it ended with ${status}` : error.message;
  throw new SetupProblem(
    `The dependencies could not be installed (npm ci: ${why}). Is the package registry reachable?`,
  );
}
