import { spawn, type ChildProcess } from 'node:child_process';
import { createInterface } from 'node:readline';
import { boundCommand } from '../../db/cluster-command';
import type { Life } from './lifecycle';
import { openLogFile } from './log-file';
import { problemIn } from './log-line';
import { say, StartProblem } from './say';

const STOP_GRACE_MS = 10_000;
const FIRST_PAUSE_MS = 500;
const LONGEST_PAUSE_MS = 30_000;
/** A process that lived this long starts again with the shortest pause. */
const STEADY_MS = 60_000;
const REMEMBERED_LINES = 15;

export interface KeptProgram {
  /** As people read it: "web process". */
  name: string;
  /** Arguments of Node. */
  args: string[];
  env: NodeJS.ProcessEnv;
  cwd: string;
  logFile: string;
  /** Whether this line of its output says that it is ready. */
  isReady(line: string): boolean;
}

/**
 * Keeps a Node program running until the end of `life`: when it ends by itself it is started again, after a pause that
 * grows. Fulfilled when it is ready for the first time; a program that ends before that is a StartProblem.
 */
export function keepRunning(life: Life, program: KeptProgram): Promise<void> {
  const log = openLogFile(program.logFile);
  const lastLines: string[] = [];
  let child: ChildProcess | null = null;
  let restart: NodeJS.Timeout | undefined;
  let pauseMs = FIRST_PAUSE_MS;

  return new Promise((resolve, reject) => {
    let wasReady = false;
    function begin(): void {
      const startedMs = performance.now();
      child = spawnProgram(program, (line) => {
        log.writeLine(line);
        lastLines.push(line);
        if (lastLines.length > REMEMBERED_LINES) lastLines.shift();
        const problem = problemIn(line);
        if (problem !== null) say(`${program.name}: ${problem}`);
        if (!wasReady && program.isReady(line)) {
          wasReady = true;
          resolve();
        }
      });
      child.once('close', (code, signalName) => {
        child = null;
        if (life.signal.aborted) return reject(new StartProblem('Stopped while starting.'));
        const how = signalName ?? `code ${code}`;
        if (!wasReady) {
          return reject(
            new StartProblem(`The ${program.name} did not start (${how}):\n${lastLines.join('\n')}`),
          );
        }
        if (performance.now() - startedMs > STEADY_MS) pauseMs = FIRST_PAUSE_MS;
        say(`The ${program.name} ended unexpectedly (${how}); it is started again. Log: ${program.logFile}`);
        restart = setTimeout(begin, pauseMs);
        pauseMs = Math.min(2 * pauseMs, LONGEST_PAUSE_MS);
      });
    }
    // The end of `life` asks all programs at once and then waits for each.
    life.signal.addEventListener('abort', () => {
      clearTimeout(restart);
      child?.kill('SIGTERM');
    });
    life.defer(() => ended(child));
    begin();
  });
}

function spawnProgram(program: KeptProgram, onLine: (line: string) => void): ChildProcess {
  const bound = boundCommand(process.execPath, program.args, 'TERM');
  const child = spawn(bound.command, bound.args, {
    ...bound.options,
    cwd: program.cwd,
    env: program.env,
    detached: true,
    // The channel tells the child of this process's death where the kernel cannot.
    stdio: ['ignore', 'pipe', 'pipe', 'ipc'],
  });
  for (const stream of [child.stdout, child.stderr]) {
    if (stream !== null) createInterface({ input: stream }).on('line', onLine);
  }
  child.once('error', (error) => onLine(error.message));
  return child;
}

/** Waits for a child that was asked to end; SIGKILL when it does not. */
function ended(child: ChildProcess | null): Promise<void> {
  if (child === null || child.exitCode !== null || child.signalCode !== null) return Promise.resolve();
  return new Promise((resolve) => {
    const kill = setTimeout(() => child.kill('SIGKILL'), STOP_GRACE_MS);
    child.once('exit', () => {
      clearTimeout(kill);
      resolve();
    });
  });
}
