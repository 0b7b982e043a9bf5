import { chromium, type Browser, type BrowserContext, type LaunchOptions } from 'playwright-core';
import { execFileSync } from 'node:child_process';

function find(): string {
  if (process.env.CHROMIUM) return process.env.CHROMIUM;
  // the first has no window of its own to draw and is a tenth quicker
  for (const name of ['chromium-headless-shell', 'chromium', 'chromium-browser', 'google-chrome'])
    try {
      return execFileSync('which', [name], { encoding: 'utf8', stdio: ['ignore', 'pipe', 'ignore'] }).trim();
    } catch {
      /* next */
    }
  throw new Error(
    'No chromium found. Debian: apt-get install chromium-headless-shell. Elsewhere set CHROMIUM to its path.',
  );
}
const options = (): LaunchOptions => ({ executablePath: find(), args: ['--disable-dev-shm-usage'] });

/** Debian's chromium, headless. playwright switches its sandbox off by itself, so root needs no flag. */
export const launch = (): Promise<Browser> => chromium.launch(options());

/** The same with a profile in a folder, which lasts: one context, with what it has compiled. */
export const launchIn = (
  folder: string,
  more: Parameters<typeof chromium.launchPersistentContext>[1],
): Promise<BrowserContext> => chromium.launchPersistentContext(folder, { ...options(), ...more });
