import { randomBytes } from 'node:crypto';

const CODE_LIFETIME = 60_000; // ms; RFC 6749 advises ten minutes at most
const TOKEN_LIFETIME = 3_600_000;

interface Grant {
  login: string;
  clientId: string;
  redirectUri: string;
  expires: number;
}

/** The codes and tokens a provider has handed out, in memory. `now` is there for tests. */
export class OAuthGrants {
  private readonly codes = new Map<string, Grant>();
  private readonly tokens = new Map<string, { login: string; expires: number }>();

  constructor(private readonly now: () => number = Date.now) {}

  issueCode(login: string, clientId: string, redirectUri: string): string {
    this.forgetExpired();
    const code = randomBytes(16).toString('hex');
    this.codes.set(code, { login, clientId, redirectUri, expires: this.now() + CODE_LIFETIME });
    return code;
  }

  /** A token for a code, or null. A code is good once, for the client and the address it was made for. */
  redeem(code: string, clientId: string, redirectUri: string): string | null {
    const grant = this.codes.get(code);
    this.codes.delete(code); // a failed try uses it up too
    if (!grant || grant.expires <= this.now()) return null;
    if (grant.clientId !== clientId || grant.redirectUri !== redirectUri) return null;
    const token = randomBytes(20).toString('hex');
    this.tokens.set(token, { login: grant.login, expires: this.now() + TOKEN_LIFETIME });
    return token;
  }

  /** Whose token this is. */
  loginOf(token: string): string | null {
    const found = this.tokens.get(token);
    return found && found.expires > this.now() ? found.login : null;
  }

  private forgetExpired(): void {
    for (const kept of [this.codes, this.tokens])
      for (const [key, { expires }] of kept) if (expires <= this.now()) kept.delete(key);
  }
}
