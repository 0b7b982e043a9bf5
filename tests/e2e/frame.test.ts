/** What all screens share: nothing jumps, the keyboard gets everywhere, titles, addresses and the way back. */
import type { Page } from 'playwright-core';
import { makeFixture, type Fixture } from '../api/fixture';
import { openStage, PHONE, shot, WIDE, type Screen, type Stage } from './browser';
import { shiftOf, watchShift } from './layoutShift';

jest.setTimeout(120_000);
const LANDSCAPE: Screen = { name: 'landscape', width: 844, height: 390, touch: true, theme: 'dark' };
const NARROW: Screen = { name: 'narrow', width: 1100, height: 800, touch: false, theme: 'light' };
let stage: Stage;
let made: Fixture;
beforeAll(async () => {
  stage = await openStage();
  const lead = await stage.product.signIn('lena');
  made = await makeFixture(stage.product, lead);
  await lead.patch(`/shells/${made.shellId}`, { adoptedFitId: made.fitId }).expect(200);
}, 120_000);
afterAll(() => stage.close());

/** Most layout shift of a screen: what is seen as a jump. */
const MOST_SHIFT = 0.05;

const screens = (): [path: string, title: RegExp][] => [
  ['/regions', /^Regions · Outswell$/],
  [`/regions/${made.regionId}`, /^Trial field · Outswell$/],
  [`/cubes/${made.cubeId}?shell=${made.shellId}&ch=16`, /· Outswell$/],
  [`/cubes/${made.cubeId}/about`, /· Outswell$/],
  ['/shells', /· Outswell$/],
  [`/shells/${made.shellId}`, /Trial ring · Outswell$/],
  [`/shells/${made.shellId}/fits/${made.fitId}`, /· Outswell$/],
  ['/catalogue', /· Outswell$/],
  ['/inbox', /^Inbox · Outswell$/],
  ['/you', /^You · Outswell$/],
];

test.each([PHONE, WIDE])('nothing jumps as a screen loads, and each has its title: $name', async (screen) => {
  const { page, context, errors } = await stage.open(screen, 'lena');
  await watchShift(page);
  const jumped: string[] = [];
  const titles = new Set<string>();
  for (const [path, title] of screens()) {
    await page.goto(path);
    await page.getByRole('main').waitFor();
    await page.waitForLoadState('networkidle', { timeout: 3000 }).catch(() => undefined);
    await page.waitForTimeout(500);
    const { total, shifts } = await shiftOf(page);
    if (total >= MOST_SHIFT) jumped.push(`${path}: ${total} ${JSON.stringify(shifts)}`);
    expect(await page.title()).toMatch(title);
    titles.add(await page.title());
    const wider = (await page.evaluate('document.documentElement.scrollWidth - innerWidth')) as number;
    expect([path, wider]).toEqual([path, 0]);
  }
  expect(jumped).toEqual([]);
  expect(titles.size).toBe(screens().length);
  expect(errors).toEqual([]);
  await context.close();
});

const focused = (page: Page): Promise<string> =>
  page.evaluate(
    `(document.activeElement?.getAttribute('aria-label') ?? document.activeElement?.textContent ?? '').trim()`,
  );

test('the first Tab stop skips to the content; focus is seen; Escape closes the list of keys', async () => {
  const { page, context } = await stage.open(WIDE, 'lena');
  await page.goto('/catalogue');
  await page.getByRole('table').first().waitFor();
  await page.evaluate('document.activeElement?.blur()');
  await page.keyboard.press('Tab');
  if ((await focused(page)) !== 'Skip to the content') {
    // the page gave the content the focus already: the way back leads over the link
    await page.keyboard.press('Shift+Tab');
    while (!['Skip to the content', ''].includes(await focused(page))) await page.keyboard.press('Shift+Tab');
  }
  expect(await focused(page)).toBe('Skip to the content');
  const link = page.getByRole('button', { name: 'Skip to the content' });
  expect((await link.boundingBox())!.y).toBeGreaterThanOrEqual(0);
  const outline = await page.evaluate('getComputedStyle(document.activeElement).outlineStyle');
  expect(outline).toBe('solid');
  await page.keyboard.press('Enter');
  expect(
    await page.evaluate('document.activeElement?.getAttribute("role") ?? document.activeElement?.tagName'),
  ).toMatch(/main/i);
  await page.keyboard.press('?');
  await page.getByRole('dialog', { name: 'Keys' }).waitFor();
  await page.keyboard.press('Escape');
  await page.getByRole('dialog', { name: 'Keys' }).waitFor({ state: 'detached' });
  await context.close();
});

test('on its side a phone has the map beside strip and sheet, each large enough to use', async () => {
  const { page, context } = await stage.open(LANDSCAPE, 'lena');
  await page.goto(`/cubes/${made.cubeId}?shell=${made.shellId}&ch=16`);
  await page.getByTestId('map').waitFor();
  await page.getByTestId('strip').waitFor();
  const [map, strip] = [
    (await page.getByTestId('map').boundingBox())!,
    (await page.getByTestId('strip').boundingBox())!,
  ];
  await shot(page, LANDSCAPE, 'cube');
  expect(map.width).toBeGreaterThan(360);
  expect(map.height).toBeGreaterThan(220);
  expect(strip.x).toBeGreaterThanOrEqual(map.x + map.width - 1);
  expect(strip.y + strip.height).toBeLessThan(LANDSCAPE.height);
  const panel = (await page.getByRole('tabpanel').boundingBox())!;
  expect(panel.height).toBeGreaterThan(80);
  await context.close();
});

test('at 1100 px the notice of the cube screen keeps its button inside its column', async () => {
  const { page, context } = await stage.open(NARROW, 'lena');
  await page.goto(`/cubes/${made.cubeId}`);
  const button = page.getByRole('button', { name: 'Name a new shell' });
  await button.waitFor();
  const column = (await page.getByRole('complementary', { name: 'Shells and reading' }).boundingBox())!;
  const box = (await button.boundingBox())!;
  await shot(page, NARROW, 'notice');
  expect(box.x + box.width).toBeLessThanOrEqual(column.x + column.width);
  await context.close();
});

test('the strip as a table: a row shows its channel', async () => {
  const { page, context } = await stage.open(WIDE, 'lena');
  await page.goto(`/cubes/${made.cubeId}?shell=${made.shellId}&ch=16`);
  await page.getByTestId('strip').waitFor();
  await page.keyboard.press('Shift+c');
  const table = page.getByRole('table', { name: 'Channels by rising velocity' });
  await table.waitFor();
  expect(await table.getByRole('row').count()).toBe(33);
  await table.getByRole('button', { name: 'Show channel 5' }).click();
  await page.waitForURL(/ch=4(&|$)/);
  await page.goBack();
  await context.close();
});
