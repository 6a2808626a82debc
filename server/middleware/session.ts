import type { NextFunction, Request, RequestHandler, Response } from 'express';
import { parse, serialize } from 'cookie';
import type { Context, PersonActor } from '../context';
import { Refusal } from '../errors';
import { personOfToken, type NewSession } from '../services/sessions';

const COOKIE = 'idem_session';
const CHANGING = new Set(['POST', 'PUT', 'PATCH', 'DELETE']);

const people = new WeakMap<Request, PersonActor>();

/** The signed-in person of a request, or null. */
export function personOf(req: Request): PersonActor | null {
  return people.get(req) ?? null;
}

/** Resolves the session cookie to a person, once per request. */
export function readSession(context: Context): RequestHandler {
  return async (req: Request, _res: Response, next: NextFunction) => {
    const token = parse(req.headers.cookie ?? '')[COOKIE];
    const who = token === undefined ? null : await personOfToken(context, token);
    if (who !== null) people.set(req, who);
    next();
  };
}

/**
 * A changing request must carry a header that a foreign page cannot send without asking first; together with
 * the SameSite cookie this keeps other sites from acting in a person's name.
 */
export const requireOwnHeader: RequestHandler = (req, _res, next) => {
  if (CHANGING.has(req.method) && req.headers['x-idem'] === undefined) {
    throw new Refusal('header-missing', 'The request does not come from this application.');
  }
  next();
};

export function setSessionCookie(context: Context, res: Response, session: NewSession): void {
  res.append('Set-Cookie', cookieText(context, session.token, session.expiresAt));
}

export function clearSessionCookie(context: Context, res: Response): void {
  res.append('Set-Cookie', cookieText(context, '', new Date(0)));
}

function cookieText(context: Context, value: string, expires: Date): string {
  return serialize(COOKIE, value, {
    httpOnly: true,
    sameSite: 'lax',
    secure: context.config.secureCookies,
    path: '/',
    expires,
  });
}
