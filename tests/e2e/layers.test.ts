/** What others marked, what was traced and other shells: drawn where they lie, and held back while a reading is made. */
import type { Page } from 'playwright-core';
import { destination } from '@/shared/sky/greatCircle';
import { modelRadius } from '@/shared/shell/channelCurve';
import { buildWcs, type Wcs } from '@/shared/sky/wcs';
import type { WcsSpec } from '@/shared/sky/wcsSpec';
import type { Trace } from '@/shared/contract/traces';
import { marksOnRing } from '../api/cubeFile';
import { finishedFit, makeFixture, newShell, saveMarks, type Fixture } from '../api/fixture';
import { until, type SignedIn } from '../api/harness';
import { openStage, shot, violations, WIDE, type Stage } from './browser';
import { centreOf, placed } from './canvasBack';
import { painted } from './markingHands';

jest.setTimeout(60_000);
const CHANNEL = 16;
const WHOLE = { zoom: 1, x: 31.5, y: 29.5 };
/** A sign weighs several times this; a coordinate line or the edge of a label that comes near, less than half of it. */
const DRAWN = 1000;
let stage: Stage;
let people: Record<'lead' | 'analyst' | 'reader', SignedIn>;
let made: Fixture;
let wcs: Wcs;
let channelWidth: number;
beforeAll(async () => {
  stage = await openStage();
  people = await stage.product.team();
  made = await makeFixture(stage.product, people.lead);
  await people.lead.patch(`/shells/${made.shellId}`, { adoptedFitId: made.fitId }).expect(200);
  const { axes } = (await people.lead.get(`/cubes/${made.cubeId}`)).body;
  wcs = buildWcs(axes.wcs as WcsSpec);
  channelWidth = axes.spectral.channelWidth;
}, 60_000);
afterAll(() => stage.close());

async function open(who: SignedIn, shellId: string) {
  const { page, context } = await stage.open(WIDE, who.login);
  const query = `shell=${shellId}&ch=${CHANNEL}&layers=traced,shells&marksof=${made.fitId}`;
  await page.goto(`/cubes/${made.cubeId}?${query}`);
  await painted(page);
  return { page, context };
}
/** The part of the look that has the layers. */
async function openLayers(page: Page) {
  await page.getByTestId('map').press('w');
  await page.getByRole('radio', { name: 'Lines', exact: true }).click();
}
const weightAt = async (page: Page, sky: { lon: number; lat: number }, reach = 4) => {
  const { at } = await placed(page, WHOLE);
  const [, , weight] = await centreOf(page, at(wcs.galacticToPixel(sky.lon, sky.lat)!), 'cold', reach);
  return weight;
};

test('a reader sees the marks that a fit froze and the traced rim where they lie', async () => {
  const { page, context } = await open(people.reader, made.shellId);
  await openLayers(page);
  const marks = page.getByRole('combobox', { name: 'Marks of a fit' });
  await marks.waitFor();
  expect(await marks.inputValue()).toBe(made.fitId);
  expect(await page.getByRole('checkbox', { name: 'Traced rim' }).isChecked()).toBe(true);
  await shot(page, WIDE, 'layers');
  expect(await violations(page)).toEqual([]);
  await page.keyboard.press('Escape');
  const { at, scale } = await placed(page, WHOLE);
  for (const mark of marksOnRing(CHANNEL)) {
    const [dx, dy] = await until(
      () => centreOf(page, at(mark), 'warm', 7),
      ([, , weight]) => weight > DRAWN,
    );
    expect(Math.hypot(dx, dy)).toBeLessThan(0.1 * scale);
  }
  const { outcome } = (await people.reader.get(`/traces/${made.traceId}`)).body as Trace;
  const found = outcome!.sectors.filter((s) => s.channel === CHANNEL && s.rejected === null);
  expect(found.length).toBeGreaterThan(20);
  let seen = 0;
  for (const { x, y } of found)
    if ((await centreOf(page, at({ x: x!, y: y! }), 'light', 6))[2] > DRAWN) seen++;
  expect(seen / found.length).toBeGreaterThan(0.9); // labels may lie over the others
  const [, , nothing] = await centreOf(page, at({ x: 32, y: 40 }), 'light', 6); // half way to the rim
  expect(nothing).toBeLessThan(DRAWN / 2);
  await context.close();
});

test('who marks sees neither before a fit of the own reading, whatever the address asks for', async () => {
  const { page, context } = await open(people.analyst, made.shellId);
  await openLayers(page);
  await page.getByText(/shown once a fit of your own marks is done/).waitFor();
  expect(await page.getByRole('combobox', { name: 'Marks of a fit' }).count()).toBe(0);
  expect(await page.getByRole('checkbox', { name: /Traced rim/ }).isDisabled()).toBe(true);
  await page.keyboard.press('Escape');
  const { at } = await placed(page, WHOLE);
  for (const mark of marksOnRing(CHANNEL))
    expect((await centreOf(page, at(mark), 'warm', 7))[2]).toBeLessThan(DRAWN / 2);

  const readingId = await saveMarks(people.analyst, made.shellId, made.cubeId);
  await finishedFit(people.analyst, made.shellId, readingId);
  await page.reload();
  await painted(page);
  await openLayers(page);
  await page.getByRole('combobox', { name: 'Marks of a fit' }).waitFor();
  await context.close();
});

test('the ring of another shell that is adopted is drawn, and not the shell at hand', async () => {
  const other = await newShell(people.lead, made.regionId);
  const fit = (await people.lead.get(`/fits/${made.fitId}`)).body;
  const { l, b, theta, vSys, vExp } = fit.parameters;
  const model = { theta: theta.value, vSys: vSys.value, vExp: vExp.value };
  const radius = modelRadius(wcs.velocityOf(CHANNEL), channelWidth, model)!;
  const around = (factor: number) =>
    Array.from({ length: 36 }, (_, i) =>
      destination({ lon: l.value, lat: b.value }, 10 * i + 3, factor * radius),
    );
  const { page, context } = await open(people.reader, other);
  const painted = async (factor: number) => {
    let count = 0;
    for (const place of around(factor)) if ((await weightAt(page, place)) > 50) count++;
    return count;
  };
  await until(
    () => painted(1),
    (count) => count > 30,
  );
  expect(await painted(0.8)).toBe(0);
  await page.getByTestId('map').press('w');
  await page.getByRole('radio', { name: 'Lines', exact: true }).click();
  await page.getByRole('checkbox', { name: 'Other shells' }).click();
  await until(
    () => painted(1),
    (count) => count === 0,
  );
  await context.close();
});
