// Plain JavaScript, because the start command needs it before any dependency (and so TypeScript) is there.
import { spawnSync } from 'node:child_process';
import { accessSync, constants, readdirSync } from 'node:fs';
import path from 'node:path';

/** The oldest PostgreSQL that the schema is written for. */
export const MINIMUM_MAJOR = 15;

// Debian keeps the server programs in a folder per version, off the PATH.
const VERSIONED_ROOT = '/usr/lib/postgresql';
const PROGRAMS = ['initdb', 'postgres'];

/**
 * Finds the server programs of PostgreSQL: versioned folders first (newest first), then the PATH.
 *
 * @param {number} [major] only this major version will do (a data folder belongs to one)
 * @returns {{ binDir: string, major: number } | null}
 */
export function findPostgres(major) {
  for (const found of candidates()) {
    if (major === undefined ? found.major >= MINIMUM_MAJOR : found.major === major) return found;
  }
  return null;
}

function* candidates() {
  for (const version of versionedFolders()) {
    const binDir = path.join(VERSIONED_ROOT, String(version), 'bin');
    if (PROGRAMS.every((program) => isExecutable(path.join(binDir, program))))
      yield { binDir, major: version };
  }
  for (const folder of (process.env.PATH ?? '').split(path.delimiter)) {
    if (!path.isAbsolute(folder)) continue;
    if (!PROGRAMS.every((program) => isExecutable(path.join(folder, program)))) continue;
    const major = majorOf(path.join(folder, 'postgres'));
    if (major !== null) yield { binDir: folder, major };
  }
}

function versionedFolders() {
  try {
    return readdirSync(VERSIONED_ROOT)
      .map(Number)
      .filter(Number.isInteger)
      .sort((a, b) => b - a);
  } catch {
    return [];
  }
}

function isExecutable(file) {
  try {
    accessSync(file, constants.X_OK);
    return true;
  } catch {
    return false;
  }
}

function majorOf(postgres) {
  const { stdout } = spawnSync(postgres, ['--version'], { encoding: 'utf8', cwd: '/' });
  const match = /(\d+)(\.\d+|beta|rc|devel)/.exec(stdout ?? '');
  return match === null ? null : Number(match[1]);
}
