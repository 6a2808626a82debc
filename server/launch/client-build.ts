import { spawn } from 'node:child_process';
import { createHash } from 'node:crypto';
import { existsSync, mkdirSync, readdirSync, readFileSync, renameSync, rmSync, writeFileSync } from 'node:fs';
import path from 'node:path';
import { boundCommand } from '../../db/cluster-command';
import { takeLock, type ProcessLock } from '../../db/cluster-lock';
import { PROJECT_ROOT } from './project';
import { StartProblem } from './say';

const DIST = path.join(PROJECT_ROOT, 'dist');
const CLIENT = path.join(DIST, 'client');
const HASH_FILE = path.join(DIST, '.source-hash');
const SOURCES = ['client', 'shared', 'index.html', 'vite.config.ts', 'package-lock.json'];

/** Builds the client into dist/client unless that was built from just these sources; `onBuild` hears of a build. */
export async function ensureClientBuilt(onBuild: () => void, signal?: AbortSignal): Promise<void> {
  const wanted = sourceHash();
  if (isBuilt(wanted)) return;
  mkdirSync(DIST, { recursive: true });
  const lock = await waitForLock(path.join(DIST, 'build.lock'));
  try {
    if (isBuilt(wanted)) return;
    onBuild();
    await build(signal);
    writeFileSync(HASH_FILE, wanted);
  } finally {
    lock.release();
  }
}

function isBuilt(hash: string): boolean {
  return (
    existsSync(path.join(CLIENT, 'index.html')) &&
    existsSync(HASH_FILE) &&
    readFileSync(HASH_FILE, 'utf8') === hash
  );
}

function sourceHash(): string {
  const hash = createHash('sha256');
  for (const source of SOURCES) {
    for (const file of filesUnder(source)) {
      hash
        .update(`${file}\0`)
        .update(readFileSync(path.join(PROJECT_ROOT, file)))
        .update('\0');
    }
  }
  return hash.digest('hex');
}

/** The files of a folder (or the file itself) in a fixed order, without tests, which are no part of the client. */
function filesUnder(source: string): string[] {
  const full = path.join(PROJECT_ROOT, source);
  if (!existsSync(full)) return [];
  return readdirOrFile(source, full)
    .filter((file) => !/\.test\.tsx?$/.test(file))
    .sort();
}

function readdirOrFile(source: string, full: string): string[] {
  if (path.extname(source) !== '') return [source];
  return readdirSync(full, { withFileTypes: true, recursive: true })
    .filter((entry) => entry.isFile())
    .map((entry) => path.relative(PROJECT_ROOT, path.join(entry.parentPath, entry.name)));
}

/** Two commands that start together build once. */
async function waitForLock(file: string): Promise<ProcessLock> {
  for (;;) {
    const claim = takeLock(file);
    if (claim.taken) return claim.lock;
    await new Promise((resolve) => setTimeout(resolve, 100));
  }
}

/** Builds beside and swaps, so that a running server never finds half a client. */
async function build(signal?: AbortSignal): Promise<void> {
  const fresh = `${CLIENT}.new`;
  const old = `${CLIENT}.old`;
  for (const folder of [fresh, old]) rmSync(folder, { recursive: true, force: true });
  await runVite(['build', '--outDir', fresh, '--emptyOutDir', '--logLevel', 'warn'], signal);
  if (existsSync(CLIENT)) renameSync(CLIENT, old);
  renameSync(fresh, CLIENT);
  rmSync(old, { recursive: true, force: true });
}

async function runVite(args: string[], signal?: AbortSignal): Promise<void> {
  const vite = path.join(PROJECT_ROOT, 'node_modules', 'vite', 'bin', 'vite.js');
  const bound = boundCommand(process.execPath, [vite, ...args], 'KILL');
  const child = spawn(bound.command, bound.args, {
    cwd: PROJECT_ROOT,
    env: { ...process.env, NODE_ENV: 'production', NO_COLOR: '1', FORCE_COLOR: undefined },
    stdio: ['ignore', 'pipe', 'pipe'],
    signal,
  });
  let output = '';
  for (const stream of [child.stdout, child.stderr]) {
    stream?.on('data', (chunk: Buffer) => (output += chunk.toString()));
  }
  const code = await new Promise<number | null>((resolve, reject) => {
    child.once('error', reject);
    child.once('close', resolve);
  });
  if (code !== 0) throw new StartProblem(`The client could not be built:\n${output.trim()}`);
}
