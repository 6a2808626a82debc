import path from 'node:path';
import express, { type Express } from 'express';
import helmet from 'helmet';
import { rateLimit } from 'express-rate-limit';
import { pinoHttp } from 'pino-http';
import type { Context } from './context';
import { Refusal } from './errors';
import { describeApi } from './openapi';
import { mountRoutes } from './middleware/mount';
import { answerProblems, unknownRoute } from './middleware/problems';
import { readSession, requireOwnHeader } from './middleware/session';
import { ALL_ROUTES } from './routes/all';
import { SOFTWARE_VERSION } from './version';

const YEAR_MS = 365 * 86_400_000;

/** Builds the HTTP application: safety headers, session, API routes, then the client's files. */
export function createApp(context: Context): Express {
  const app = express();
  app.disable('x-powered-by');
  app.use(
    helmet({
      contentSecurityPolicy: {
        directives: {
          'default-src': ["'self'"],
          'script-src': ["'self'"],
          'style-src': ["'self'"],
          'img-src': ["'self'", 'data:', 'blob:'],
          'frame-ancestors': ["'none'"],
          'upgrade-insecure-requests': context.config.secureCookies ? [] : null,
        },
      },
      strictTransportSecurity: context.config.secureCookies,
    }),
  );
  app.use(
    pinoHttp({
      logger: context.log,
      autoLogging: { ignore: (req) => req.url === '/readyz' || req.url === '/healthz' },
      // Neither headers nor bodies are logged: they hold session tokens and people's data.
      serializers: {
        req: (req: { id: unknown; method: string; url: string }) => ({ id: req.id, method: req.method, url: req.url }),
        res: (res: { statusCode: number }) => ({ status: res.statusCode }),
      },
    }),
  );
  app.get('/healthz', (_req, res) => {
    res.json({ ok: true });
  });
  app.get('/readyz', async (_req, res) => {
    await context.database.pool.query('select 1');
    res.json({ ok: true });
  });
  const description = describeApi(ALL_ROUTES, SOFTWARE_VERSION);
  app.get('/api/openapi.json', (_req, res) => {
    res.json(description);
  });
  app.use('/api', requireOwnHeader);
  app.post(['/api/session', '/api/setup'], signInLimit(context));
  app.use('/api', readSession(context));
  app.use(mountRoutes(context, ALL_ROUTES));
  app.use('/api', unknownRoute);
  serveClient(app, context);
  app.use(answerProblems(context));
  return app;
}

function signInLimit(context: Context) {
  return rateLimit({
    windowMs: 60_000,
    limit: context.config.signInPerMinute,
    standardHeaders: 'draft-8',
    legacyHeaders: false,
    handler: () => {
      throw new Refusal('too-many-requests', 'Too many sign-ins from here in the last minute.');
    },
  });
}

/** The built client; unknown paths answer with the page, which finds its own way. */
function serveClient(app: Express, context: Context): void {
  const { clientDir } = context.config;
  app.use('/assets', express.static(path.join(clientDir, 'assets'), { immutable: true, maxAge: YEAR_MS }), unknownRoute);
  app.use(express.static(clientDir, { index: false, maxAge: 0 }));
  app.get('/{*path}', (_req, res) => {
    res.set('Cache-Control', 'no-cache').sendFile(path.join(clientDir, 'index.html'));
  });
}
