import { linkSync, readFileSync, renameSync, rmSync, writeFileSync } from 'node:fs';
import { processStart } from './cluster-processes';

/** The process that holds a lock, with what it wrote beside (an address, for example). */
export interface LockHolder {
  pid: number;
  note: string;
}

export interface ProcessLock {
  /** Leaves a line for those who find the lock taken. */
  write(note: string): void;
  release(): void;
}

export type LockClaim = { taken: true; lock: ProcessLock } | { taken: false; holder: LockHolder };

interface LockRecord extends LockHolder {
  start: string;
}

/**
 * Takes the lock file `file` for this process, or tells who has it. A lock whose process has died (kill -9, power
 * cut) is taken over; process ids that were given out again are told apart by their start time.
 */
export function takeLock(file: string): LockClaim {
  const own: LockRecord = { pid: process.pid, start: processStart(process.pid) ?? '', note: '' };
  const draft = `${file}.${process.pid}`;
  try {
    for (;;) {
      writeFileSync(draft, JSON.stringify(own));
      if (linked(draft, file)) return { taken: true, lock: lockOf(file, own) };
      const record = readLock(file);
      if (record !== null && isAlive(record)) return { taken: false, holder: record };
      removeStale(file, record, draft);
    }
  } finally {
    rmSync(draft, { force: true });
  }
}

/** Who holds the lock `file` at present, or null. */
export function lockHolder(file: string): LockHolder | null {
  const record = readLock(file);
  return record !== null && isAlive(record) ? record : null;
}

function lockOf(file: string, own: LockRecord): ProcessLock {
  return {
    write(note) {
      const draft = `${file}.${own.pid}`;
      writeFileSync(draft, JSON.stringify({ ...own, note }));
      renameSync(draft, file);
    },
    release() {
      const record = readLock(file);
      if (record?.pid === own.pid && record.start === own.start) rmSync(file, { force: true });
    },
  };
}

/** A hard link appears with its whole content at once, so nobody reads a half-written lock. */
function linked(draft: string, file: string): boolean {
  try {
    linkSync(draft, file);
    return true;
  } catch (error) {
    if (error instanceof Error && 'code' in error && error.code === 'EEXIST') return false;
    throw error;
  }
}

function readLock(file: string): LockRecord | null {
  try {
    const value: unknown = JSON.parse(readFileSync(file, 'utf8'));
    if (typeof value !== 'object' || value === null) return null;
    const { pid, start, note } = value as Partial<Record<keyof LockRecord, unknown>>;
    if (typeof pid !== 'number' || typeof start !== 'string' || typeof note !== 'string') return null;
    return { pid, start, note };
  } catch {
    return null;
  }
}

function isAlive(record: LockRecord): boolean {
  return processStart(record.pid) === record.start;
}

/** Moves the dead lock aside first: when another starter replaced it meanwhile, its fresh lock goes back. */
function removeStale(file: string, seen: LockRecord | null, draft: string): void {
  const aside = `${draft}.stale`;
  try {
    renameSync(file, aside);
  } catch {
    return;
  }
  const moved = readLock(aside);
  if (moved !== null && (moved.pid !== seen?.pid || moved.start !== seen.start)) linked(aside, file);
  rmSync(aside, { force: true });
}
