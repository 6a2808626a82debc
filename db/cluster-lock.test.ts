import { spawn } from 'node:child_process';
import { mkdtempSync, readdirSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import path from 'node:path';
import { afterAll, describe, expect, it } from 'vitest';
import { lockHolder, takeLock } from './cluster-lock';
import { processStart } from './cluster-processes';

const folder = mkdtempSync(path.join(tmpdir(), 'idem-lock-'));
afterAll(() => rmSync(folder, { recursive: true }));

let count = 0;
const freshFile = () => path.join(folder, `lock-${(count += 1)}`);

describe('a process lock', () => {
  it('is held by one at a time and free again after release', () => {
    const file = freshFile();
    const first = takeLock(file);
    if (!first.taken) throw new Error('not taken');
    first.lock.write('http://127.0.0.1:1');
    expect(takeLock(file)).toEqual({
      taken: false,
      holder: { pid: process.pid, start: processStart(process.pid), note: 'http://127.0.0.1:1' },
    });
    first.lock.release();
    expect(lockHolder(file)).toBeNull();
    expect(takeLock(file).taken).toBe(true);
  });

  it('is taken over from a process that has died', async () => {
    const file = freshFile();
    const child = spawn('sleep', ['60']);
    const pid = child.pid ?? 0;
    writeFileSync(file, JSON.stringify({ pid, start: processStart(pid), note: '' }));
    expect(takeLock(file).taken).toBe(false);
    child.kill('SIGKILL');
    await new Promise((resolve) => child.once('exit', resolve));
    expect(takeLock(file).taken).toBe(true);
  });

  it('is taken over when the process id was given to another process since', () => {
    const file = freshFile();
    writeFileSync(file, JSON.stringify({ pid: process.ppid, start: '1', note: '' }));
    expect(takeLock(file).taken).toBe(true);
  });

  it('is taken over when its file is empty, as after a power cut', () => {
    const file = freshFile();
    writeFileSync(file, '');
    expect(takeLock(file).taken).toBe(true);
  });

  it('is not released by one who lost it', () => {
    const file = freshFile();
    const first = takeLock(file);
    writeFileSync(file, JSON.stringify({ pid: process.ppid, start: processStart(process.ppid), note: '' }));
    if (first.taken) first.lock.release();
    expect(lockHolder(file)?.pid).toBe(process.ppid);
  });

  it('leaves no other files behind', () => {
    expect(readdirSync(folder).filter((name) => !/^lock-\d+$/.test(name))).toEqual([]);
  });
});
