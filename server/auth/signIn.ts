import { randomBytes } from 'node:crypto';
import { Router, type RequestHandler } from 'express';
import { rateLimit } from 'express-rate-limit';
import passport from 'passport';
import { Problem } from '@/shared/contract/problem';
import { loadActor } from '../services/people';
import type { Parts } from '../services/context';
import { personOfToken } from '../services/tokens';
import { CALLBACK_PATH, githubStrategy } from './github';
import './requests';

/** passport of this app alone: tests run several apps in one process. */
export function makePassport(parts: Parts) {
  const instance = new passport.Passport();
  instance.use('github', githubStrategy(parts));
  instance.serializeUser((user, done) => done(null, (user as unknown as { id: string }).id));
  // the role of this moment, not of the moment of sign-in
  instance.deserializeUser((id: string, done) => {
    loadActor(parts, id).then((actor) => done(null, (actor ?? false) as Express.User | false), done);
  });
  return instance;
}

/** Recognise the person by session or by personal access token. */
export const recognise = (parts: Parts): RequestHandler => {
  return async (req, _res, next) => {
    req.parts = parts;
    const bearer = /^Bearer\s+(\S+)$/i.exec(req.headers.authorization ?? '');
    if (bearer) {
      const personId = await personOfToken(parts, bearer[1]!);
      const actor = personId && (await loadActor(parts, personId));
      if (!actor) throw new Problem('not-signed-in', 'This token is unknown or was revoked. Make a new one.');
      Object.assign(req, { actor, signedInBy: 'token' });
    } else if (req.user) {
      Object.assign(req, { actor: req.user, signedInBy: 'session' });
      req.session.csrf ??= randomBytes(24).toString('base64url');
    }
    next();
  };
};

/** A write with a session must carry the token that only our own pages can read (OWASP: synchroniser token). */
export const refuseForged: RequestHandler = (req, _res, next) => {
  const reads = ['GET', 'HEAD', 'OPTIONS'].includes(req.method);
  if (!reads && req.signedInBy === 'session' && req.get('x-csrf-token') !== req.session.csrf)
    throw new Problem('csrf', 'Reload the page and do it again. What you wrote is kept.');
  next();
};

/** /auth: to the provider and back, and out again. */
export function signInRoutes(
  parts: Parts,
  instance: passport.PassportStatic | passport.Authenticator,
): Router {
  const router = Router();
  const limit = parts.config.env === 'production' ? 60 : 2000;
  router.use(
    rateLimit({
      windowMs: 60_000,
      limit,
      standardHeaders: 'draft-8',
      legacyHeaders: false,
      handler: () => {
        throw new Problem('rate-limited', 'Wait a minute before you sign in again.');
      },
    }),
  );

  router.get('/provider', (_req, res) => {
    res.json({ name: 'GitHub', local: parts.config.oauth.local });
  });

  router.get('/github', (req, res, next) => {
    req.session.returnTo = safePath(req.query.to);
    instance.authenticate('github')(req, res, next);
  });

  router.get(CALLBACK_PATH.replace('/auth', ''), (req, res, next) => {
    const to = safePath(req.session.returnTo);
    const finish = (error: unknown, user?: Express.User | false | null) => {
      if (error) {
        req.log.warn({ error }, 'the sign-in provider refused');
        return res.redirect(`/sign-in?problem=provider`);
      }
      if (!user) return res.redirect('/sign-in?problem=refused');
      // passport makes a new session here, so that one planted before sign-in is worth nothing
      req.logIn(user, (failed) => (failed ? next(failed) : res.redirect(to)));
    };
    instance.authenticate('github', finish)(req, res, next);
  });

  router.post('/sign-out', refuseForged, (req, res, next) => {
    req.session.destroy((error) => {
      if (error) return next(error);
      res.clearCookie('outswell').status(204).end();
    });
  });
  return router;
}

/** A path on this site: never another site's address, whatever a link says. */
export function safePath(to: unknown): string {
  if (typeof to !== 'string' || !/^\/(?![/\\])[\x21-\x7e]*$/.test(to)) return '/';
  return to;
}
