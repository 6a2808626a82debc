import { existsSync, mkdtempSync } from 'node:fs';
import { createServer } from 'node:net';
import { tmpdir } from 'node:os';
import path from 'node:path';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import {
  launch,
  postmasterOf,
  processesOf,
  processOf,
  remaining,
  wipe,
  type Launcher,
} from '../support/launcher';

const LIMIT_MS = 240_000;
const dataDir = mkdtempSync(path.join(tmpdir(), 'idem-start-'));

afterAll(() => wipe(dataDir), LIMIT_MS);

async function status(url: string): Promise<number> {
  return (await fetch(`${url}/readyz`)).status;
}

async function needsSetup(url: string): Promise<unknown> {
  const state = (await (await fetch(`${url}/api/session`)).json()) as { needsSetup?: unknown };
  return state.needsSetup;
}

describe('the start command', { timeout: LIMIT_MS }, () => {
  let running: Launcher;
  let url = '';

  beforeAll(async () => {
    running = launch(dataDir);
    url = await running.ready;
  }, LIMIT_MS);

  it('sets everything up on an empty folder and says how to begin', async () => {
    expect(await status(url)).toBe(200);
    await running.printed(/the first person to open it makes the owner account/);
    const page = await fetch(url);
    expect(page.headers.get('content-type')).toContain('text/html');
  });

  it('tells a second starter where the first one runs, and leaves that one alone', async () => {
    const second = launch(dataDir);
    expect(await second.exited).toBe(1);
    expect(second.output()).toContain(`already runs at ${url}`);
    expect(await status(url)).toBe(200);
  });

  it('starts the database again when it is killed, without losing what was stored', async () => {
    const answer = await fetch(`${url}/api/setup`, {
      method: 'POST',
      headers: { 'content-type': 'application/json', 'x-idem': '1' },
      body: JSON.stringify({
        email: 'owner@example.org',
        name: 'Owner',
        password: 'a password for tests',
        groupName: 'Test Group',
      }),
    });
    expect(answer.status).toBe(201);
    const killed = postmasterOf(dataDir);
    process.kill(killed, 'SIGKILL');
    await running.printed(/database ended unexpectedly/);
    await expect.poll(() => needsSetup(url), { timeout: 60_000 }).toBe(false);
    expect(postmasterOf(dataDir)).not.toBe(killed);
  });

  it('starts the web and the worker process again when they are killed', async () => {
    for (const name of ['web', 'worker']) {
      const killed = processOf(dataDir, `server/${name}.ts`);
      process.kill(killed, 'SIGKILL');
      await running.printed(new RegExp(`${name} process ended unexpectedly`));
      await expect.poll(() => findProcess(`server/${name}.ts`), { timeout: 60_000 }).toBeGreaterThan(0);
      expect(findProcess(`server/${name}.ts`)).not.toBe(killed);
    }
    await expect.poll(() => status(url).catch(() => 0), { timeout: 60_000 }).toBe(200);
  });

  it('takes everything down when the launcher alone is killed, and recovers', async () => {
    process.kill(processOf(dataDir, 'server/start.ts'), 'SIGKILL');
    expect(await running.exited).toBe(137);
    running = launch(dataDir);
    url = await running.ready;
    expect(await needsSetup(url)).toBe(false);
  });

  it('recovers when every process was killed at once', async () => {
    for (const { pid } of processesOf(dataDir)) process.kill(pid, 'SIGKILL');
    await running.exited;
    running = launch(dataDir);
    url = await running.ready;
    expect(await status(url)).toBe(200);
    expect(await needsSetup(url)).toBe(false);
  });

  it('stops every process on SIGTERM and gives its lock back', async () => {
    running.child.kill('SIGTERM');
    expect(await running.exited).toBe(0);
    expect(await remaining(dataDir)).toEqual([]);
    expect(existsSync(path.join(dataDir, 'launcher.lock'))).toBe(false);
    expect(existsSync(path.join(dataDir, 'postgres', 'data', 'postmaster.pid'))).toBe(false);
  });

  it('refuses a port that somebody else has, in words', async () => {
    const other = createServer();
    await new Promise<void>((resolve) => other.listen(0, '127.0.0.1', resolve));
    const address = other.address();
    const port = typeof address === 'object' && address !== null ? address.port : 0;
    const refused = launch(dataDir, { IDEM_PORT: String(port) });
    expect(await refused.exited).toBe(1);
    expect(refused.output()).toContain(`Port ${port} is in use`);
    other.close();
    expect(await remaining(dataDir)).toEqual([]);
  });

  function findProcess(part: string): number {
    return processesOf(dataDir).find(({ what }) => what.includes(part))?.pid ?? 0;
  }
});
