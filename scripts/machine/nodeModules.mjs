// @ts-check
import { existsSync, readFileSync } from 'node:fs';
import { join } from 'node:path';
import { run } from './run.mjs';

/** @typedef {{ version?: string, integrity?: string, optional?: boolean, link?: boolean }} Locked */

/**
 * Whether what npm noted in node_modules is what the lock asks for. npm writes its note last, so a killed
 * installation has none. Optional packages may be missing: they are for other machines.
 * @param {string} root
 */
export function modulesMatchLock(root) {
  const note = join(root, 'node_modules', '.package-lock.json');
  if (!existsSync(note)) return false;
  const read = (/** @type {string} */ path) =>
    /** @type {Record<string, Locked>} */ (JSON.parse(readFileSync(path, 'utf8')).packages);
  const installed = read(note);
  return Object.entries(read(join(root, 'package-lock.json'))).every(([path, locked]) => {
    const found = installed[path];
    if (path === '' || locked.link) return true;
    if (!found) return locked.optional === true;
    return found.version === locked.version && found.integrity === locked.integrity;
  });
}

/**
 * Runs npm ci when node_modules is not what the lock asks for. Tools for building come along in production too,
 * since the client is built here.
 * @param {string} root @param {(line: string) => void} say
 */
export async function ensureModules(root, say) {
  if (modulesMatchLock(root)) return;
  say('Installing packages (npm ci), about a minute …');
  await run('npm', ['ci', '--include=dev', '--no-audit', '--no-fund', '--loglevel=error'], {
    cwd: root,
    quiet: true,
  });
}
