import { createHash } from 'node:crypto';
import express, { Router, type Request, type Response } from 'express';
import type { Config } from '../config';
import { OAuthGrants } from './oauthGrants';
import { choicePage, messagePage, stylesheet } from './oauthPage';
import { refuseInProduction } from './refuseInProduction';

export interface ProviderPerson {
  login: string;
  name: string;
  email: string;
  /** Shown on the page, so that one knows whom one chooses. */
  role?: string;
}

export interface ProviderOptions {
  env: Config['env'];
  /** Who can be chosen on the page; anybody else types a login. */
  people: readonly ProviderPerson[];
  clientId: string;
  clientSecret: string;
  /** ms, for tests */
  now?: () => number;
}

/** The only address that codes are sent to, on the host that was asked. */
export const CALLBACK_PATH = '/auth/github/callback';

const LOGIN = /^[a-z0-9](?:[a-z0-9-]{0,37}[a-z0-9])?$/;

/**
 * A stand-in for GitHub's sign-in that speaks the authorization-code flow of OAuth 2 (RFC 6749, section 4.1) as
 * passport-github2 uses it. Mount it anywhere: it serves authorize, token, user and user/emails below that place.
 * It believes whoever clicks, so it refuses to exist in production.
 */
export function oauthProvider(options: ProviderOptions): Router {
  refuseInProduction(options.env, 'The local sign-in provider');
  const grants = new OAuthGrants(options.now);
  const router = Router();

  router.get('/provider.css', (_req, res) => void res.type('css').send(stylesheet));

  router.get('/authorize', (req, res) => {
    const asked = readRequest(req, req.query, options.clientId);
    if ('refusal' in asked) return page(res, 400, messagePage('This sign-in cannot go on', asked.refusal));
    page(res, 200, choicePage({ people: options.people, fields: asked.fields }));
  });

  router.post('/authorize', express.urlencoded({ extended: false, limit: '8kb' }), (req, res) => {
    const body: Record<string, unknown> = req.body ?? {};
    const asked = readRequest(req, body, options.clientId);
    if ('refusal' in asked) return page(res, 400, messagePage('This sign-in cannot go on', asked.refusal));
    const { redirect_uri, state } = asked.fields;
    const back = new URL(redirect_uri);
    if (state) back.searchParams.set('state', state);
    const login = text(body.login).trim().toLowerCase();
    if (text(body.decision) === 'cancel') {
      back.searchParams.set('error', 'access_denied');
    } else if (LOGIN.test(login)) {
      back.searchParams.set('code', grants.issueCode(login, options.clientId, redirect_uri));
    } else {
      const problem = 'A login has 1 to 39 letters, digits and hyphens, and no hyphen at either end.';
      return page(
        res,
        422,
        choicePage({ people: options.people, fields: asked.fields, typed: login, problem }),
      );
    }
    res.redirect(302, back.toString());
  });

  router.post('/token', express.urlencoded({ extended: false, limit: '8kb' }), (req, res) => {
    const body: Record<string, unknown> = req.body ?? {};
    res.set('cache-control', 'no-store');
    if (text(body.client_id) !== options.clientId || text(body.client_secret) !== options.clientSecret)
      return void res.status(401).json({ error: 'invalid_client' });
    if (text(body.grant_type) !== 'authorization_code')
      return void res.status(400).json({ error: 'unsupported_grant_type' });
    const token = grants.redeem(text(body.code), options.clientId, text(body.redirect_uri));
    if (!token) return void res.status(400).json({ error: 'invalid_grant' });
    res.json({ access_token: token, token_type: 'bearer', scope: 'user:email' });
  });

  const signedIn = (req: Request, res: Response): ProviderPerson | null => {
    const token = /^(?:bearer|token) ([0-9a-f]+)$/i.exec(req.get('authorization') ?? '')?.[1];
    const login = token && grants.loginOf(token);
    if (!login) res.status(401).json({ message: 'Bad credentials' });
    return login ? personOf(login, options.people) : null;
  };

  router.get('/user', (req, res) => {
    const person = signedIn(req, res);
    if (person) res.json({ id: idOf(person.login), login: person.login, name: person.name, email: null });
  });

  router.get('/user/emails', (req, res) => {
    const person = signedIn(req, res);
    if (person) res.json([{ email: person.email, primary: true, verified: true }]);
  });

  return router;
}

const text = (value: unknown) => (typeof value === 'string' ? value : '');

const personOf = (login: string, people: readonly ProviderPerson[]): ProviderPerson =>
  people.find((p) => p.login.toLowerCase() === login) ?? {
    login,
    name: login,
    email: `${login}@example.org`,
  };

/** The same number for a login after every restart, as a real provider gives it. */
const idOf = (login: string) => createHash('sha256').update(login).digest().readUIntBE(0, 6);

interface AuthorizeFields {
  client_id: string;
  redirect_uri: string;
  state: string;
}

function readRequest(
  req: Request,
  from: Record<string, unknown>,
  clientId: string,
): { fields: AuthorizeFields } | { refusal: string } {
  const redirect_uri = text(from.redirect_uri);
  // Neither of these may be answered with a redirect: the address is not known to be the client's.
  if (text(from.client_id) !== clientId)
    return { refusal: 'The application that sent you is not known here.' };
  if (!isCallback(redirect_uri, req.host))
    return { refusal: 'The application asked to send you to an address that is not its own.' };
  return { fields: { client_id: clientId, redirect_uri, state: text(from.state) } };
}

function isCallback(address: string, host: string): boolean {
  if (!URL.canParse(address)) return false;
  const url = new URL(address);
  return (
    /^https?:$/.test(url.protocol) &&
    url.host === host &&
    url.pathname === CALLBACK_PATH &&
    url.username === ''
  );
}

function page(res: Response, status: number, html: string): void {
  // The page needs a stylesheet and forms, and nothing else.
  res.set(
    'content-security-policy',
    "default-src 'none'; style-src 'self'; form-action 'self'; base-uri 'none'",
  );
  res.set('cache-control', 'no-store');
  res.status(status).type('html').send(html);
}
