/** Screenshots of each main screen at each width in both themes, as sheets to look at: sheets.ts [folder] [address]. */
import { spawn } from 'node:child_process';
import { mkdirSync } from 'node:fs';
import { join, resolve } from 'node:path';
import type { Browser, Page } from 'playwright-core';
import type { Fit } from '@/shared/contract/fits';
import type { Shell } from '@/shared/contract/shells';
import { signIn, violations } from '../tests/e2e/browser';
import { shiftOf, watchShift } from '../tests/e2e/layoutShift';
import { startBenchProduct, stopAll } from '../tests/bench/product';
import { launch } from './chromium';
import { signIn as signInHttp } from './demo/client';
import { root } from './machine/place.mjs';
import { contactSheet, type Shot } from './sheets/contactSheet';
import { SCREENS, THEMES, WINDOWS, type SheetScreen, type Shown, type Window } from './sheets/screens';

const LEAD = 'ansa';
const SETTLE_MS = 700;
const say = (line: string) => process.stdout.write(`${line}\n`);

async function main(folder: string, given: string | undefined): Promise<void> {
  mkdirSync(folder, { recursive: true });
  const url = given ?? (await demoProduct());
  const browser = await launch();
  try {
    const shown = await whatToShow(url);
    const shots = new Map<string, Shot[][]>();
    for (const theme of THEMES)
      for (const window of WINDOWS) {
        const page = await openPage(browser, url, window, theme);
        for (const screen of SCREENS) {
          const shot = await photograph(page, screen, shown, window, theme, folder);
          const rows = shots.get(screen.name) ?? [];
          shots.set(screen.name, rows);
          (rows[THEMES.indexOf(theme)] ??= []).push(shot);
        }
        await page.context().close();
      }
    for (const [name, rows] of shots)
      await contactSheet(browser, name, rows, join(folder, `sheet-${name}.jpg`));
    say(`${shots.size} sheets are in ${folder}.`);
  } finally {
    await browser.close();
    await stopAll();
  }
}

/** A product of its own with the demo's data in it; stopped by stopAll. */
async function demoProduct(): Promise<string> {
  const { url } = await startBenchProduct(LEAD);
  say(`Making the demo at ${url} …`);
  const child = spawn(process.execPath, ['--import', 'tsx', 'scripts/demo.ts'], {
    cwd: root,
    env: { ...process.env, OUTSWELL_URL: url },
    stdio: ['ignore', 'inherit', 'inherit'],
  });
  const code = await new Promise((done) => child.once('exit', done));
  if (code !== 0) throw new Error('The demo could not be made.');
  return url;
}

/** A shell with an adopted fit, its cube, and others to compare it with. */
async function whatToShow(url: string): Promise<Shown> {
  const lead = await signInHttp(url, LEAD);
  const shells = await lead.list<Shell>('/shells?limit=500');
  const shell =
    shells.find((s) => s.adoptedFitId && s.readings.some((r) => r.mine)) ??
    shells.find((s) => s.adoptedFitId);
  const reading = shell?.readings.find((r) => r.mine) ?? shell?.readings[0];
  if (!shell?.adoptedFitId || !reading) throw new Error('There is no shell with an adopted fit to show.');
  const fit = await lead.get<Fit>(`/fits/${shell.adoptedFitId}`);
  const middle = fit.rings?.[fit.rings.length >> 1];
  return {
    regionId: shell.regionId,
    cubeId: reading.cubeId,
    shellId: shell.id,
    fitId: shell.adoptedFitId,
    channel: middle?.channel ?? 0,
    compared: shells
      .filter((s) => s.adoptedFitId)
      .slice(0, 3)
      .map((s) => s.id),
  };
}

async function openPage(
  browser: Browser,
  url: string,
  { width, height, touch }: Window,
  theme: (typeof THEMES)[number],
): Promise<Page> {
  const context = await browser.newContext({
    viewport: { width, height },
    hasTouch: touch,
    colorScheme: theme,
    baseURL: url,
  });
  await context.addInitScript(`localStorage.setItem('outswell.guide.all', 'seen')`);
  const page = await context.newPage();
  page.setDefaultTimeout(60_000);
  page.on('pageerror', (error) => say(`  a page failed: ${String(error)}`));
  await watchShift(page);
  await signIn(page, LEAD);
  return page;
}

async function photograph(
  page: Page,
  screen: SheetScreen,
  shown: Shown,
  window: Window,
  theme: string,
  folder: string,
): Promise<Shot> {
  const title = `${screen.name} ${window.name} ${theme}`;
  await page.goto(screen.path(shown));
  await page.getByRole('main').waitFor();
  await page.waitForLoadState('networkidle', { timeout: 4000 }).catch(() => undefined); // live events never rest
  await page.waitForTimeout(SETTLE_MS);
  const { total, shifts } = await shiftOf(page);
  if (total > 0.05) say(`  ${title}: jumped by ${total.toFixed(3)}: ${JSON.stringify(shifts).slice(0, 600)}`);
  await screen
    .prepare?.(page, window.width >= 900)
    .catch((error: Error) => say(`  ${title}: ${error.message.split('\n')[0]}`));
  await page.waitForTimeout(SETTLE_MS);
  const path = join(folder, `${title.replaceAll(' ', '-')}.jpg`);
  await page.screenshot({ path, type: 'jpeg', quality: 80 });
  const wider = (await page.evaluate('document.documentElement.scrollWidth - innerWidth')) as number;
  if (wider > 0) say(`  ${title}: the page is ${wider} px wider than its window`);
  if (window.name === '390' || window.name === '1440')
    for (const finding of await violations(page)) say(`  ${title}: ${finding}`);
  say(title);
  return { title, path, width: window.width, height: window.height };
}

main(resolve(process.argv[2] ?? 'sheets'), process.argv[3]).catch((error: unknown) => {
  process.stderr.write(`${error instanceof Error ? error.message : String(error)}\n`);
  process.exitCode = 1;
});
