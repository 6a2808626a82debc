import { sessionState, setUp, signIn } from '../../shared/schemas/session';
import { clearSessionCookie, setSessionCookie } from '../middleware/session';
import { personRoute, publicRoute, type Route } from '../route';
import * as sessions from '../services/sessions';

export const sessionRoutes: Route[] = [
  publicRoute({
    method: 'get',
    path: '/api/session',
    summary: 'Who is signed in, and in which groups',
    answer: sessionState,
    run: ({ context, person }) => sessions.sessionState(context, person),
  }),
  publicRoute({
    method: 'post',
    path: '/api/session',
    summary: 'Sign in with e-mail and password',
    body: signIn,
    answer: 'nothing',
    async run({ context, body, req, res }) {
      setSessionCookie(context, res, await sessions.signIn(context, body, req.headers['user-agent'] ?? ''));
    },
  }),
  personRoute({
    method: 'delete',
    path: '/api/session',
    summary: 'Sign out',
    answer: 'nothing',
    async run({ context, person, res }) {
      await sessions.signOut(context, person, 'here');
      clearSessionCookie(context, res);
    },
  }),
  personRoute({
    method: 'delete',
    path: '/api/session/all',
    summary: 'Sign out everywhere',
    answer: 'nothing',
    async run({ context, person, res }) {
      await sessions.signOut(context, person, 'everywhere');
      clearSessionCookie(context, res);
    },
  }),
  publicRoute({
    method: 'post',
    path: '/api/setup',
    summary: 'Make the first account and its group on an empty installation',
    body: setUp,
    answer: 'nothing',
    status: 201,
    async run({ context, body, req, res }) {
      const session = await sessions.setUpInstallation(context, body, req.headers['user-agent'] ?? '');
      setSessionCookie(context, res, session);
    },
  }),
];
