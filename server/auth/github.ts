import { Strategy, type StrategyOptions } from 'passport-github2';
import type { Config } from '../config';
import { signIn } from '../services/people';
import type { Parts } from '../services/context';

export const CALLBACK_PATH = '/auth/github/callback';
/** Where the stand-in provider answers when no GitHub application is configured. */
export const LOCAL_PROVIDER_PATH = '/local-sign-in';

interface GithubEmail {
  value: string;
  primary?: boolean;
  verified?: boolean;
}

/** GitHub by passport-github2; the same strategy with other addresses speaks to the stand-in. */
export function githubStrategy(parts: Parts): Strategy {
  const { oauth, publicUrl } = parts.config;
  const options = {
    clientID: oauth.clientId,
    clientSecret: oauth.clientSecret,
    callbackURL: (publicUrl ?? '') + CALLBACK_PATH,
    scope: ['user:email'],
    state: true, // kept in the session and compared when the person comes back
    allRawEmails: true, // without it the strategy takes an address nobody has verified
    ...addresses(parts.config),
  };
  // the published types lack userEmailURL and a boolean state
  return new Strategy(
    options as unknown as StrategyOptions,
    (
      _access: string,
      _refresh: string,
      profile: unknown,
      done: (error: unknown, user?: Express.User) => void,
    ) => {
      const p = profile as { id: string; username?: string; displayName?: string; emails?: GithubEmail[] };
      const verified = (p.emails ?? []).filter((e) => e.verified);
      signIn(parts, {
        providerId: `github:${p.id}`,
        login: p.username ?? p.id,
        name: p.displayName ?? null,
        email: (verified.find((e) => e.primary) ?? verified[0])?.value ?? null,
      }).then((actor) => done(null, actor), done);
    },
  );
}

function addresses({ oauth, host, port }: Config) {
  if (oauth.local) {
    const inside = `http://${host.includes(':') ? `[${host}]` : host === '0.0.0.0' ? '127.0.0.1' : host}:${port}${LOCAL_PROVIDER_PATH}`;
    return {
      authorizationURL: `${LOCAL_PROVIDER_PATH}/authorize`, // where the browser goes: this same host, whatever its name
      tokenURL: `${inside}/token`,
      userProfileURL: `${inside}/user`,
      userEmailURL: `${inside}/user/emails`,
    };
  }
  return {
    ...(oauth.authorizationUrl && { authorizationURL: oauth.authorizationUrl }),
    ...(oauth.tokenUrl && { tokenURL: oauth.tokenUrl }),
    ...(oauth.profileUrl && { userProfileURL: oauth.profileUrl }),
    ...(oauth.emailUrl && { userEmailURL: oauth.emailUrl }),
  };
}
