/** A person saves what is seen: the files come, open, and show what was on the screen. */
import { readFileSync } from 'node:fs';
import { GifReader } from 'omggif';
import type { Page } from 'playwright-core';
import sharp from 'sharp';
import { marksOnRing } from '../api/cubeFile';
import { newRegion, newShell, readyCube, saveMarks } from '../api/fixture';
import { openStage, PHONE, shot, violations, WIDE, type Stage } from './browser';

jest.setTimeout(120_000);
const CHANNELS = [12, 16, 20];
let stage: Stage;
let cubeId: string;
let shellId: string;
beforeAll(async () => {
  stage = await openStage();
  const lead = await stage.product.signIn('lena');
  const regionId = await newRegion(lead);
  cubeId = await readyCube(stage.product, lead, regionId);
  shellId = await newShell(lead, regionId);
  await saveMarks(
    lead,
    shellId,
    cubeId,
    CHANNELS.flatMap((k) => marksOnRing(k)),
  );
}, 120_000);
afterAll(() => stage.close());

async function openDialog(screen = WIDE) {
  const { page, context, errors } = await stage.open(screen, 'lena');
  await page.goto(`/cubes/${cubeId}?shell=${shellId}&ch=16`);
  await page.getByTestId('map').waitFor();
  await page.getByText('km/s').first().waitFor();
  if (screen.width >= 900) await page.keyboard.press('Control+s');
  else {
    await page.getByRole('button', { name: 'More of this cube' }).click();
    await page.getByRole('menuitem', { name: 'Save picture' }).click();
  }
  await page.getByLabel('What will be saved').waitFor();
  return { page, context, errors };
}

async function saved(page: Page, button: string): Promise<{ name: string; bytes: Buffer }> {
  const [download] = await Promise.all([
    page.waitForEvent('download', { timeout: 60_000 }),
    page.getByRole('button', { name: button }).click(),
  ]);
  return { name: download.suggestedFilename(), bytes: readFileSync(await download.path()) };
}

test('the picture as SVG holds raster, marks, axes and typeface; as PNG it is 88 mm at 600 dots an inch', async () => {
  const { page, context, errors } = await openDialog();
  await shot(page, WIDE, 'save-picture');
  expect(await violations(page)).toEqual([]);
  const svg = await saved(page, 'Save SVG');
  expect(svg.name).toMatch(/\.svg$/);
  const text = svg.bytes.toString('utf8');
  const broken = await page.evaluate(
    `new DOMParser().parseFromString(${JSON.stringify(text)}, 'image/svg+xml').querySelectorAll('parsererror').length`,
  );
  expect(broken).toBe(0);
  expect(text).toContain('href="data:image/png;base64,');
  expect(text).toContain('@font-face');
  expect(text.match(/class="mark"/g)).toHaveLength(marksOnRing(16).length);
  expect(text).toContain('Galactic longitude');
  const png = await saved(page, 'Save PNG');
  const meta = await sharp(png.bytes).metadata();
  expect(meta.width).toBe(Math.round((88 / 25.4) * 600));
  expect(Math.round(meta.density!)).toBe(600);
  // the raster was painted: not one colour alone in the middle of the picture
  const { data } = await sharp(png.bytes)
    .extract({ left: 700, top: 500, width: 400, height: 400 })
    .raw()
    .toBuffer({ resolveWithObject: true });
  expect(new Set(data).size).toBeGreaterThan(20);
  expect(errors).toEqual([]);
  await context.close();
});

test('on a phone: a sheet of the channels with marks, from the menu', async () => {
  const { page, context } = await openDialog(PHONE);
  await page.getByRole('radio', { name: 'Channel sheet' }).click();
  await page.getByText(/^3 channels/).waitFor();
  await shot(page, PHONE, 'save-sheet');
  const { bytes } = await saved(page, 'Save SVG');
  const text = bytes.toString('utf8');
  expect(text.match(/<image /g)).toHaveLength(CHANNELS.length);
  expect(text.match(/class="ring-marks"/g)).toHaveLength(CHANNELS.length);
  await context.close();
});

test('a loop through all channels is a GIF that runs for ever', async () => {
  const { page, context } = await openDialog();
  await page.getByRole('radio', { name: 'Loop' }).click();
  const { name, bytes } = await saved(page, 'Save GIF');
  expect(name).toMatch(/\.gif$/);
  const gif = new GifReader(bytes);
  expect(gif.numFrames()).toBe(32 + 30); // there and back, without the ends twice
  expect(gif.width).toBe(480);
  expect(gif.loopCount()).toBe(0);
  await context.close();
});
