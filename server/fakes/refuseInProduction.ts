import type { Config } from '../config';

/** A fake answers as if it were the real service, so it must never stand where real people rely on one. */
export function refuseInProduction(env: Config['env'], what: string): void {
  if (env === 'production')
    throw new Error(`${what} is a stand-in for development and tests; production refuses it.`);
}
