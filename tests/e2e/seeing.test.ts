/** What is seen is where it belongs on the sky, is stated, and is held by the address. */
import type { Page } from 'playwright-core';
import { fitted, looking, toScreen } from '@/shared/image/viewport';
import { buildWcs } from '@/shared/sky/wcs';
import type { WcsSpec } from '@/shared/sky/wcsSpec';
import { newRegion, newShell, readyCube, saveMarks } from '../api/fixture';
import { cubeFile, marksOnRing, PIXEL } from '../api/cubeFile';
import { until, type SignedIn } from '../api/harness';
import { upload } from '../api/uploading';
import { api, openStage, PHONE, shot, violations, WIDE, type Stage } from './browser';

jest.setTimeout(120_000);
let stage: Stage;
let lead: SignedIn;
let regionId: string;
let cubeId: string;
let shellId: string;
beforeAll(async () => {
  stage = await openStage();
  lead = await stage.product.signIn('lena');
  regionId = await newRegion(lead);
  cubeId = await readyCube(stage.product, lead, regionId);
  shellId = await newShell(lead, regionId);
  await saveMarks(
    lead,
    shellId,
    cubeId,
    [12, 14, 16, 18, 20].flatMap((k) => marksOnRing(k)),
  );
});
afterAll(() => stage.close());

/** Until the picture asked for is on the map, and not what stands in for it. */
const settled = (page: Page) =>
  until(
    () =>
      page.evaluate<boolean>(`(() => {
        const all = performance.getEntriesByName('outswell:channel-painted');
        const raster = document.querySelector('[data-testid="raster"]');
        return all.length > 0 && !all[all.length - 1].detail.standIn && raster.style.opacity === '1';
      })()`),
    (seen) => seen,
  );

/** Until a plane is on the map, not only its thumbnail. */
const painted = (page: Page) =>
  until(
    () =>
      page.evaluate<boolean>(
        `performance.getEntriesByName('outswell:channel-painted').some((e) => !e.detail.standIn)`,
      ),
    (seen) => seen,
  );

async function open(screen = WIDE, query = '') {
  const opened = await stage.open(screen, 'lena');
  await opened.page.goto(`/cubes/${cubeId}?shell=${shellId}&ch=16${query}`);
  await opened.page.getByTestId('map').first().waitFor();
  await painted(opened.page);
  return opened;
}

interface Seen {
  /** Brightness weighted middle of what is painted, canvas pixels. */
  x: number;
  y: number;
  width: number;
  height: number;
  ratio: number;
}

/** The middle of the bright spot on the map, from the canvas itself. */
const spotOnCanvas = (page: Page): Promise<Seen> =>
  page.evaluate(`(() => {
    const canvas = document.querySelector('[data-testid="raster"]');
    const { width, height } = canvas;
    const pixels = canvas.getContext('2d').getImageData(0, 0, width, height).data;
    let [sum, sx, sy] = [0, 0, 0];
    for (let i = 0; i < width * height; i++) {
      const bright = pixels[4 * i] > 40 ? pixels[4 * i] : 0;
      sum += bright;
      sx += bright * ((i % width) + 0.5);
      sy += bright * (Math.floor(i / width) + 0.5);
    }
    return { x: sx / sum, y: sy / sum, width, height, ratio: width / canvas.clientWidth };
  })()`);

