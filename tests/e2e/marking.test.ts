/** Marks are what a person made: by hand or keyboard, without a line to the server, and when two pages disagree. */
import type { Page } from 'playwright-core';
import { marksOnRing } from '../api/cubeFile';
import { newRegion, newShell, readyCube, saveMarks } from '../api/fixture';
import { until, type SignedIn } from '../api/harness';
import { openStage, violations, WIDE, type Stage } from './browser';

jest.setTimeout(60_000);
let stage: Stage;
let lead: SignedIn;
let regionId: string;
let cubeId: string;
beforeAll(async () => {
  stage = await openStage();
  lead = await stage.product.signIn('lena');
  regionId = await newRegion(lead);
  cubeId = await readyCube(stage.product, lead, regionId);
});
afterAll(() => stage.close());

interface Marked {
  marks: { channel: number; x: number; y: number }[];
  revision: number;
}
const reading = async (shellId: string) =>
  (await lead.get(`/shells/${shellId}/readings/mine`)).body as Marked;

/** `deaf`: the page does not hear of changes made elsewhere. */
async function openShell(login = 'lena', deaf = false) {
  const shellId = await newShell(lead, regionId);
  const { page, context } = await stage.open(WIDE, login);
  if (deaf) await page.route('**/api/v1/events', (route) => route.abort());
  await page.goto(`/cubes/${cubeId}?shell=${shellId}&ch=16`);
  await page.getByTestId('map').waitFor();
  await page.getByText('km/s').first().waitFor();
  return { page, context, shellId };
}

async function markMode(page: Page) {
  const mark = page.getByRole('button', { name: 'Mark', exact: true });
  await mark.waitFor();
  if ((await mark.getAttribute('aria-pressed')) !== 'true') await mark.click();
}

const clickMap = (page: Page, dx: number, dy: number) => {
  const map = page.getByTestId('map');
  return map
    .boundingBox()
    .then((box) => page.mouse.click(box!.x + box!.width / 2 + dx, box!.y + box!.height / 2 + dy));
};

test('by the keyboard alone: crosshair, place, nudge, delete', async () => {
  const { page, context, shellId } = await openShell();
  await markMode(page);
  await page.getByTestId('map').focus();
  for (const key of ['ArrowUp', 'ArrowUp', 'Enter', 'ArrowRight', 'ArrowRight', 'ArrowRight', 'Enter'])
    await page.keyboard.press(key);
  const placed = await until(
    () => reading(shellId),
    (r) => r.marks.length === 2,
  );
  expect(placed.marks[1]!.x).toBeGreaterThan(placed.marks[0]!.x);
  await page
    .getByRole('list', { name: /^Marks at/ })
    .getByRole('button')
    .first()
    .focus();
  await page.keyboard.press('ArrowLeft');
  const nudged = await until(
    () => reading(shellId),
    (r) => r.marks.some((m) => m.x < placed.marks[0]!.x),
  );
  // a tenth of a beam of 0.15° on pixels of 0.05°
  expect(placed.marks[0]!.x - nudged.marks[0]!.x).toBeCloseTo(0.3, 2);
  await page.keyboard.press('Delete');
  await until(
    () => reading(shellId),
    (r) => r.marks.length === 1,
  );
  await context.close();
});

test('without a line marks wait, survive a reload, and are sent when it is back', async () => {
  const { page, context, shellId } = await openShell();
  await markMode(page);
  await page.route('**/readings/mine', (route) =>
    route.request().method() === 'PUT' ? route.abort() : route.continue(),
  );
  await clickMap(page, 60, 0);
  await clickMap(page, -60, 0);
  await page
    .getByTestId('save-state')
    .getByText(/offline|waiting/)
    .waitFor();
  expect((await reading(shellId)).marks).toHaveLength(0);
  await page.reload();
  await page.getByRole('list', { name: /^Marks at/ }).waitFor();
  expect(
    await page
      .getByRole('list', { name: /^Marks at/ })
      .getByRole('listitem')
      .count(),
  ).toBe(2);
  await page.unroute('**/readings/mine');
  await page.evaluate(`window.dispatchEvent(new Event('online'))`);
  await until(
    () => reading(shellId),
    (r) => r.marks.length === 2,
  );
  await page.getByTestId('save-state').getByText(/saved/).waitFor();
  await context.close();
});

test('when another page saved meanwhile, both sides are shown and both can be kept', async () => {
  const { page, context, shellId } = await openShell('lena', true);
  await markMode(page);
  await clickMap(page, 80, 0);
  await until(
    () => reading(shellId),
    (r) => r.marks.length === 1,
  );
  const elsewhere = marksOnRing(10, 3);
  const { marks } = await reading(shellId);
  await lead
    .put(`/shells/${shellId}/readings/mine`, { cubeId, marks: [...marks, ...elsewhere], revision: 1 })
    .expect(200);
  await clickMap(page, -80, 0);
  await page.getByText('Your marks were saved elsewhere meanwhile').waitFor();
  expect(await violations(page)).toEqual([]);
  expect((await reading(shellId)).marks).toHaveLength(4); // nothing was overwritten
  await page.getByRole('button', { name: 'Keep both' }).click();
  await until(
    () => reading(shellId),
    (r) => r.marks.length === 5,
  );
  await context.close();
});

test('marks that cannot make a shell are told where they are, and no fit is queued', async () => {
  const { page, context, shellId } = await openShell();
  const line = [10, 13, 16, 19].flatMap((k) =>
    [1, 2, 3].map((i) => ({ channel: k, x: 10 + 5 * i, y: 20 + 2 * i })),
  );
  await saveMarks(lead, shellId, cubeId, line);
  await page.reload();
  await page
    .getByText(/do not trace a ring|one straight line/)
    .first()
    .waitFor();
  expect(await page.getByRole('button', { name: 'Run the fit of record' }).isDisabled()).toBe(true);
  await saveMarks(lead, shellId, cubeId, marksOnRing(16, 12));
  await page.reload();
  await page
    .getByText(/channel/)
    .first()
    .waitFor();
  expect(await page.getByRole('button', { name: 'Run the fit of record' }).isDisabled()).toBe(true);
  await context.close();
});

test('a reader looks and cannot mark; a change by a colleague appears by itself', async () => {
  await stage.product.signIn('ruben');
  await lead.post('/members', { login: 'ruben', role: 'reader' }).expect(201);
  const { page, context, shellId } = await openShell('ruben');
  await page.getByText('looking only', { exact: true }).waitFor();
  expect(await page.getByRole('button', { name: 'Mark', exact: true }).count()).toBe(0);
  await clickMap(page, 60, 0);
  await lead.patch(`/shells/${shellId}`, { name: 'Named meanwhile' }).expect(200);
  await page.getByText('Named meanwhile').first().waitFor();
  expect(await violations(page)).toEqual([]);
  await context.close();
});
