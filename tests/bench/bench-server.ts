import { spawn, type ChildProcess } from 'node:child_process';
import { randomBytes } from 'node:crypto';
import { mkdtempSync, readFileSync } from 'node:fs';
import { rm } from 'node:fs/promises';
import { createInterface } from 'node:readline';
import { tmpdir } from 'node:os';
import path from 'node:path';
import { startCluster } from '../../db/cluster';
import { migrate } from '../../db/migrate';

/** A real installation on this machine: durable PostgreSQL, web and worker as processes of their own. */
export interface BenchServer {
  ownerUrl: string;
  url: string;
  folder: string;
  /** Path below the group of the bench. */
  api(below: string): string;
  fetch(path: string, init?: RequestInit): Promise<Response>;
  /** Highest resident memory so far of a process, MB. */
  peakMemoryMb(process: 'web' | 'worker'): number;
  close(): Promise<void>;
}

const PORT = 18_440;
const root = path.join(import.meta.dirname, '..', '..');

/** Starts everything in a fresh temporary folder and makes the first account. */
export async function openBenchServer(): Promise<BenchServer> {
  const folder = mkdtempSync(path.join(tmpdir(), 'idem-bench-'));
  const cluster = await startCluster({ dataDir: folder, settings: 'durable' });
  const ownerUrl = await cluster.ensureDatabase('idem');
  const { appUrl } = await migrate(ownerUrl);
  const env = {
    ...process.env,
    IDEM_APP_DATABASE_URL: appUrl,
    IDEM_DATA_DIR: folder,
    IDEM_PORT: String(PORT),
    IDEM_SESSION_SECRET: randomBytes(32).toString('hex'),
    IDEM_LOG_LEVEL: 'info',
  };
  const web = await startProcess('server/web.ts', env);
  const worker = await startProcess('server/worker.ts', env);
  const url = `http://127.0.0.1:${PORT}`;
  const cookie = await makeAccount(url);
  return {
    ownerUrl,
    url,
    folder,
    api: (below) => `/api/groups/bench/${below}`,
    fetch: (target, init = {}) =>
      fetch(`${url}${target}`, { ...init, headers: { ...init.headers, Cookie: cookie, 'X-Idem': '1' } }),
    peakMemoryMb: (which) => peakMemoryMb(which === 'web' ? web : worker),
    async close() {
      await Promise.all([stop(web), stop(worker)]);
      await cluster.stop();
      await rm(folder, { recursive: true, force: true });
    },
  };
}

async function startProcess(script: string, env: NodeJS.ProcessEnv): Promise<ChildProcess> {
  const child = spawn(process.execPath, ['--import', 'tsx', path.join(root, script)], {
    cwd: root,
    env,
    stdio: ['ignore', 'pipe', 'inherit', 'ipc'],
  });
  if (child.stdout === null) throw new Error('no output');
  const lines = createInterface({ input: child.stdout });
  await new Promise<void>((resolve, reject) => {
    child.once('exit', (code) => reject(new Error(`${script} ended with ${code}`)));
    lines.on('line', (line) => {
      if (line.includes('"ready":true')) resolve();
    });
  });
  return child;
}

async function stop(child: ChildProcess): Promise<void> {
  if (child.exitCode !== null) return;
  const gone = new Promise((resolve) => child.once('exit', resolve));
  child.kill('SIGTERM');
  await gone;
}

/** VmHWM of proc(5): the peak of the resident set, in kB. */
function peakMemoryMb(child: ChildProcess): number {
  const status = readFileSync(`/proc/${child.pid}/status`, 'utf8');
  return Number(/VmHWM:\s+(\d+)/.exec(status)?.[1]) / 1024;
}

async function makeAccount(url: string): Promise<string> {
  const answer = await fetch(`${url}/api/setup`, {
    method: 'POST',
    headers: { 'Content-Type': 'application/json', 'X-Idem': '1' },
    body: JSON.stringify({
      name: 'Bench',
      email: 'bench@example.org',
      password: 'a password for the bench',
      groupName: 'Bench',
    }),
  });
  if (answer.status !== 201) throw new Error(`set-up answered ${answer.status}`);
  return answer.headers.getSetCookie()[0]?.split(';')[0] ?? '';
}
