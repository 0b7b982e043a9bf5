// @ts-check
import { spawn } from 'node:child_process';
import { join } from 'node:path';

/** @param {string} root @param {string} path  a package's program */
export const tool = (root, path) => join(root, 'node_modules', path);

/** @type {Set<import('node:child_process').ChildProcess>} */
const running = new Set();

/**
 * Runs a Node program to its end.
 *
 * @param {string} program @param {string[]} args
 * @param {{ cwd: string, env?: NodeJS.ProcessEnv, capture?: boolean, discardOutput?: boolean }} options
 * @returns {Promise<{ ok: boolean, output: string }>}
 */
export const execute = (program, args, { cwd, env, capture = false, discardOutput = false }) =>
  new Promise((done, fail) => {
    const out = capture ? 'pipe' : discardOutput ? 'ignore' : 'inherit';
    // A group of its own, so that an interrupted run can end all that the program started.
    const child = spawn(process.execPath, [program, ...args], {
      cwd,
      env,
      detached: true,
      stdio: ['ignore', out, capture ? 'pipe' : 'inherit'],
    });
    running.add(child);
    let output = '';
    child.stdout?.on('data', (chunk) => (output += chunk));
    child.stderr?.on('data', (chunk) => (output += chunk));
    child.once('error', fail);
    child.once('close', (code) => {
      running.delete(child);
      done({ ok: code === 0, output: output.trim() });
    });
  });

/** Ends what runs, with all that it started. */
export function endAll() {
  for (const child of running)
    try {
      if (child.pid) process.kill(-child.pid, 'SIGTERM');
    } catch {
      // ended by itself meanwhile
    }
}
