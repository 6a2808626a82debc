import { readdirSync, readFileSync, readlinkSync } from 'node:fs';

/** The text of a file below /proc, or '' when the process is gone, is another user's, or there is no /proc. */
function procText(pid: number, file: string): string {
  try {
    return readFileSync(`/proc/${pid}/${file}`, 'utf8');
  } catch {
    return '';
  }
}

/** The process ids of this machine (none where the system has no /proc). */
export function processIds(): number[] {
  try {
    return readdirSync('/proc').map(Number).filter(Number.isInteger);
  } catch {
    return [];
  }
}

/**
 * What tells two processes with the same id apart: the start time in clock ticks since boot. Null when the
 * process is gone or a zombie; '' where the system has no /proc.
 */
export function processStart(pid: number): string | null {
  const stat = procText(pid, 'stat');
  if (stat === '') return processIds().length === 0 && answersSignals(pid) ? '' : null;
  // Fields are counted from behind the command name, which may hold spaces and brackets itself.
  const fields = stat.slice(stat.lastIndexOf(')') + 2).split(' ');
  return fields[0] === 'Z' ? null : (fields[19] ?? null);
}

function answersSignals(pid: number): boolean {
  try {
    process.kill(pid, 0);
    return true;
  } catch (error) {
    return error instanceof Error && 'code' in error && error.code === 'EPERM';
  }
}

/** The arguments with which a process was started. */
export function commandLineOf(pid: number): string[] {
  return procText(pid, 'cmdline').split('\0').slice(0, -1);
}

/** The environment with which a process was started, as NAME=value. */
export function environmentOf(pid: number): string[] {
  return procText(pid, 'environ').split('\0');
}

/** PostgreSQL processes that work in `dataFolder`. */
export function postgresProcessesIn(dataFolder: string): number[] {
  return processIds().filter((pid) => {
    if (!procText(pid, 'comm').startsWith('postgres')) return false;
    try {
      return readlinkSync(`/proc/${pid}/cwd`) === dataFolder;
    } catch {
      return false;
    }
  });
}

/** Sends a signal; a process that is gone already is no error. */
export function signal(pid: number, name: NodeJS.Signals): void {
  try {
    process.kill(pid, name);
  } catch (error) {
    if (!(error instanceof Error && 'code' in error && error.code === 'ESRCH')) throw error;
  }
}

/** Looks every few milliseconds until `isDone` says yes; false when `limitMs` have passed. */
export async function waitUntil(isDone: () => boolean, limitMs: number): Promise<boolean> {
  const deadline = performance.now() + limitMs;
  while (!isDone()) {
    if (performance.now() > deadline) return false;
    await new Promise((resolve) => setTimeout(resolve, 20));
  }
  return true;
}

/** Ends processes: `first` signal, then SIGKILL for those that still live after `graceMs`. */
export async function endProcesses(pids: number[], first: NodeJS.Signals, graceMs: number): Promise<void> {
  const living = () => pids.filter((pid) => processStart(pid) !== null);
  for (const pid of living()) signal(pid, first);
  if (await waitUntil(() => living().length === 0, graceMs)) return;
  for (const pid of living()) signal(pid, 'SIGKILL');
  await waitUntil(() => living().length === 0, graceMs);
}
