import { chromium, type Browser } from 'playwright-core';
import { execFileSync } from 'node:child_process';

function find(): string {
  if (process.env.CHROMIUM) return process.env.CHROMIUM;
  for (const name of ['chromium', 'chromium-browser', 'google-chrome'])
    try {
      return execFileSync('which', [name], { encoding: 'utf8', stdio: ['ignore', 'pipe', 'ignore'] }).trim();
    } catch {
      /* next */
    }
  throw new Error('No chromium found. Debian: apt-get install chromium. Elsewhere set CHROMIUM to its path.');
}
/** Debian's chromium, headless. playwright switches its sandbox off by itself, so root needs no flag. */
export const launch = (): Promise<Browser> =>
  chromium.launch({ executablePath: find(), args: ['--disable-dev-shm-usage'] });
