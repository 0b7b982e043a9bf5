// @ts-check
import { readFileSync } from 'node:fs';

/**
 * Calls back once npm, or the shell that it puts between itself and us, is gone. npm passes signals on, but killed by
 * force it cannot, and then nobody is left who would stop us.
 * @param {() => void} gone
 */
export function whenNpmIsGone(gone) {
  if (!process.env.npm_lifecycle_event) return; // started by hand: outliving the terminal's shell is its owner's wish
  const before = chain();
  const watch = setInterval(() => {
    if (chain() === before) return;
    clearInterval(watch);
    gone();
  }, 500);
  watch.unref();
}

/** Parent and grandparent. */
const chain = () => `${process.ppid} ${parentOf(process.ppid)}`;

/** @param {number} pid */
function parentOf(pid) {
  try {
    return readFileSync(`/proc/${pid}/stat`, 'utf8').split(') ').at(-1)?.split(' ')[1];
  } catch {
    return undefined; // not Linux, or gone: then the parent itself has changed
  }
}
