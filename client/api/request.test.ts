import { afterEach, describe, expect, it, vi } from 'vitest';
import { z } from 'zod';
import { problemOfBody, ProblemError } from './problem-error';
import { worthRetrying } from './query-client';
import { groupPath, request, urlOf } from './request';

afterEach(() => vi.unstubAllGlobals());

/** Stands in for the network: answers with one response and keeps what was asked. */
function network(answer: () => Response): { url: string; init: RequestInit }[] {
  const asked: { url: string; init: RequestInit }[] = [];
  vi.stubGlobal('fetch', (url: string, init: RequestInit) => {
    asked.push({ url, init });
    return Promise.resolve(answer());
  });
  return asked;
}

const json = (body: unknown, status = 200) => new Response(JSON.stringify(body), { status });

async function problemOf(promise: Promise<unknown>): Promise<ProblemError> {
  try {
    await promise;
  } catch (error) {
    if (error instanceof ProblemError) return error;
    throw error;
  }
  throw new Error('the request succeeded');
}

describe('addresses', () => {
  it('encodes every part of a path', () => {
    expect(groupPath('lantern', 'catalogues', 'A/B', 3)).toBe('/api/groups/lantern/catalogues/A%2FB/3');
  });

  it('leaves out what is empty and repeats lists', () => {
    expect(urlOf('/x', { q: 'α Cen', n: 0, none: null, not: undefined, empty: '', many: ['a', 'b'] })).toBe(
      '/x?q=%CE%B1+Cen&n=0&many=a&many=b',
    );
    expect(urlOf('/x')).toBe('/x');
  });
});

describe('request', () => {
  it('parses the answer by its schema', async () => {
    const asked = network(() => json({ total: 3 }));
    await expect(
      request({ path: '/api/x', query: { a: 1 }, answer: z.object({ total: z.number() }) }),
    ).resolves.toEqual({
      total: 3,
    });
    expect(asked[0]?.url).toBe('/api/x?a=1');
    expect(new Headers(asked[0]?.init.headers).has('X-Idem')).toBe(false);
  });

  it('sends our own header, the version and JSON with changes', async () => {
    const asked = network(() => new Response(null, { status: 204 }));
    await request({ method: 'PATCH', path: '/api/x', body: { a: 1 }, ifMatch: 7 });
    const headers = new Headers(asked[0]?.init.headers);
    expect([headers.get('X-Idem'), headers.get('If-Match'), headers.get('Content-Type')]).toEqual([
      '1',
      '"7"',
      'application/json',
    ]);
    expect(asked[0]?.init.body).toBe('{"a":1}');
  });

  it('throws the problem of a refusal with its code, hint and fields', async () => {
    const errors = [{ path: 'label', message: 'Taken.' }];
    network(() =>
      json({ type: '/p', title: 'T', status: 409, code: 'label-taken', detail: 'D', hint: 'H', errors }, 409),
    );
    const problem = await problemOf(request({ method: 'POST', path: '/api/x', body: {} }));
    expect(problem).toMatchObject({ code: 'label-taken', status: 409, detail: 'D', hint: 'H', errors });
  });

  it('names a lost connection, an answer outside the contract, and a failure without problem details', async () => {
    vi.stubGlobal('fetch', () => Promise.reject(new TypeError('network')));
    expect((await problemOf(request({ path: '/api/x' }))).code).toBe('no-connection');
    network(() => json({ total: 'three' }));
    vi.spyOn(console, 'error').mockImplementationOnce(() => undefined);
    const answer = z.object({ total: z.number() });
    expect((await problemOf(request({ path: '/api/x', answer }))).code).toBe('answer-not-understood');
    expect(problemOfBody(502, '<html>').code).toBe('http-502');
  });

  it('lets an abort through as an abort', async () => {
    const abort = new DOMException('stopped', 'AbortError');
    vi.stubGlobal('fetch', () => Promise.reject(abort));
    await expect(request({ path: '/api/x' })).rejects.toBe(abort);
  });
});

describe('retries', () => {
  it('are for lost connections and failing servers only', () => {
    const of = (status: number, code = 'x') => new ProblemError({ status, code, title: '', detail: '' });
    expect(worthRetrying(0, of(0, 'no-connection'))).toBe(true);
    expect(worthRetrying(1, of(503))).toBe(true);
    expect(worthRetrying(2, of(503))).toBe(false);
    expect(worthRetrying(0, of(404))).toBe(false);
    expect(worthRetrying(0, new Error('bug'))).toBe(false);
  });
});
