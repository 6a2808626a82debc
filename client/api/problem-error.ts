import { problem, type Problem } from '../../shared/schemas/problem';

type FieldProblems = NonNullable<Problem['errors']>;

/** A request that did not succeed, in the words of the server (or ours, when no server answered). */
export class ProblemError extends Error {
  readonly code: string;
  /** HTTP status; 0 when no answer came at all. */
  readonly status: number;
  readonly title: string;
  readonly detail: string;
  readonly hint: string | undefined;
  readonly errors: FieldProblems;

  constructor(given: Pick<Problem, 'code' | 'status' | 'title' | 'detail' | 'hint' | 'errors'>) {
    super(given.detail);
    this.name = 'ProblemError';
    this.code = given.code;
    this.status = given.status;
    this.title = given.title;
    this.detail = given.detail;
    this.hint = given.hint;
    this.errors = given.errors ?? [];
  }
}

export function noConnection(): ProblemError {
  return new ProblemError({
    code: 'no-connection',
    status: 0,
    title: 'No connection',
    detail: 'The server could not be reached.',
    hint: 'Check the network and try again; nothing you typed is lost.',
  });
}

export function stopped(): ProblemError {
  return new ProblemError({
    code: 'stopped',
    status: 0,
    title: 'Stopped',
    detail: 'The transfer was stopped before it ended.',
  });
}

/** A foreign group and a missing one look the same. */
export function noSuchGroup(group: string): ProblemError {
  return new ProblemError({
    code: 'not-found',
    status: 404,
    title: 'No such group',
    detail: `There is no group '${group}' among yours.`,
    hint: 'Check the address, or ask an owner of the group to add you.',
  });
}

/** An answer that does not keep to the contract; most often a page older than the server. */
export function answerNotUnderstood(status: number, path: string): ProblemError {
  return new ProblemError({
    code: 'answer-not-understood',
    status,
    title: 'Answer not understood',
    detail: `The answer of ${path} is not what this page expects.`,
    hint: 'Load the page again; if it stays, tell who runs the server.',
  });
}

/** The problem in the body of a failed answer; a plain one by status where the body holds none. */
export function problemOfBody(status: number, body: string): ProblemError {
  const parsed = problem.safeParse(jsonOrNull(body));
  if (parsed.success) return new ProblemError(parsed.data);
  return new ProblemError({
    code: `http-${status}`,
    status,
    title: 'The request failed',
    detail: `The server answered with status ${status}.`,
    hint: status >= 500 ? 'Try again in a moment.' : undefined,
  });
}

/** Any thrown value as something that can be shown. */
export function asProblem(error: unknown): ProblemError {
  if (error instanceof ProblemError) return error;
  return new ProblemError({
    code: 'page-failed',
    status: 0,
    title: 'This page failed',
    detail: error instanceof Error ? error.message : 'Something unexpected happened in this page.',
    hint: 'Load the page again.',
  });
}

export function jsonOrNull(text: string): unknown {
  try {
    return JSON.parse(text) as unknown;
  } catch {
    return null;
  }
}
