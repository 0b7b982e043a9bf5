// @ts-check
/**
 * npm start: from a fresh clone to a served page. Installs what is missing, starts a private database, migrates,
 * builds the client when it changed, runs server and worker, makes the demo on an empty database; stops all of it
 * on Ctrl-C. Needs Node alone: no package exists when it begins.
 */
import { join } from 'node:path';
import { ensureClient } from './machine/client.mjs';
import { ensurePrograms } from './machine/debian.mjs';
import { takeLock } from './machine/lock.mjs';
import { ensureModules } from './machine/nodeModules.mjs';
import { checkNode } from './machine/nodeVersion.mjs';
import { root } from './machine/place.mjs';
import { startCluster } from './machine/postgres.mjs';
import { Stop, explain } from './machine/stop.mjs';
import { chooseAddress, untilServed } from './start/address.mjs';
import { whenNpmIsGone } from './start/ancestors.mjs';
import { startChild } from './start/children.mjs';
import { migrate, ownDatabase } from './start/database.mjs';
import { demoBegins, demoEnds, demoWanted, signInLines } from './start/demo.mjs';
import { checkEnvironment, childEnvironment } from './start/environment.mjs';

const say = (/** @type {string} */ line) => console.log(line);

/** What to do before leaving, the newest first. @type {(() => void | Promise<void>)[]} */
const undo = [];
let leaving = false;

/** @param {number} code */
async function leave(code) {
  if (leaving) return;
  leaving = true;
  for (const step of undo.reverse())
    await Promise.resolve(step()).catch((error) => {
      console.error(explain(error));
      code = 1;
    });
  process.exit(code);
}

for (const signal of ['SIGINT', 'SIGTERM', 'SIGHUP'])
  process.on(signal, () => {
    if (!leaving) say('\nStopping …');
    void leave(0);
  });

async function main() {
  const began = Date.now();
  checkNode();
  whenNpmIsGone(() => void leave(0));
  const lock = takeLock(join(root, '.data', 'start.lock'), 'Outswell');
  undo.push(lock.release);
  const address = await chooseAddress(process.env, { patience: lock.tookOver ? 5000 : 0 });
  const production = process.env.NODE_ENV === 'production';
  const ownCluster = !process.env.DATABASE_URL && !production;
  await ensurePrograms(ownCluster ? ['postgresql'] : [], say);
  await ensureModules(root, say);

  const placeholder = ownCluster ? 'postgres://127.0.0.1/outswell' : process.env.DATABASE_URL;
  const checked = checkEnvironment(root, childEnvironment(root, address, placeholder));
  const [database] = await allOrFirstFailure([
    checked.then(() => prepareDatabase(ownCluster)),
    ensureClient(root, say),
  ]);
  if (leaving) return;
  await serve(address, database, began);
}

/** Like Promise.all, but waits for the rest before it fails, so that nothing is left half-way behind our back. */
async function allOrFirstFailure(/** @type {[Promise<Database>, Promise<void>]} */ promises) {
  await Promise.allSettled(promises);
  return Promise.all(promises);
}

/** @typedef {{ url: string, empty: boolean }} Database */

/** @param {boolean} ownCluster @returns {Promise<Database>} */
async function prepareDatabase(ownCluster) {
  let url = process.env.DATABASE_URL ?? '';
  if (ownCluster) {
    const cluster = await startCluster(join(root, '.data', 'postgres'), { say });
    undo.push(cluster.stop);
    void cluster.ended.then(() => {
      if (leaving) return;
      say(`The database stopped by itself; ${join(cluster.dir, 'log')} says why. Stopping.`);
      void leave(1);
    });
    url = await ownDatabase(root, cluster.url);
  }
  const { applied, empty } = await migrate(root, url, { alone: ownCluster });
  if (applied.length > 0) say(`Database brought up to date (${applied.length} steps).`);
  return { url, empty };
}

/**
 * @param {{ host: string, port: number, url: string }} address @param {Database} database @param {number} began
 */
async function serve(address, database, began) {
  const env = childEnvironment(root, address, database.url);
  let over = false;
  const children = ['server', 'worker'].map((name) => {
    const child = startChild(name, name === 'server' ? 'server/main.ts' : 'workers/main.ts', {
      cwd: root,
      env,
    });
    void child.ended.then(({ code, signal }) => {
      over = true;
      if (leaving) return;
      say(`The ${name} ended by itself (${signal ?? `exit code ${code}`}). Stopping.`);
      void leave(1);
    });
    return child;
  });
  undo.push(async () => void (await Promise.all(children.map((child) => child.stop()))));
  if (!(await untilServed(address.url, () => over || leaving))) return;
  const seconds = ((Date.now() - began) / 1000).toFixed(1);
  const lines = process.env.GITHUB_CLIENT_ID ? [`  Open ${address.url}`] : signInLines(root, address.url);
  say(['', `Outswell is running (after ${seconds} s).`, ...lines, '  Ctrl-C stops it.', ''].join('\n'));
  if (demoWanted(root, env, database.empty)) await seed(address.url, env);
}

/** @param {string} url @param {NodeJS.ProcessEnv} env */
async function seed(url, env) {
  say('Making the demo: an invented team, two regions, their cubes and shells …');
  demoBegins(root);
  const began = Date.now();
  const child = startChild('demo', 'scripts/demo.ts', { cwd: root, env: { ...env, OUTSWELL_URL: url } });
  undo.push(child.stop);
  const { code } = await child.ended;
  if (leaving) return;
  if (code === 0) demoEnds(root);
  const seconds = Math.round((Date.now() - began) / 1000);
  say(
    code === 0
      ? `The demo is ready (after ${seconds} s).`
      : 'The demo could not be finished; the next start goes on with it.',
  );
}

try {
  await main();
} catch (error) {
  console.error(error instanceof Stop ? `\n${error.message}` : explain(error));
  await leave(1);
}
