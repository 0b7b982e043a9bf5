// @ts-check
import { join } from 'node:path';
import { run } from '../machine/run.mjs';
import { Stop } from '../machine/stop.mjs';
import { commitId } from './commit.mjs';
import { keptSecret } from './secret.mjs';

/**
 * What server and worker get: the caller's environment, and what we choose where it is silent.
 * @param {string} root
 * @param {{ host: string, port: number }} address
 * @param {string | undefined} databaseUrl
 * @returns {NodeJS.ProcessEnv}
 */
export function childEnvironment(root, { host, port }, databaseUrl) {
  const env = process.env;
  const production = env.NODE_ENV === 'production';
  return {
    ...env,
    HOST: host,
    PORT: String(port),
    DATABASE_URL: databaseUrl,
    OUTSWELL_COMMIT: env.OUTSWELL_COMMIT || commitId(root),
    // The store's client would otherwise print on every start that it will want a newer Node some day.
    AWS_SDK_JS_NODE_VERSION_SUPPORT_WARNING_DISABLED: 'true',
    ...(production
      ? {}
      : {
          SESSION_SECRET: env.SESSION_SECRET || keptSecret(join(root, '.data', 'session-secret')),
          OUTSWELL_DEMO: env.OUTSWELL_DEMO || '1',
        }),
  };
}

/**
 * Lets the server's own check look at the environment before the slow work.
 * @param {string} root @param {NodeJS.ProcessEnv} env
 */
export async function checkEnvironment(root, env) {
  const args = ['--import', 'tsx', join('scripts', 'checkEnvironment.ts')];
  await run(process.execPath, args, { cwd: root, env }).catch(() => {
    throw new Stop('Nothing was started.');
  });
}
