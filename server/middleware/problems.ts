import type { ErrorRequestHandler, RequestHandler } from 'express';
import { ZodError } from 'zod';
import type { Problem } from '../../shared/schemas/problem';
import type { Context } from '../context';
import { Refusal } from '../errors';

/** Network and PostgreSQL codes that mean: the database is away, not that the request is wrong. */
const DATABASE_AWAY = new Set(['ECONNREFUSED', 'ECONNRESET', '57P01', '57P02', '57P03', '53300']);

function codeOf(error: unknown): string | undefined {
  if (!(error instanceof Error)) return undefined;
  const source: unknown = error.cause ?? error;
  return typeof source === 'object' && source !== null && 'code' in source ? String(source.code) : undefined;
}

/** Turns what was thrown into a refusal that may be shown; anything unknown becomes 'internal'. */
export function refusalOf(error: unknown): Refusal {
  if (error instanceof Refusal) return error;
  if (error instanceof ZodError) {
    return new Refusal('bad-request', 'Some fields are missing or wrong.', {
      errors: error.issues.map((issue) => ({ path: issue.path.join('.'), message: issue.message })),
    });
  }
  if (DATABASE_AWAY.has(codeOf(error) ?? '')) {
    return new Refusal('database-away', 'The database does not answer at the moment.');
  }
  const type = error instanceof Error && 'type' in error ? error.type : undefined;
  if (type === 'entity.parse.failed') return new Refusal('bad-request', 'The body is not valid JSON.');
  if (type === 'entity.too.large') return new Refusal('bad-request', 'The body is too large.');
  return new Refusal('internal', 'The request could not be carried out.');
}

export const unknownRoute: RequestHandler = (req) => {
  throw new Refusal('not-found', `There is no ${req.method} ${req.path} here.`);
};

/** Answers every thrown error as application/problem+json; an answer that has begun is cut off instead. */
export function answerProblems(context: Context): ErrorRequestHandler {
  return (error: unknown, req, res, _next) => {
    const refusal = refusalOf(error);
    if (refusal.status >= 500) {
      // The message of a database error may hold SQL and values: only its name and code are logged.
      const name = error instanceof Error ? error.name : typeof error;
      const stack = error instanceof Error && codeOf(error) === undefined ? error.stack : undefined;
      context.log.error({ name, code: codeOf(error), stack, path: req.path }, 'request failed');
    }
    if (res.headersSent) {
      res.destroy();
      return;
    }
    const body: Problem = refusal.toProblem();
    res.status(refusal.status).type('application/problem+json').send(JSON.stringify(body));
  };
}
