import { spawn, type ChildProcess } from 'node:child_process';
import { existsSync, readFileSync, rmSync } from 'node:fs';
import path from 'node:path';
import {
  commandLineOf,
  environmentOf,
  processIds,
  processStart,
  waitUntil,
} from '../../db/cluster-processes';
import { PROJECT_ROOT } from '../../server/launch/project';

const READY = /Idem is ready: (\S+)/;
const GONE_LIMIT_MS = 20_000;

/** A start command that a test runs. */
export interface Launcher {
  child: ChildProcess;
  /** Everything it has printed so far. */
  output(): string;
  /** Fulfilled with its address when it is ready; rejected with its output when it ends before. */
  ready: Promise<string>;
  /** Fulfilled when it prints a line that fits. */
  printed(pattern: RegExp): Promise<RegExpExecArray>;
  /** Its exit code, once it has ended. */
  exited: Promise<number | null>;
}

/** Runs the start command on a data folder, without demo and on any free port. */
export function launch(dataDir: string, env: NodeJS.ProcessEnv = {}): Launcher {
  const child = spawn(process.execPath, [path.join('server', 'bootstrap.mjs'), 'start'], {
    cwd: PROJECT_ROOT,
    env: {
      ...withoutIdem(process.env),
      IDEM_DATA_DIR: dataDir,
      IDEM_DEMO: '0',
      IDEM_PORT: '0',
      NODE_ENV: undefined,
      ...env,
    },
    stdio: ['ignore', 'pipe', 'pipe'],
  });
  let text = '';
  const listeners = new Set<() => void>();
  const hear = (chunk: Buffer) => {
    text += chunk.toString();
    for (const listener of listeners) listener();
  };
  child.stdout.on('data', hear);
  child.stderr.on('data', hear);
  const exited = new Promise<number | null>((resolve) => child.once('close', resolve));
  const printed = (pattern: RegExp) =>
    new Promise<RegExpExecArray>((resolve, reject) => {
      const look = () => {
        const match = pattern.exec(text);
        if (match === null) return;
        listeners.delete(look);
        resolve(match);
      };
      listeners.add(look);
      look();
      void exited.then(() => reject(new Error(`ended without printing ${pattern}:\n${text}`)));
    });
  const ready = printed(READY).then((match) => match[1] ?? '');
  ready.catch(() => undefined);
  return { child, output: () => text, ready, printed, exited };
}

/** The test run may itself run inside an installation; its settings must not leak into this one. */
function withoutIdem(env: NodeJS.ProcessEnv): NodeJS.ProcessEnv {
  return Object.fromEntries(Object.entries(env).filter(([name]) => !/^(IDEM|npm|VITEST)_/.test(name)));
}

/** Living processes that belong to a data folder: it stands in their arguments or their environment. */
export function processesOf(dataDir: string): { pid: number; what: string }[] {
  const own = new Set([process.pid, process.ppid]);
  return processIds()
    .filter((pid) => !own.has(pid) && processStart(pid) !== null)
    .map((pid) => ({ pid, args: commandLineOf(pid), env: environmentOf(pid) }))
    .filter(({ args, env }) => [...args, ...env].some((part) => part.includes(dataDir)))
    .map(({ pid, args }) => ({ pid, what: args.join(' ').slice(0, 120) }));
}

/** The process of an installation whose arguments contain `part`; throws when there is not just one. */
export function processOf(dataDir: string, part: string): number {
  const [found, ...others] = processesOf(dataDir).filter(({ what }) => what.includes(part));
  if (found === undefined || others.length > 0)
    throw new Error(`${others.length} processes besides ${found?.what} fit ${part}`);
  return found.pid;
}

/** The pid of the database server of a data folder. */
export function postmasterOf(dataDir: string): number {
  return Number(
    readFileSync(path.join(dataDir, 'postgres', 'data', 'postmaster.pid'), 'utf8').split('\n')[0],
  );
}

/** Waits until no process of the data folder is left; returns those that stayed. */
export async function remaining(dataDir: string): Promise<{ pid: number; what: string }[]> {
  await waitUntil(() => processesOf(dataDir).length === 0, GONE_LIMIT_MS);
  return processesOf(dataDir);
}

/** Ends whatever a failed test left running, and removes the folder. */
export async function wipe(dataDir: string): Promise<void> {
  for (const { pid } of processesOf(dataDir)) process.kill(pid, 'SIGKILL');
  await remaining(dataDir);
  if (existsSync(dataDir)) rmSync(dataDir, { recursive: true, force: true, maxRetries: 5 });
}
