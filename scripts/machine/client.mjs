// @ts-check
import { createHash } from 'node:crypto';
import { existsSync, readFileSync, readdirSync, renameSync, rmSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { run } from './run.mjs';

/** What the client is made from. Pictures for README do not belong to it. */
const folders = ['app', 'components', 'hooks', 'shared', 'fonts', 'assets'];
const files = [
  'app.json',
  'package.json',
  'package-lock.json',
  'babel.config.js',
  'metro.config.js',
  'tsconfig.json',
];
const skipped = (/** @type {string} */ path) =>
  /\.test\.tsx?$/.test(path) || path.startsWith('assets/readme');

/** A fingerprint of the client's sources: names and contents. @param {string} root */
export function clientSources(root) {
  const hash = createHash('sha256');
  const paths = [...files, ...folders.flatMap((folder) => filesUnder(root, folder))].filter(
    (p) => !skipped(p),
  );
  for (const path of paths.sort()) {
    const whole = join(root, path);
    if (!existsSync(whole)) continue;
    const content = readFileSync(whole);
    hash.update(`${path}\0${content.length}\0`).update(content);
  }
  return hash.digest('hex');
}

/** @param {string} root @param {string} folder @returns {string[]} */
function filesUnder(root, folder) {
  if (!existsSync(join(root, folder))) return [];
  return readdirSync(join(root, folder), { withFileTypes: true }).flatMap((entry) => {
    const path = `${folder}/${entry.name}`;
    return entry.isDirectory() ? filesUnder(root, path) : [path];
  });
}

/**
 * Builds dist/ when its sources changed. The build goes beside it and is moved there when complete: one that is
 * killed, or fails, leaves the old client as it was.
 * @param {string} root @param {(line: string) => void} say @param {{ force?: boolean }} [options]
 */
export async function ensureClient(root, say, { force = false } = {}) {
  const dist = join(root, 'dist');
  const stamp = join(dist, '.sources');
  const sources = clientSources(root);
  if (!force && existsSync(stamp) && readFileSync(stamp, 'utf8') === sources) return;
  say('Building the client, about half a minute …');
  removeLeftOvers(root);
  const next = join(root, `dist-next-${process.pid}`);
  const expo = join(root, 'node_modules', 'expo', 'bin', 'cli');
  await run(process.execPath, [expo, 'export', '--platform', 'web', '--output-dir', next], {
    cwd: root,
    env: { ...process.env, NODE_ENV: 'production', EXPO_NO_TELEMETRY: '1', EXPO_OFFLINE: '1', CI: '1' },
    quiet: true,
  });
  writeFileSync(join(next, '.sources'), sources);
  const old = join(root, `dist-old-${process.pid}`);
  if (existsSync(dist)) renameSync(dist, old);
  renameSync(next, dist);
  rmSync(old, { recursive: true, force: true });
}

/** Folders of builds that were killed; those of a build under way in another process stay. @param {string} root */
function removeLeftOvers(root) {
  for (const name of readdirSync(root)) {
    const pid = Number(/^dist-(?:next|old)-(\d+)$/.exec(name)?.[1]);
    if (pid && !lives(pid)) rmSync(join(root, name), { recursive: true, force: true });
  }
}

/** @param {number} pid */
function lives(pid) {
  try {
    return process.kill(pid, 0);
  } catch {
    return false;
  }
}
