import { existsSync, mkdirSync, mkdtempSync, readFileSync, rmdirSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import type { BrowserContext } from 'playwright-core';
import { launchIn } from '@/scripts/chromium';
import { freePort } from '../api/harness';

/** Where browsers keep their profiles, and the port of the product: what they compiled belongs to its address. */
interface Place {
  folder: string;
  port: number;
  leave(): void;
}

/** The place that all files of a run share, one after the other; one of its own for a file beside it. */
export async function takePlace(): Promise<Place> {
  const shared = process.env.TEST_BROWSERS;
  const taken = shared && join(shared, 'taken');
  if (!taken || !madeFolder(taken)) {
    const folder = mkdtempSync(join(tmpdir(), 'outswell-browser-'));
    const leave = () => rmSync(folder, { recursive: true, force: true, maxRetries: 3 });
    return { folder, port: await freePort(), leave };
  }
  const note = join(shared, 'port');
  if (!existsSync(note)) writeFileSync(note, String(await freePort()));
  return { folder: shared, port: Number(readFileSync(note, 'utf8')), leave: () => rmdirSync(taken) };
}

function madeFolder(path: string): boolean {
  try {
    mkdirSync(path);
    return true;
  } catch {
    return false;
  }
}

interface Kept {
  context: BrowserContext;
  touch: boolean;
  free: boolean;
  end(): Promise<void>;
}

/**
 * Browsers whose profiles last: the client is compiled once and not for each test, which halves the time of opening a
 * page. Closing a lent context wipes what a person left in it (sign-in, storage, permissions) and gives it
 * back.
 */
export function makeProfiles(url: string, folder: string) {
  const kept: Kept[] = [];
  return {
    async lend(touch: boolean): Promise<BrowserContext> {
      const found =
        kept.find((k) => k.free && k.touch === touch) ??
        (await begin(url, join(folder, `${kept.length}-${touch}`), touch));
      if (!kept.includes(found)) kept.push(found);
      found.free = false;
      return found.context;
    },
    end: async () => void (await Promise.all(kept.map((k) => k.end()))),
  };
}

async function begin(url: string, folder: string, touch: boolean): Promise<Kept> {
  const context = await launchIn(folder, { hasTouch: touch, baseURL: url, acceptDownloads: true });
  const end = context.close.bind(context);
  const blank = context.pages()[0] ?? (await context.newPage()); // keeps the browser open between tests
  const wipe = await context.newCDPSession(blank);
  const one: Kept = {
    context,
    touch,
    free: false,
    end,
  };
  const clean = async () => {
    for (const page of context.pages()) if (page !== blank) await page.close();
    await context.unrouteAll({ behavior: 'ignoreErrors' });
    await context.setOffline(false);
    await context.clearPermissions();
    await context.clearCookies();
    const storageTypes = 'cookies,local_storage,indexeddb,cache_storage,service_workers';
    await wipe.send('Storage.clearDataForOrigin', { origin: url, storageTypes });
  };
  await clean(); // of what a file left that did not get to its end
  context.close = async () => {
    if (one.free) return;
    await clean();
    one.free = true;
  };
  return one;
}
