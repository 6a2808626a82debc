import { describe, expect, it } from 'vitest';
import type { Job } from '../../shared/schemas/job';
import { jobOfEvent, laterJob } from './job-progress';

const job = (change: Partial<Job>): Job => ({
  id: '0d7b5c40-9a4b-4c3e-8f00-2f4f1f0a7a11',
  kind: 'import',
  title: 'Import of DEEP',
  state: 'running',
  done: 10,
  total: 100,
  ratePerSecond: null,
  message: null,
  error: null,
  link: null,
  createdAt: '2026-01-01T00:00:00Z',
  startedAt: null,
  finishedAt: null,
  ...change,
});

describe('laterJob', () => {
  it('keeps what is further on', () => {
    const far = job({ done: 60 });
    expect(laterJob(far, job({ done: 40 }))).toBe(far);
    expect(laterJob(job({ done: 40 }), far)).toBe(far);
    const running = job({});
    expect(laterJob(running, job({ state: 'queued', done: 0 }))).toBe(running);
  });

  it('never goes back from the end', () => {
    const done = job({ state: 'done' });
    expect(laterJob(done, job({ done: 99 }))).toBe(done);
    expect(laterJob(job({ done: 99 }), done)).toBe(done);
  });

  it('takes another job as it comes', () => {
    const other = job({ id: '7b1f9c52-9a4b-4c3e-8f00-2f4f1f0a7a12', state: 'queued', done: 0 });
    expect(laterJob(job({ state: 'done' }), other)).toBe(other);
    expect(laterJob(undefined, other)).toBe(other);
  });
});

describe('jobOfEvent', () => {
  it('reads a job and refuses everything else', () => {
    expect(jobOfEvent(JSON.stringify(job({})))).toEqual(job({}));
    expect(jobOfEvent('not json')).toBeNull();
    expect(jobOfEvent(JSON.stringify({ ...job({}), state: 'flying' }))).toBeNull();
  });
});
