// @ts-check
import { execFileSync } from 'node:child_process';
import { existsSync } from 'node:fs';
import { join } from 'node:path';

/**
 * The folder with initdb and postgres, or null where there is no server. PG_BIN goes first; then pg_config, which
 * Debian's postgresql-common brings and which knows the newest version installed.
 * @returns {string | null}
 */
export function serverBinaries() {
  const bin = process.env.PG_BIN ?? ask('pg_config', ['--bindir']);
  return bin && existsSync(join(bin, 'postgres')) && existsSync(join(bin, 'initdb')) ? bin : null;
}

/** @param {string} command @param {string[]} args */
function ask(command, args) {
  try {
    return execFileSync(command, args, { encoding: 'utf8', stdio: ['ignore', 'pipe', 'ignore'] }).trim();
  } catch {
    return null; // not installed
  }
}
