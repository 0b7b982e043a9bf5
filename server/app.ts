import express, { type Express } from 'express';
import helmet from 'helmet';
import { pinoHttp } from 'pino-http';
import { randomUUID } from 'node:crypto';
import { join } from 'node:path';
import { LOCAL_PROVIDER_PATH } from './auth/github';
import { makePassport, recognise, refuseForged, signInRoutes } from './auth/signIn';
import { sessions } from './auth/session';
import demoPeople from './fakes/demoPeople.json';
import { oauthProvider } from './fakes/oauthProvider';
import { openApiDocument } from './openapi';
import { apiRoutes } from './routes/api';
import { clientRoutes } from './routes/client';
import { eventsRoute } from './routes/events';
import { nothingHere, problemHandler } from './routes/problems';
import { timing } from './routes/timing';
import { uploadHandler, UPLOADS_PATH } from './routes/uploads';
import type { Parts } from './services/context';
import { health } from './services/health';
import { LiveFeed } from './services/live';

export interface App {
  express: Express;
  /** Ends what the app opened; not what it was given. */
  close(): Promise<void>;
}

/** The HTTP side of the product: sign-in, API, uploads, live events and the client. */
export async function makeApp(parts: Parts, dist = join(__dirname, '..', 'dist')): Promise<App> {
  const { config, log } = parts;
  const app = express();
  const feed = new LiveFeed(config.databaseUrl, log);
  await feed.start();
  const session = sessions(config);
  const passport = makePassport(parts);
  const document = openApiDocument(config.codeVersion);

  app.disable('x-powered-by');
  app.set('trust proxy', 'loopback');
  app.use('/api/v1/cubes', timing);
  app.use(
    pinoHttp({
      logger: log,
      genReqId: () => randomUUID(),
      customAttributeKeys: { err: 'error' },
      // a page polls and streams: only what changed something or went wrong is worth a line
      customLogLevel: (req, res, error) =>
        error || res.statusCode >= 500
          ? 'error'
          : req.method === 'GET' || req.method === 'HEAD'
            ? 'debug'
            : 'info',
      serializers: {
        req: ({ id, method, url }) => ({ id, method, url }),
        res: ({ statusCode }) => ({ statusCode }),
      },
    }),
  );
  app.use(
    helmet({
      contentSecurityPolicy: {
        directives: {
          'script-src': ["'self'"],
          'img-src': ["'self'", 'data:', 'blob:'],
          'style-src': ["'self'", "'unsafe-inline'"],
          'font-src': ["'self'", 'data:'],
          'worker-src': ["'self'", 'blob:'],
          'upgrade-insecure-requests': null,
        },
      },
      strictTransportSecurity: config.env === 'production',
    }),
  );

  app.get(
    '/api/v1/health',
    async (_req, res) => void res.set('Cache-Control', 'no-store').json(await health(parts)),
  );
  app.get('/api/v1/openapi.json', (_req, res) => void res.json(document));
  if (config.oauth.local)
    // the stand-in refuses to exist in production
    app.use(LOCAL_PROVIDER_PATH, oauthProvider({ env: config.env, people: demoPeople, ...config.oauth }));

  const signedIn = [session.handler, passport.initialize(), passport.session(), recognise(parts)];
  app.use('/auth', ...signedIn, signInRoutes(parts, passport));
  app.use('/api/v1', ...signedIn, refuseForged, noStore);
  app.get('/api/v1/events', eventsRoute(feed));
  app.all([UPLOADS_PATH, `${UPLOADS_PATH}/*rest`], uploadHandler(parts));
  app.use('/api/v1', apiRoutes(), nothingHere);
  app.use(clientRoutes(dist));
  app.use(nothingHere);
  app.use(problemHandler);
  return {
    express: app,
    async close() {
      await feed.stop();
      await session.close();
    },
  };
}

/** What the API says is the team's and of this moment; pictures of a cube say otherwise for themselves. */
const noStore: express.RequestHandler = (_req, res, next) => {
  res.set('Cache-Control', 'no-store');
  next();
};
