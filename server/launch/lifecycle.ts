import { say, tell } from './say';

/** What the parts of a running installation share: when to stop, and what to undo then. */
export interface Life {
  /** Aborted as soon as the installation is to stop. */
  signal: AbortSignal;
  /** Registers work for the end; it runs in reverse order of registration. */
  defer(work: () => Promise<void> | void): void;
  /** Stops everything because of a problem; the process ends with exit code 1. */
  fail(problem: unknown): void;
}

/** A start that is asked to stop gets this long to notice before its parts are stopped under it. */
const SETTLE_LIMIT_MS = 20_000;

/**
 * Runs `start`, keeps the process until SIGINT, SIGTERM, SIGHUP or the death of its parent, then undoes everything in
 * reverse order and ends the process: 0 after a signal, 1 after a problem.
 */
export function live(start: (life: Life) => Promise<void>): void {
  const abort = new AbortController();
  const deferred: (() => Promise<void> | void)[] = [];
  let started: Promise<void> = Promise.resolve();

  async function end(exitCode: number): Promise<void> {
    if (abort.signal.aborted) return;
    abort.abort();
    await settled(started);
    for (const work of deferred.reverse()) {
      try {
        await work();
      } catch (error) {
        tell(error);
        exitCode = 1;
      }
    }
    process.exit(exitCode);
  }
  function askedToStop(): void {
    if (!abort.signal.aborted) say('Stopping …');
    void end(0);
  }
  function fail(problem: unknown): void {
    if (abort.signal.aborted) return;
    tell(problem);
    void end(1);
  }

  // A closed terminal must not keep the rest from being stopped in order.
  process.stdout.on('error', () => undefined);
  process.on('SIGINT', askedToStop);
  process.on('SIGTERM', askedToStop);
  process.on('SIGHUP', askedToStop);
  process.on('disconnect', askedToStop);
  started = start({ signal: abort.signal, defer: (work) => deferred.push(work), fail });
  started.catch(fail);
}

/** Waits for the start to end, well or badly, but not for ever. */
async function settled(started: Promise<void>): Promise<void> {
  const limit = new Promise<void>((resolve) => setTimeout(resolve, SETTLE_LIMIT_MS).unref());
  await Promise.race([started.catch(() => undefined), limit]);
}
