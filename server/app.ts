import compression from 'compression';
import express, { type Express } from 'express';
import session from 'express-session';
import helmet from 'helmet';
import { join } from 'node:path';
import { pinoHttp } from 'pino-http';
import type { App } from './app-context.ts';
import { hideSecrets } from './middleware/hide-secrets.ts';
import { createPassport } from './middleware/passport.ts';
import { missingRoute, problemHandler } from './middleware/problem.ts';
import { sameOrigin } from './middleware/same-origin.ts';
import { SessionStore } from './middleware/session-store.ts';
import { routes } from './routes/index.ts';
import { mountRoutes } from './routes/mount-routes.ts';

const DAY_MS = 86_400_000;

/** Tiles and streams are compressed already or must not be held back. */
function isCompressible(req: express.Request, res: express.Response): boolean {
  const type = String(res.getHeader('Content-Type') ?? '');
  return !type.startsWith('text/event-stream') && !type.startsWith('image/') && compression.filter(req, res);
}

/** Answers are for the one who asks, and may have changed when they ask again; routes that know better say so. */
const privateByDefault: express.RequestHandler = (_req, res, next) => {
  res.setHeader('Cache-Control', 'private, no-cache');
  next();
};

/** The HTTP application: the API under /api/v1, and the built client for every other address when `clientDir` is given. */
export function createHttpApp(app: App, clientDir: string | null): Express {
  const { config } = app;
  const http = express();
  const secure = config.publicUrl.startsWith('https:');
  http.disable('x-powered-by');
  http.set('trust proxy', config.trustProxy);
  http.use(
    pinoHttp({
      logger: app.log,
      serializers: {
        req: (req: { url: string }) => ({ ...req, url: hideSecrets(req.url) }),
      },
      autoLogging: { ignore: (req) => (req.url ?? '').includes('/tiles/') },
      customLogLevel: (_req, res, error) => (error || res.statusCode >= 500 ? 'error' : 'debug'),
    }),
  );
  http.use(
    helmet({
      contentSecurityPolicy: {
        directives: {
          defaultSrc: ["'self'"],
          imgSrc: ["'self'", 'data:', 'blob:'],
          // Leaflet and chart parts set style attributes.
          styleSrc: ["'self'", "'unsafe-inline'"],
          workerSrc: ["'self'", 'blob:'],
          upgradeInsecureRequests: secure ? [] : null,
        },
      },
      strictTransportSecurity: secure,
    }),
  );
  http.use(compression({ filter: isCompressible }));
  const lifetimeMs = config.sessionDays * DAY_MS;
  const passport = createPassport(app);
  http.use(
    '/api/v1',
    privateByDefault,
    sameOrigin(config.publicUrl),
    session({
      name: 'groundsel.sid',
      secret: config.sessionSecret,
      store: new SessionStore(app.db, lifetimeMs),
      resave: false,
      saveUninitialized: false,
      cookie: { httpOnly: true, sameSite: 'lax', secure, maxAge: lifetimeMs },
    }),
    passport.session(),
    express.json({ limit: '8mb' }),
    mountRoutes(app, routes),
    missingRoute,
  );
  http.use('/api', missingRoute);
  if (clientDir) serveClient(http, clientDir);
  http.use(problemHandler(app.log));
  return http;
}

/** Built files carry a digest in their names and never change; every other address is the single page. */
function serveClient(http: Express, clientDir: string): void {
  http.use(
    '/assets',
    express.static(join(clientDir, 'assets'), { immutable: true, maxAge: '365d', fallthrough: false }),
  );
  http.use(express.static(clientDir, { index: false, maxAge: '1h' }));
  http.get('/{*path}', (_req, res, next) => {
    // By its root, because a dot in the folder's own path (.build) would count as a hidden file.
    res.sendFile('index.html', { root: clientDir, headers: { 'Cache-Control': 'no-cache' } }, (error) => {
      if (error) next(error);
    });
  });
}