describe('a painted pixel lies where the sky says', () => {
  const SPOT = { x: 21, y: 43 };
  let spotCube: string;
  beforeAll(async () => {
    const bytes = cubeFile({
      nx: 64,
      ny: 60,
      channels: 4,
      value: (x, y) => (x === SPOT.x && y === SPOT.y ? 1 : 0),
    });
    const { cubeId: id } = await upload(lead, stage.product.url, regionId, bytes);
    await until(
      async () => (await lead.get(`/cubes/${id}`)).body,
      (cube) => cube.status === 'ready',
    );
    spotCube = id!;
  });

  // the image fits 64 by 60; at these zooms the spot is in sight
  test.each([
    [1, 22.3, 42.1],
    [1.7, 31, 30], // nearer to an edge the image would be held back, differently while the page takes its shape
    [2.9, 22.3, 42.1],
    [4.3, 22.3, 42.1],
    [6.5, 22.3, 42.1],
  ])('to a tenth of a pixel at zoom %d', async (zoom, x, y) => {
    const { page, context } = await stage.open(WIDE, 'lena');
    await page.goto(`/cubes/${spotCube}?ch=1&zoom=${zoom}&x=${x}&y=${y}&low=0&high=1&tone=even`);
    await painted(page);
    await page.waitForTimeout(200);
    const seen = await spotOnCanvas(page);
    const { axes } = await api<{ axes: { nx: number; ny: number; wcs: WcsSpec } }>(
      page,
      `/cubes/${spotCube}`,
    );
    const wcs = buildWcs(axes.wcs);
    // the header says it: pixels of PIXEL degrees about (120, 0), longitude to the left
    const sky = wcs.pixelToGalactic(SPOT.x, SPOT.y)!;
    expect(sky.l).toBeCloseTo(120 - (SPOT.x - 31.5) * PIXEL, 9);
    const place = wcs.galacticToPixel(sky.l, sky.b)!;
    // canvas pixels: the viewport that the address names, on a map of this size
    const v = looking(fitted(axes.nx, axes.ny, seen.width, seen.height), x, y, zoom);
    const { sx, sy } = toScreen(zoom === 1 ? fitted(axes.nx, axes.ny, seen.width, seen.height) : v, place);
    const [expected, scale] = [{ x: sx, y: sy }, v.scale];
    expect(Math.abs(seen.x - expected.x) / scale).toBeLessThan(0.1);
    expect(Math.abs(seen.y - expected.y) / scale).toBeLessThan(0.1);
    await context.close();
  });
});

test('averaging and smoothing are stated on the picture and held by the address', async () => {
  const { page, context, errors } = await open(WIDE, '&mean=5&beam=12&less=60');
  const note = page.getByTestId('picture-note');
  await note.getByText('mean of 5 channels').waitFor();
  await note.getByText('smoothed to 12′').waitFor();
  await note.getByText('less smoothing to 60′').waitFor();
  await page.getByTestId('map').press(']');
  await note.getByText('mean of 7 channels').waitFor();
  await page.waitForURL(/mean=7/);
  await page.reload();
  await note.getByText('mean of 7 channels').waitFor();
  await settled(page);
  await shot(page, WIDE, 'seeing-smooth');
  expect(errors).toEqual([]);
  await context.close();
});

test('polar: the ring is a straight line, and the model lies on it', async () => {
  const { page, context, errors } = await open(WIDE);
  await page.keyboard.press('w');
  await page.getByRole('radio', { name: 'View', exact: true }).click();
  await page.getByRole('radio', { name: 'Polar' }).click();
  await page.waitForURL(/view=polar/);
  const centre = page.getByRole('button', { name: 'Centre on the model' });
  if (await centre.isVisible()) await centre.click(); // the live fit came after the press
  await settled(page);
  await page.waitForTimeout(300);
  await shot(page, WIDE, 'seeing-polar');
  expect(await violations(page)).toEqual([]);
  const rows = (await page.evaluate(`(() => {
    const canvas = document.querySelector('[data-testid="raster"]');
    const { width, height } = canvas;
    const pixels = canvas.getContext('2d').getImageData(0, 0, width, height).data;
    const found = [];
    for (let x = Math.round(width * 0.1); x < width * 0.9; x += Math.round(width / 12)) {
      let best = 0, at = -1;
      for (let y = 0; y < height; y++) {
        const bright = pixels[4 * (y * width + x)];
        if (bright > best) [best, at] = [bright, y];
      }
      found.push(at / height);
    }
    return found;
  })()`)) as number[];
  expect(Math.max(...rows) - Math.min(...rows)).toBeLessThan(0.06);
  await page.getByRole('radio', { name: 'Stereographic' }).click();
  await page.waitForURL(/view=stereographic/);
  await settled(page);
  await shot(page, WIDE, 'seeing-stereographic');
  await page.getByRole('radio', { name: 'Stacked' }).click();
  await page.getByText(/channels stacked by scaled radius/).waitFor();
  await settled(page);
  await shot(page, WIDE, 'seeing-stacked');
  expect(errors).toEqual([]);
  await context.close();
});

