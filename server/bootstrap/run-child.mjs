import { spawn } from 'node:child_process';
import { constants } from 'node:os';

const PASSED_ON = ['SIGINT', 'SIGTERM', 'SIGHUP'];
const PARENT_LOOK_MS = 1000;

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

/** Under npm, a killed npm must not leave the program running unseen. */
function watchNpm(whenGone) {
  const parent = process.ppid;
  if (process.env.npm_lifecycle_event === undefined) return undefined;
  return setInterval(() => {
    if (process.ppid !== parent) whenGone();
  }, PARENT_LOOK_MS);
}
