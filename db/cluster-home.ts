import { spawnSync } from 'node:child_process';
import { createHash, randomBytes } from 'node:crypto';
import {
  chmodSync,
  chownSync,
  existsSync,
  lstatSync,
  mkdirSync,
  readFileSync,
  rmSync,
  statSync,
  writeFileSync,
} from 'node:fs';
import path from 'node:path';
import type { Account } from './cluster-command';
import { ClusterProblem } from './cluster-problem';

/** Where a cluster lives and as whom its server runs. */
export interface ClusterHome {
  folder: string;
  /** PostgreSQL's own data folder; absent until the cluster is initialised. */
  data: string;
  account: Account;
  passwords: { admin: string; owner: string };
}

const FALLBACK_ROOT = '/var/tmp';

/**
 * Makes the folder of the cluster that belongs to `dataDir`. As root the server runs as `postgres` (it refuses to
 * be root) or as whoever owns a cluster made earlier; when that account cannot reach `dataDir` (a checkout in a
 * closed home folder) the cluster goes to a folder in /var/tmp that `dataDir` remembers.
 */
export function prepareHome(dataDir: string): ClusterHome {
  mkdirSync(dataDir, { recursive: true, mode: 0o700 });
  const pointer = path.join(dataDir, 'postgres.path');
  const remembered = existsSync(pointer)
    ? readFileSync(pointer, 'utf8').trim()
    : path.join(dataDir, 'postgres');
  const account = serverAccount(path.join(remembered, 'data'));
  let folder = remembered;
  if (account !== null && !canReach(dataDir, remembered, account)) {
    if (existsSync(path.join(remembered, 'data'))) {
      throw new ClusterProblem(
        `The account ${account.name} can no longer enter ${remembered}: make the folders above it enterable.`,
      );
    }
    folder = path.join(
      FALLBACK_ROOT,
      `idem-${createHash('sha256').update(remembered).digest('hex').slice(0, 12)}`,
    );
    writeFileSync(pointer, `${folder}\n`);
  }
  ownFolder(folder, account);
  return { folder, data: path.join(folder, 'data'), account, passwords: readPasswords(folder) };
}

function serverAccount(data: string): Account {
  if (process.getuid?.() !== 0) return null;
  if (existsSync(data)) {
    const { uid, gid } = statSync(data);
    if (uid !== 0) return { name: `number ${uid}`, uid, gid };
  }
  const number = (flag: '-u' | '-g') => {
    const { stdout, status } = spawnSync('id', [flag, 'postgres'], { encoding: 'utf8' });
    return status === 0 ? Number(stdout) : null;
  };
  const uid = number('-u');
  const gid = number('-g');
  if (uid === null || gid === null) {
    throw new ClusterProblem(
      'There is no account "postgres", and PostgreSQL refuses to run as root. Type: adduser --system --group postgres',
    );
  }
  return { name: 'postgres', uid, gid };
}

/** Root may always enter a folder, so the question is put as the account itself. */
function canReach(dataDir: string, folder: string, account: NonNullable<Account>): boolean {
  const parent = path.dirname(folder);
  const canEnter = () =>
    spawnSync('sh', ['-c', 'cd "$1"', 'sh', parent], { uid: account.uid, gid: account.gid, cwd: '/' })
      .status === 0;
  if (canEnter()) return true;
  if (parent !== dataDir || statSync(dataDir).uid !== 0) return false;
  // Passing through is enough: what lies in our own data folder is closed file by file.
  chmodSync(dataDir, 0o711);
  return canEnter();
}

function ownFolder(folder: string, account: Account): void {
  mkdirSync(folder, { recursive: true, mode: 0o700 });
  const wantedUid = account?.uid ?? process.getuid?.();
  const found = lstatSync(folder);
  if (
    !found.isDirectory() ||
    (wantedUid !== undefined && found.uid !== wantedUid && found.uid !== process.getuid?.())
  ) {
    throw new ClusterProblem(
      `${folder} belongs to another account (number ${found.uid}): start Idem as that account or as root, or name another folder in IDEM_DATA_DIR.`,
    );
  }
  if (account !== null) chownSync(folder, account.uid, account.gid);
  chmodSync(folder, 0o700);
}

/** Both passwords exist before the cluster does, so that a start that was cut short can be repeated. */
function readPasswords(folder: string): ClusterHome['passwords'] {
  const file = path.join(folder, 'passwords.json');
  if (!existsSync(file)) {
    if (existsSync(path.join(folder, 'data')))
      throw new ClusterProblem(`${file} is missing; without it nobody can sign in to the database.`);
    const fresh = { admin: randomBytes(24).toString('hex'), owner: randomBytes(24).toString('hex') };
    // Flushed: after a power cut the cluster is there, so the passwords must be.
    writeFileSync(file, JSON.stringify(fresh), { mode: 0o600, flush: true });
    return fresh;
  }
  const value: unknown = JSON.parse(readFileSync(file, 'utf8'));
  const { admin, owner } = value as Partial<Record<'admin' | 'owner', unknown>>;
  if (typeof admin !== 'string' || typeof owner !== 'string')
    throw new ClusterProblem(`${file} does not hold the two passwords.`);
  return { admin, owner };
}

/** Writes a file that only the server's account can read, for the time of `work`. */
export async function withPasswordFile(
  home: ClusterHome,
  work: (file: string) => Promise<void>,
): Promise<void> {
  const file = path.join(home.folder, 'initdb-password');
  rmSync(file, { force: true });
  writeFileSync(file, `${home.passwords.admin}\n`, { mode: 0o600, flag: 'wx' });
  try {
    if (home.account !== null) chownSync(file, home.account.uid, home.account.gid);
    await work(file);
  } finally {
    rmSync(file, { force: true });
  }
}
