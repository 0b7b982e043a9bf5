// @ts-check
import { spawn } from 'node:child_process';
import { createInterface } from 'node:readline';
import { readable } from './logLines.mjs';

/** @typedef {{ name: string, pid: number | undefined, stop: () => Promise<void>, ended: Promise<{ code: number | null, signal: string | null }> }} Child */

/**
 * Starts one of our programs with its output in ours, each line after its name.
 *
 * It gets a group of its own, so that Ctrl-C reaches us alone and we stop things in order; and where the system can,
 * it is told to stop when we die, by kill -9 too.
 *
 * @param {string} name @param {string} script  from the root of the checkout
 * @param {{ cwd: string, env: NodeJS.ProcessEnv }} options
 * @returns {Child}
 */
export function startChild(name, script, { cwd, env }) {
  const program = [process.execPath, '--import', 'tsx', script];
  const [command = '', ...args] =
    process.platform === 'linux' ? ['setpriv', '--pdeathsig=TERM', ...program] : program;
  const child = spawn(command, args, { cwd, env, detached: true, stdio: ['ignore', 'pipe', 'pipe'] });
  for (const stream of [child.stdout, child.stderr])
    createInterface({ input: stream }).on('line', (line) => console.log(readable(name, line)));
  let over = false;
  const ended = new Promise(
    (/** @type {(value: { code: number | null, signal: string | null }) => void} */ done) => {
      child.once('error', (error) => {
        over = true;
        console.log(readable(name, String(error)));
        done({ code: 1, signal: null });
      });
      child.once('close', (code, signal) => {
        over = true;
        done({ code, signal });
      });
    },
  );
  return {
    name,
    pid: child.pid,
    ended,
    stop: async () => {
      if (over) return;
      child.kill('SIGTERM');
      const force = setTimeout(() => {
        console.log(readable(name, 'did not stop within 10 s, so it is ended by force'));
        child.kill('SIGKILL');
      }, 10_000);
      await ended;
      clearTimeout(force);
    },
  };
}
