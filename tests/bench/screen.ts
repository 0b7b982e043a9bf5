import { readFileSync, readdirSync } from 'node:fs';
import { join } from 'node:path';
import { gzipSync } from 'node:zlib';
import type { Browser, BrowserContextOptions, Page } from 'playwright-core';
import { launch } from '../../scripts/chromium';
import { ensureClient } from '../../scripts/machine/client.mjs';
import { root } from '../../scripts/machine/place.mjs';
import { cookieOf } from '../api/uploading';
import { benchCube, NAME, SHAPE } from './benchCube';
import { paintWatch, type Paint } from './paintWatch';
import { startBenchProduct, type BenchProduct } from './product';
import { median, milliseconds, quantile, table, verdict } from './table';

const ROUNDS = 5;
const STEPS = 100;
const LIMIT = { firstLook: 1500, step: 50 };

const windows: { name: string; options: BrowserContextOptions }[] = [
  { name: '1440 x 900', options: { viewport: { width: 1440, height: 900 } } },
  {
    name: '390 x 844, 3 device pixels to one',
    options: { viewport: { width: 390, height: 844 }, deviceScaleFactor: 3, isMobile: true, hasTouch: true },
  },
];

/** How soon a channel is seen: opening a ready cube, and stepping through channels seen before. */
export async function benchScreen(): Promise<void> {
  await ensureClient(root, (line) => console.log(line));
  const product = await startBenchProduct();
  const browser = await launch();
  try {
    const { cubeId } = await product.ingest(benchCube());
    console.log(`${NAME}; Chromium ${browser.version()}`);
    console.log('Server, worker and browser share this machine; drawn without a graphics processor.\n');
    const looks = [['first look, cold cache', 'drawn', 'on screen', 'slowest', 'in full', '']];
    const steps = [['next channel, warm cache', 'drawn', 'on screen', '95th of 100', 'slowest', '']];
    for (const { name, options } of windows) {
      const first: Paint[] = [];
      const full: number[] = [];
      for (let round = 0; round < ROUNDS; round++)
        await withPage(browser, product, options, async (page) => {
          const seen = await firstLook(page, `${product.url}/cubes/${cubeId}`);
          first.push(seen.first);
          full.push(seen.full.shown);
        });
      const shown = first.map((p) => p.shown);
      looks.push([
        name,
        milliseconds(median(first.map((p) => p.drawn))),
        milliseconds(median(shown)),
        milliseconds(Math.max(...shown)),
        milliseconds(median(full)),
        verdict(median(shown), LIMIT.firstLook),
      ]);
      await withPage(browser, product, options, async (page) => {
        await firstLook(page, `${product.url}/cubes/${cubeId}`);
        const taken = await warmSteps(page);
        const times = taken.map((p) => p.shown);
        steps.push([
          name,
          milliseconds(median(taken.map((p) => p.drawn))),
          milliseconds(median(times)),
          milliseconds(quantile(times, 0.95)),
          milliseconds(Math.max(...times)),
          verdict(quantile(times, 0.95), LIMIT.step),
        ]);
      });
    }
    console.log(table(looks));
    console.log(`medians of ${ROUNDS}, from navigation; limit ${milliseconds(LIMIT.firstLook)} on screen\n`);
    console.log(table(steps));
    console.log(`medians of ${STEPS}, from the key; limit ${milliseconds(LIMIT.step)} for 95 of 100\n`);
    console.log(table(bundleSizes()));
  } finally {
    await browser.close();
    await product.stop();
  }
}

/** A page signed in, with nothing in its cache. */
async function withPage(
  browser: Browser,
  { lead, url }: BenchProduct,
  options: BrowserContextOptions,
  use: (page: Page) => Promise<void>,
) {
  const context = await browser.newContext(options);
  const [name = '', ...value] = cookieOf(lead, url).split('=');
  await context.addCookies([{ name, value: value.join('='), url }]);
  await context.addInitScript(paintWatch);
  const page = await context.newPage();
  page.setDefaultTimeout(30_000);
  try {
    await use(page);
  } finally {
    await context.close();
  }
}

/** Times since navigation of the first channel seen, however coarse, and of its plane in full. */
async function firstLook(page: Page, url: string): Promise<{ first: Paint; full: Paint }> {
  await page.goto(url, { waitUntil: 'commit' });
  const full = await painted(page, 'block === 1');
  return { first: await painted(page, 'true'), full };
}

/** Every channel once, so that its plane is in memory; then step through them again, each from key to picture. */
async function warmSteps(page: Page): Promise<Paint[]> {
  await press(page, 'Home', 'channel === 0 && block === 1');
  for (let channel = 1; channel < SHAPE.channels; channel++)
    await press(page, 'ArrowRight', `channel === ${channel} && block === 1`);
  await press(page, 'Home', 'channel === 0 && block === 1');
  const taken: Paint[] = [];
  for (let channel = 1; channel <= STEPS; channel++)
    taken.push(await press(page, 'ArrowRight', `channel === ${channel}`));
  return taken;
}

async function press(page: Page, key: string, condition: string): Promise<Paint> {
  await page.keyboard.press(key);
  return painted(page, condition);
}

/** The first picture since the last key (or since navigation) for which the condition holds. */
const painted = async (page: Page, condition: string): Promise<Paint> =>
  (await page.evaluate(`paintWatch.first(({ channel, block }) => ${condition})`)) as Paint;

function bundleSizes(): string[][] {
  const folder = join(root, 'dist', '_expo', 'static', 'js', 'web');
  const files = readdirSync(folder).filter((name) => name.endsWith('.js'));
  const sizes = files.map((name) => {
    const bytes = readFileSync(join(folder, name));
    return { name, plain: bytes.length, packed: gzipSync(bytes, { level: 9 }).length };
  });
  const row = (name: string, of: typeof sizes) => [
    name,
    ...(['plain', 'packed'] as const).map(
      (k) => `${(of.reduce((n, s) => n + s[k], 0) / 1000).toFixed(0)} kB`,
    ),
  ];
  return [
    ['JavaScript', 'plain', 'gzip'],
    row(
      'entry bundle',
      sizes.filter((s) => s.name.startsWith('entry-')),
    ),
    row(`all ${files.length} files`, sizes),
  ];
}