test('comparing: remember a channel, flick while the key is held, take the difference', async () => {
  const { page, context, errors } = await open(WIDE);
  await page.keyboard.press('c');
  await page.waitForURL(/other=16/);
  await page.keyboard.press('ArrowRight');
  await page.keyboard.press('ArrowRight');
  const note = page.getByTestId('picture-note');
  await page.keyboard.down('f');
  await note.getByText('channel 17 instead').waitFor();
  await page.keyboard.up('f');
  await note.waitFor({ state: 'detached' });
  await page.keyboard.press('d');
  await note.getByText(/^minus channel 17/).waitFor();
  await page.waitForURL(/minus=1/);
  await settled(page);
  await shot(page, WIDE, 'seeing-difference');
  expect(errors).toEqual([]);
  await context.close();
});

test('a film runs back and forth between two channels and stops', async () => {
  const { page, context } = await open(WIDE);
  await page.getByRole('button', { name: 'Play back and forth' }).click();
  await page.waitForTimeout(1200);
  await page.getByRole('button', { name: 'Stop playing' }).click();
  const shown = (await page.evaluate(
    `[...new Set(performance.getEntriesByName('outswell:channel-painted').map((e) => e.detail.channel))].length`,
  )) as number;
  expect(shown).toBeGreaterThan(4);
  await context.close();
});

test.each([
  ['segment', /velocity along/],
  ['ring', /around a ring/],
  ['spectrum', /Spectrum of/],
] as const)('a %s is cut, drawn and can be moved by keys', async (kind, words) => {
  const { page, context, errors } = await open(WIDE);
  await page.keyboard.press('w');
  await page.getByRole('radio', { name: 'View', exact: true }).click();
  await page
    .getByRole('radiogroup', { name: 'Slice through velocity' })
    .first()
    .getByRole('radio', { name: kind })
    .click();
  await page.waitForURL(new RegExp(`cut=${kind}`));
  await page.keyboard.press('Escape');
  await page.getByRole('img', { name: words }).waitFor();
  const before = page.url();
  const answered = page.waitForResponse((r) => /\/(cut|spectrum)\?/.test(r.url()) && r.ok());
  await page
    .getByRole('button', { name: /arrow keys move it/ })
    .first()
    .focus();
  for (let i = 0; i < 4; i++) await page.keyboard.press('Shift+ArrowUp');
  await answered;
  await page.waitForURL((url) => url.href !== before);
  await page.waitForTimeout(400);
  await shot(page, WIDE, `seeing-${kind}`);
  expect(await violations(page)).toEqual([]);
  expect(errors).toEqual([]);
  await context.close();
});

test('contours of another map, equatorial sexagesimal lines', async () => {
  const { page, context, errors } = await open(WIDE, `&contours=${cubeId},peak,4&second=total`);
  await page.keyboard.press('w');
  await page.getByRole('radio', { name: 'Lines', exact: true }).click();
  await page.getByText(/^At /).waitFor();
  await page.getByRole('radio', { name: 'α, δ' }).click();
  await page.getByRole('radio', { name: 'Sexagesimal' }).click();
  await page.getByTestId('map').first().hover();
  expect(await page.getByTestId('readout').innerText()).toMatch(/ʰ\d\dᵐ/);
  await page.getByTestId('second-map').waitFor();
  await shot(page, WIDE, 'seeing-lines');
  expect(await violations(page)).toEqual([]);
  expect(errors).toEqual([]);
  await context.close();
});

test('on a phone the parts of the look fit, and the slice is a tab of the sheet', async () => {
  const { page, context, errors } = await open(PHONE, '&cut=ring,120,0,1');
  await page.getByRole('tab', { name: 'Slice' }).click();
  await page.getByRole('img', { name: /around a ring/ }).waitFor();
  await page.waitForTimeout(500);
  await shot(page, PHONE, 'seeing-slice');
  for (const part of ['Colour', 'View', 'Smooth', 'Film', 'Lines']) {
    await page.getByRole('toolbar', { name: 'Map' }).getByRole('button').last().click();
    await page.getByRole('radio', { name: part, exact: true }).click();
    await page.waitForTimeout(150);
    await shot(page, PHONE, `seeing-${part.toLowerCase()}`);
    const wide = (await page.evaluate('document.documentElement.scrollWidth')) as number;
    expect(wide).toBeLessThanOrEqual(390);
    expect(await violations(page)).toEqual([]);
    await page.getByRole('button', { name: 'Close the look of the map' }).click();
  }
  expect(errors).toEqual([]);
  await context.close();
});
