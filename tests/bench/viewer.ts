import { readFileSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import type { Browser, BrowserContext, CDPSession, Page } from 'playwright-core';
import { launch } from '../../scripts/chromium';
import { ensureClient } from '../../scripts/machine/client.mjs';
import { root } from '../../scripts/machine/place.mjs';
import { cookieOf } from '../api/uploading';
import { benchField } from './benchCube';
import { startBenchProduct, type BenchProduct } from './product';
import { scrubWatch, type Scrub } from './scrubWatch';
import { median, milliseconds, quantile, table, verdict } from './table';

const CUBE = { nx: 512, ny: 512, channels: 256 };
const LARGE = { nx: 1024, ny: 1024, channels: 8 };
const CHANNELS = 100;
const RATE = 60;
const LIMIT = { turn: 17, share: 0.95, look: 16, first: 1000, full: 1500, megabytes: 400 };
const ROUNDS = 3;
interface LookTime {
  painted: number;
  shown: number;
}
/** Bytes a second and milliseconds of a poor line. */
const LINE = { downloadThroughput: 5e6 / 8, uploadThroughput: 5e6 / 8, latency: 80, offline: false };

/** Scrubbing, changing the look, opening, memory and a poor line, in Chromium at 1440 by 900. */
export async function benchViewer(): Promise<void> {
  await ensureClient(root, (line) => console.log(line));
  const product = await startBenchProduct();
  const browser = await launch();
  try {
    const { cubeId } = await product.ingestFile(written(product, 'cube', CUBE));
    const large = await product.ingestFile(written(product, 'large', LARGE));
    console.log(`${CUBE.nx} x ${CUBE.ny} x ${CUBE.channels} float32; Chromium ${browser.version()}`);
    console.log('Server and browser share this machine; drawn without a graphics processor.\n');
    const rows = [['what', 'measured', 'limit', '']];
    const say = (what: string, measured: string, limit: string, holds: string) => {
      rows.push([what, measured, limit, holds]);
      console.log(`${what}: ${measured}`);
    };
    await withPage(browser, product, async (page, context) => {
      const url = `${product.url}/cubes/${cubeId}?ch=0`;
      await open(page, url);
      const looks: { first: number; full: number }[] = [];
      for (let i = 0; i < ROUNDS; i++) looks.push(await open(page, url));
      for (const [what, limit] of [
        ['first', LIMIT.first],
        ['full', LIMIT.full],
      ] as const) {
        const time = median(looks.map((l) => l[what]));
        const name = what === 'first' ? 'opening, first picture' : 'opening, full plane';
        say(name, milliseconds(time), milliseconds(limit), verdict(time, limit));
      }
      for (const warm of [false, true]) {
        await page.keyboard.press('Home');
        await page.waitForTimeout(1500);
        const scrub = await scrubbed(page, CHANNELS, RATE);
        const { share, times } = punctual(scrub, CHANNELS);
        const word = `scrubbing ${CHANNELS} channels at ${RATE}/s, ${warm ? 'seen before' : 'first time'}`;
        say(
          `${word}: painted within ${LIMIT.turn} ms`,
          `${(share * 100).toFixed(0)} %, median ${milliseconds(median(times))}, 95th ${milliseconds(quantile(times, 0.95))}`,
          warm ? '95 %' : '',
          warm ? verdict(LIMIT.share, share) : '',
        );
      }
      for (let twice = 0; twice < 2; twice++) {
        await page.keyboard.press('Home');
        await scrubbed(page, CUBE.channels - 1, 30);
        await page.waitForTimeout(500);
      }
      const held = await rendererBytes(browser, context, page);
      say(
        'memory of the page after scrubbing the cube twice',
        `${(held / 1e6).toFixed(0)} MB`,
        `${LIMIT.megabytes} MB`,
        verdict(held / 1e6, LIMIT.megabytes),
      );
    });
    await withPage(browser, product, async (page) => {
      await open(page, `${product.url}/cubes/${large.cubeId}?ch=4`);
      await page.waitForTimeout(1000);
      const sayLook = async (what: string, keys: readonly string[], selector: string | null) => {
        const times = await lookTimes(page, keys, selector);
        const painted = times.map((t) => t.painted);
        say(
          `${what} change at 1024 x 1024: painted`,
          `median ${milliseconds(median(painted))}, 95th ${milliseconds(quantile(painted, 0.95))}`,
          milliseconds(LIMIT.look),
          verdict(quantile(painted, 0.95), LIMIT.look),
        );
        const shown = times.map((t) => t.shown);
        say(
          `${what} change at 1024 x 1024: its frame given to the screen`,
          `median ${milliseconds(median(shown))}, 95th ${milliseconds(quantile(shown, 0.95))}`,
          '',
          '',
        );
      };
      await sayLook('palette', ['p'], null);
      await sayLook('tone', ['t'], null);
      await page.keyboard.press('w');
      await page.getByRole('slider', { name: 'Bright end' }).focus();
      await sayLook('window', ['ArrowLeft', 'ArrowRight'], '[role="slider"][aria-label="Bright end"]');
    });
    await withPage(browser, product, async (page, context) => {
      const cdp = await context.newCDPSession(page);
      await open(page, `${product.url}/cubes/${cubeId}?ch=0`);
      await page.waitForTimeout(3000);
      await cdp.send('Network.enable');
      await cdp.send('Network.emulateNetworkConditions', LINE);
      await page.evaluate(`scrubWatch.watchBlank()`);
      const scrub = await scrubbed(page, CHANNELS, RATE);
      const { share } = punctual(scrub, CHANNELS);
      const blank = (await page.evaluate(`scrubWatch.blankFrames()`)) as number;
      const standIns = scrub.paints.filter((p) => p.standIn).length;
      say(
        'poor line (5 Mbit/s, 80 ms): painted within 17 ms',
        `${(share * 100).toFixed(0)} %, ${standIns} of them thumbnails`,
        '95 %',
        verdict(LIMIT.share, share),
      );
      say('poor line: frames with a blank map', String(blank), '0', blank === 0 ? 'PASS' : 'FAIL');
    });
    console.log(`\n${table(rows)}`);
  } finally {
    await browser.close();
    await product.stop();
  }
}

function written(product: BenchProduct, name: string, shape: typeof CUBE): string {
  const path = join(product.scratch, `${name}.fits`);
  writeFileSync(path, benchField(shape));
  return path;
}

async function withPage(
  browser: Browser,
  { lead, url }: BenchProduct,
  use: (page: Page, context: BrowserContext) => Promise<void>,
) {
  const context = await browser.newContext({ viewport: { width: 1440, height: 900 } });
  const [name = '', ...value] = cookieOf(lead, url).split('=');
  await context.addCookies([{ name, value: value.join('='), url }]);
  await context.addInitScript(scrubWatch);
  const page = await context.newPage();
  page.setDefaultTimeout(60_000);
  try {
    await use(page, context);
  } finally {
    await context.close();
  }
}

/** Milliseconds from navigation to the first picture, a thumbnail too, and to the plane in full. */
async function open(page: Page, url: string): Promise<{ first: number; full: number }> {
  await page.goto(url, { waitUntil: 'commit' });
  await page.evaluate(`scrubWatch.untilFull()`);
  return (await page.evaluate(
    `({ first: scrubWatch.paints[0].at, full: scrubWatch.paints.find((p) => p.block === 1).at })`,
  )) as { first: number; full: number };
}

const scrubbed = async (page: Page, channels: number, rate: number): Promise<Scrub> =>
  (await page.evaluate(`scrubWatch.scrub(${channels}, ${rate})`)) as Scrub;

/** From each turn to the picture of its channel; a channel that was never painted counts as late for ever. */
function punctual({ turns, paints }: Scrub, channels: number): { share: number; times: number[] } {
  const times = turns.map(({ channel, at }) => {
    const paint = paints.find((p) => p.channel === channel && p.at >= at);
    return paint ? paint.at - at : Infinity;
  });
  return { share: times.filter((t) => t <= LIMIT.turn).length / channels, times };
}

/** From a key to the picture in its new look, 20 times, the keys in turn. */
async function lookTimes(page: Page, keys: readonly string[], selector: string | null): Promise<LookTime[]> {
  const times = (await page.evaluate(
    `scrubWatch.looks(${JSON.stringify(keys)}, ${JSON.stringify(selector)}, 20)`,
  )) as LookTime[];
  return times.slice(2);
}

/** What the page's process holds for itself: not shared with others, not backed by a file. */
async function rendererBytes(browser: Browser, context: BrowserContext, page: Page): Promise<number> {
  const own = await context.newCDPSession(page);
  await own.send('HeapProfiler.collectGarbage');
  const whole: CDPSession = await browser.newBrowserCDPSession();
  const { processInfo } = await whole.send('SystemInfo.getProcessInfo');
  const sizes = processInfo
    .filter((p) => p.type === 'renderer')
    .map((p) =>
      Number(/^RssAnon:\s+(\d+) kB/m.exec(readFileSync(`/proc/${p.id}/status`, 'utf8'))?.[1] ?? NaN),
    );
  return Math.max(...sizes) * 1024;
}
