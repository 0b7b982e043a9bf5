// @ts-check
import { existsSync, readFileSync } from 'node:fs';
import { join } from 'node:path';

/**
 * The commit that is checked out, read without git, which need not be installed; undefined outside a checkout.
 * It goes into the provenance of fits.
 * @param {string} root
 */
export function commitId(root) {
  try {
    const git = join(root, '.git');
    const head = readFileSync(join(git, 'HEAD'), 'utf8').trim();
    const ref = /^ref: (.+)$/.exec(head)?.[1];
    if (!ref) return short(head);
    if (existsSync(join(git, ref))) return short(readFileSync(join(git, ref), 'utf8'));
    const packed = readFileSync(join(git, 'packed-refs'), 'utf8').split('\n');
    return short(packed.find((line) => line.endsWith(` ${ref}`)) ?? '');
  } catch {
    return undefined;
  }
}

/** @param {string} text */
const short = (text) => /^[0-9a-f]{12}/.exec(text.trim())?.[0];
