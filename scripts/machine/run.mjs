// @ts-check
import { spawn } from 'node:child_process';

/**
 * Runs a command to its end, its output going to ours. Rejects when it fails or cannot be started.
 * @param {string} command @param {string[]} args
 * @param {{ cwd?: string, env?: NodeJS.ProcessEnv, quiet?: boolean }} [options]  quiet: output only when it fails
 * @returns {Promise<void>}
 */
export const run = (command, args, { cwd, env, quiet = false } = {}) =>
  new Promise((done, fail) => {
    const child = spawn(command, args, {
      cwd,
      env,
      stdio: ['ignore', quiet ? 'pipe' : 'inherit', quiet ? 'pipe' : 'inherit'],
    });
    let output = '';
    child.stdout?.on('data', (chunk) => (output += chunk));
    child.stderr?.on('data', (chunk) => (output += chunk));
    child.once('error', fail);
    child.once('close', (code, signal) => {
      if (code === 0) return done();
      process.stderr.write(output);
      fail(new Error(`${command} ${args[0] ?? ''} failed (${signal ?? `exit code ${code}`})`));
    });
  });
