// @ts-check
import { existsSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';

/** Present from the demo's begin to its end, so that a killed one is taken up again by the next start. */
const unfinished = (/** @type {string} */ root) => join(root, '.data', 'demo-unfinished');

/**
 * @param {string} root @param {NodeJS.ProcessEnv} env @param {boolean} emptyDatabase
 */
export const demoWanted = (root, env, emptyDatabase) =>
  env.OUTSWELL_DEMO === '1' &&
  existsSync(join(root, 'scripts', 'demo.ts')) &&
  (emptyDatabase || existsSync(unfinished(root)));

/** @param {string} root */
export const demoBegins = (root) => writeFileSync(unfinished(root), '');
/** @param {string} root */
export const demoEnds = (root) => rmSync(unfinished(root), { force: true });

/**
 * How to sign in, for the screen.
 * @param {string} root @param {string} url
 */
export function signInLines(root, url) {
  const file = join(root, 'server', 'fakes', 'demoPeople.json');
  /** @type {{ login: string, name: string, role: string }[]} */
  const people = JSON.parse(readFileSync(file, 'utf8'));
  const width = Math.max(...people.map((p) => p.name.length));
  return [
    `  Open ${url}, choose “Sign in locally”, and then one of the demo people:`,
    ...people.map((p) => `    ${p.name.padEnd(width)}  ${p.role.padEnd(8)}  (login ${p.login})`),
    '  GitHub is played by a stand-in on this machine: no account, no password. Any other login is a new person.',
  ];
}
