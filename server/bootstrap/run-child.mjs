import { spawn } from 'node:child_process';
import { readFileSync } from 'node:fs';
import { constants } from 'node:os';

const PASSED_ON = ['SIGINT', 'SIGTERM', 'SIGHUP'];
const PARENT_LOOK_MS = 500;

/**
 * Runs a program to its end and returns its exit code (128 + number for a signal). Signals are passed on. The child
 * has a process group of its own, so that Ctrl-C reaches it once, through here; it holds a channel to this process
 * and so learns of its death.
 */
export function runChild(command, args, options) {
  const child = spawn(command, args, {
    stdio: ['ignore', 'inherit', 'inherit', 'ipc'],
    detached: true,
    ...options,
  });
  for (const name of PASSED_ON) process.on(name, () => child.kill(name));
  const watch = watchNpm(() => child.kill('SIGTERM'));
  return new Promise((resolve, reject) => {
    child.once('error', reject);
    child.once('exit', (code, signal) => {
      clearInterval(watch);
      resolve(code ?? 128 + constants.signals[signal]);
    });
  });
}

/**
 * Under npm the program must end when npm does: npm passes a signal to its shell only, which dies of it without
 * telling anybody, and kill -9 of npm tells nobody at all.
 */
function watchNpm(whenGone) {
  if (process.env.npm_lifecycle_event === undefined) return undefined;
  const parent = process.ppid;
  const shell = parentOfShell(parent);
  return setInterval(() => {
    if (process.ppid !== parent || (shell !== null && parentOfShell(parent) !== shell)) whenGone();
  }, PARENT_LOOK_MS);
}

/** The parent of `pid` if that is the shell in which npm runs this command; null when it is npm itself. */
function parentOfShell(pid) {
  try {
    const isShell = readFileSync(`/proc/${pid}/cmdline`, 'utf8').split('\0')[1] === '-c';
    return isShell ? Number(/^PPid:\s*(\d+)/m.exec(readFileSync(`/proc/${pid}/status`, 'utf8'))?.[1]) : null;
  } catch {
    return null;
  }
}
