import type { z } from 'zod';
import { answerNotUnderstood, jsonOrNull, noConnection, problemOfBody, stopped } from './problem-error';

export type QueryValue = string | number | boolean | null | undefined | readonly (string | number)[];

export interface RequestPlan {
  method?: 'GET' | 'POST' | 'PUT' | 'PATCH' | 'DELETE';
  /** Path below the origin, e.g. from `groupPath`. */
  path: string;
  /** Parts that are null, undefined or '' are left out; a list repeats its name. */
  query?: Readonly<Record<string, QueryValue>>;
  /** Sent as JSON. */
  body?: unknown;
  /** Version that was seen, for edits of versioned things. */
  ifMatch?: string | number;
  signal?: AbortSignal;
}

/** The header that tells the server a change comes from this application and not from a foreign page. */
export const OWN_HEADER = ['X-Idem', '1'] as const;

/** Path of a group's API: `groupPath('lantern', 'runs', 3)` is '/api/groups/lantern/runs/3'. */
export function groupPath(group: string, ...parts: readonly (string | number)[]): string {
  return ['/api/groups', group, ...parts]
    .map((part, i) => (i === 0 ? part : encodeURIComponent(part)))
    .join('/');
}

/** A path with its query, for requests and for plain links (downloads). */
export function urlOf(path: string, query: RequestPlan['query'] = {}): string {
  const search = new URLSearchParams();
  for (const [name, value] of Object.entries(query)) {
    const values = Array.isArray(value) ? (value as readonly (string | number)[]) : [value];
    for (const one of values) {
      if (one !== null && one !== undefined && one !== '') search.append(name, String(one));
    }
  }
  const text = search.toString();
  return text === '' ? path : `${path}?${text}`;
}

/**
 * One request to the API. With `answer` the JSON is parsed by that schema, without it the answer is not read.
 * Throws ProblemError for every failure: no connection, a refusal of the server, an answer outside the contract.
 */
export async function request<S extends z.ZodType>(plan: RequestPlan & { answer: S }): Promise<z.output<S>>;
export async function request(plan: RequestPlan): Promise<void>;
export async function request(plan: RequestPlan & { answer?: z.ZodType }): Promise<unknown> {
  const { method = 'GET', path, answer } = plan;
  const headers = new Headers({ Accept: 'application/json, application/problem+json' });
  if (method !== 'GET') headers.set(...OWN_HEADER);
  if (plan.body !== undefined) headers.set('Content-Type', 'application/json');
  if (plan.ifMatch !== undefined) headers.set('If-Match', `"${plan.ifMatch}"`);
  const response = await send(urlOf(path, plan.query), {
    method,
    headers,
    body: plan.body === undefined ? undefined : JSON.stringify(plan.body),
    signal: plan.signal,
    credentials: 'same-origin',
  });
  const text = await response.text().catch(() => {
    throw noConnection();
  });
  if (!response.ok) throw problemOfBody(response.status, text);
  return answer === undefined ? undefined : parsedAnswer(answer, text, response.status, path);
}

async function send(url: string, init: RequestInit): Promise<Response> {
  try {
    return await fetch(url, init);
  } catch (error) {
    // An abort is not a failure: the caller (the query cache) asked for it and must see it as such.
    if (error instanceof DOMException && error.name === 'AbortError') throw error;
    throw noConnection();
  }
}

function parsedAnswer(answer: z.ZodType, text: string, status: number, path: string): unknown {
  const parsed = answer.safeParse(jsonOrNull(text));
  if (!parsed.success) {
    console.error(`answer of ${path}`, parsed.error);
    throw answerNotUnderstood(status, path);
  }
  return parsed.data;
}

export interface UploadProgress {
  sentBytes: number;
  totalBytes: number;
}

/**
 * Sends one file as multipart field "file" and tells how far it is; `signal` stops it (ProblemError 'stopped').
 * XMLHttpRequest, because fetch can't report the progress of a body that is being sent.
 */
export function upload<S extends z.ZodType>(
  path: string,
  file: File,
  onProgress: (progress: UploadProgress) => void,
  answer: S,
  signal?: AbortSignal,
): Promise<z.output<S>> {
  return new Promise((resolve, reject) => {
    const xhr = new XMLHttpRequest();
    xhr.open('POST', path);
    xhr.setRequestHeader(...OWN_HEADER);
    xhr.setRequestHeader('Accept', 'application/json, application/problem+json');
    xhr.upload.addEventListener('progress', (event) => {
      onProgress({ sentBytes: event.loaded, totalBytes: event.lengthComputable ? event.total : file.size });
    });
    xhr.addEventListener('error', () => reject(noConnection()));
    xhr.addEventListener('abort', () => reject(stopped()));
    xhr.addEventListener('load', () => {
      try {
        if (xhr.status < 200 || xhr.status > 299) throw problemOfBody(xhr.status, xhr.responseText);
        resolve(parsedAnswer(answer, xhr.responseText, xhr.status, path) as z.output<S>);
      } catch (error) {
        reject(error instanceof Error ? error : new Error(String(error)));
      }
    });
    if (signal?.aborted === true) return reject(stopped());
    signal?.addEventListener('abort', () => xhr.abort(), { once: true });
    const form = new FormData();
    form.append('file', file);
    xhr.send(form);
  });
}
