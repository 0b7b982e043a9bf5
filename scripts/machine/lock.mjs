// @ts-check
import { mkdirSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { dirname } from 'node:path';
import { Stop } from './stop.mjs';

/**
 * One start for each checkout. The lock names its holder, so that one whose holder is gone blocks nobody.
 *
 * @param {string} file @param {string} what  of the holder, for the next one's message
 * @returns {{ release: () => void, tookOver: boolean }}  tookOver: an earlier holder was killed
 */
export function takeLock(file, what) {
  mkdirSync(dirname(file), { recursive: true });
  const mine = JSON.stringify({ pid: process.pid, started: startOf(process.pid), what });
  for (let tookOver = false; ; tookOver = true) {
    try {
      writeFileSync(file, mine, { flag: 'wx' });
      return { release: () => rmSync(file, { force: true }), tookOver };
    } catch (error) {
      if (/** @type {NodeJS.ErrnoException} */ (error).code !== 'EEXIST' || tookOver) throw error;
    }
    const holder = read(file);
    if (holder && startOf(holder.pid) === holder.started && holder.started !== null)
      throw new Stop(`${holder.what} already runs from this folder (process ${holder.pid}). Stop it first.`);
    rmSync(file, { force: true });
  }
}

/** @param {string} file @returns {{ pid: number, started: string | null, what: string } | null} */
function read(file) {
  try {
    return JSON.parse(readFileSync(file, 'utf8'));
  } catch {
    return null; // removed meanwhile, or cut off when its writer was killed
  }
}

/**
 * When a living process started, in whatever units: tells it from another that was given the same number later.
 * @param {number} pid @returns {string | null} null: no such process
 */
function startOf(pid) {
  try {
    if (process.platform !== 'linux') return process.kill(pid, 0) ? 'unknown' : null;
    const afterName = readFileSync(`/proc/${pid}/stat`, 'utf8').split(') ').at(-1) ?? '';
    const fields = afterName.split(' '); // from the third field on: state …, the 22nd is the start time
    return fields[0] === 'Z' ? null : (fields[19] ?? null);
  } catch {
    return null;
  }
}
