import type { Request } from 'express';
import type { Actor, Context, Parts } from '../services/context';
import { Problem } from '@/shared/contract/problem';

/** What the sign-in layer adds to a request. */
declare module 'express-serve-static-core' {
  interface Request {
    parts: Parts;
    actor?: Actor;
    /** How the person was recognised: a token needs no protection against forged forms. */
    signedInBy?: 'session' | 'token';
  }
}
declare module 'express-session' {
  interface SessionData {
    csrf: string;
    returnTo: string;
  }
}

/** The context of a request by somebody who is signed in. */
export function contextOf(req: Request): Context {
  if (!req.actor) throw new Problem('not-signed-in', 'Sign in and try again. Nothing you made is lost.');
  return { ...req.parts, actor: req.actor };
}
