/** A whole shell marked by hand gives the shell that is there; marks made without a line, or beside another person, are all kept. */
import { marksOnRing, SHELL } from '../api/cubeFile';
import { finishedFit, newRegion, readyCube } from '../api/fixture';
import { until, type SignedIn } from '../api/harness';
import { seededRandom } from '@/shared/random';
import { openStage, shot, violations, type Stage } from './browser';
import { click, goToChannel, openShell, painted, readingOf, take, drag, WIDE } from './markingHands';

jest.setTimeout(240_000);
let stage: Stage;
let lead: SignedIn;
let field: { regionId: string; cubeId: string };
beforeAll(async () => {
  stage = await openStage();
  lead = await stage.product.signIn('lena');
  const regionId = await newRegion(lead);
  field = { regionId, cubeId: await readyCube(stage.product, lead, regionId) };
});
afterAll(() => stage.close());

interface Parameter {
  value: number;
  se: number;
}

test('eight marks on each of eight channels, by hand, give the shell that is there within its errors', async () => {
  const { page, context, shellId, errors } = await openShell(stage, lead, field, { channel: 8 });
  const random = seededRandom(5);
  const shaky = (at: { x: number; y: number }) => ({
    x: at.x + 0.35 * random.normal(),
    y: at.y + 0.35 * random.normal(),
  });
  const began = Date.now();
  for (const channel of [8, 10, 12, 15]) {
    await goToChannel(page, channel);
    for (const mark of marksOnRing(channel)) await click(page, shaky(mark));
  }
  for (const channel of [17, 20, 22, 24]) {
    await goToChannel(page, channel);
    await take(page, 'Ring');
    await drag(page, shaky(SHELL), shaky(marksOnRing(channel)[1]!));
    await page.getByRole('button', { name: 'Place marks' }).click();
  }
  expect(Date.now() - began).toBeLessThan(180_000);
  const { marks } = await until(
    () => readingOf(lead, shellId),
    (r) => r.marks.length === 64,
  );
  expect(new Set(marks.map((m) => m.channel)).size).toBe(8);
  await page.getByText(/^Mark next: channel \d+ \(v = /).waitFor();
  expect(await page.getByTestId('strip').getAttribute('aria-valuetext')).toContain('8 marks');
  await shot(page, WIDE, 'marking-whole');
  expect(await violations(page)).toEqual([]);

  const { id } = (await lead.get(`/shells/${shellId}/readings/mine`)).body;
  const fitId = await finishedFit(lead, shellId, id, { options: { bootstrap: 0 } });
  const p = (await lead.get(`/fits/${fitId}`)).body.parameters as Record<string, Parameter>;
  // the centre of the cube is (120, 0) at the pixel (31.5, 29.5) of 0.05 degrees
  const truth = { l: 119.975, b: 0.025, theta: SHELL.theta, vSys: SHELL.vSys, vExp: SHELL.vExp };
  for (const [name, value] of Object.entries(truth)) {
    expect(p[name]!.se).toBeGreaterThan(0);
    expect(Math.abs(p[name]!.value - value) / p[name]!.se).toBeLessThan(3);
  }
  expect(p.vExp!.se).toBeLessThan(1);
  expect(errors).toEqual([]);
  await context.close();
});

test('without a line nothing is lost: marks, moves and undo wait, through a closed page, and are sent when it is back', async () => {
  const { page, context, shellId } = await openShell(stage, lead, field);
  await click(page, { x: 20, y: 40 });
  await until(
    () => readingOf(lead, shellId),
    (r) => r.marks.length === 1,
  );
  await context.setOffline(true);
  for (const x of [24, 30, 36]) await click(page, { x, y: 20 });
  await drag(page, { x: 36, y: 20 }, { x: 40, y: 24 });
  await page.keyboard.press('u');
  await click(page, { x: 50, y: 50 });
  await page.keyboard.press('z');
  await page
    .getByTestId('save-state')
    .getByText(/^offline: \d+ waiting$/)
    .waitFor();
  await shot(page, WIDE, 'marking-offline');
  expect((await readingOf(lead, shellId)).marks).toHaveLength(1);
  const address = page.url();
  // while a page closes, the browser gives it the line back for a moment
  await page.evaluate(`window.fetch = () => Promise.reject(new TypeError('no line'))`);
  await page.close();

  // back, but the first attempts to save still fail
  await context.setOffline(false);
  await context.route('**/readings/mine', (route) =>
    route.request().method() === 'PUT' ? route.abort() : route.continue(),
  );
  const again = await context.newPage();
  await again.goto(address);
  await again
    .getByTestId('save-state')
    .getByText(/^offline: 3 waiting$/)
    .waitFor();
  await context.unroute('**/readings/mine');
  await again.evaluate(`window.dispatchEvent(new Event('online'))`);
  const { marks } = await until(
    () => readingOf(lead, shellId),
    (r) => r.marks.length === 4,
  );
  const moved = marks[3]!;
  expect(Math.hypot(moved.x - 40, moved.y - 24)).toBeLessThan(0.2);
  expect(moved.unsure).toBe(true);
  await again.getByTestId('save-state').getByText(/saved/).waitFor();
  await again.getByRole('button', { name: 'Redo', exact: true }).click(); // what was undone before the page was closed
  await until(
    () => readingOf(lead, shellId),
    (r) => r.marks.some((m) => Math.hypot(m.x - 50, m.y - 50) < 0.2),
  );
  await context.close();
});

test('two people mark the same shell at once: each has a reading of their own, and sees only that', async () => {
  const nils = await stage.product.signIn('nils');
  await lead.post('/members', { login: 'nils', role: 'analyst' }).expect(201);
  const one = await openShell(stage, lead, field);
  const two = await openShell(stage, lead, field, { login: 'nils', shell: one.shellId });
  const ring = marksOnRing(16, 7);
  for (let i = 0; i < 3; i++) {
    await Promise.all([click(one.page, ring[i]!), click(two.page, ring[i + 3]!)]);
  }
  await click(two.page, ring[6]!);
  const mine = await until(
    () => readingOf(lead, one.shellId),
    (r) => r.marks.length === 3,
  );
  const theirs = await until(
    () => readingOf(nils, one.shellId),
    (r) => r.marks.length === 4,
  );
  const ids = new Set(mine.marks.map((m) => m.id));
  expect(theirs.marks.some((m) => ids.has(m.id))).toBe(false);
  for (const [{ page }, count] of [
    [one, 3],
    [two, 4],
  ] as const) {
    await page.getByTestId('save-state').getByText(/saved/).waitFor();
    await page.reload();
    await painted(page);
    const list = page.getByRole('list', { name: /^Marks at/ });
    await list.waitFor();
    expect(await list.getByRole('listitem').count()).toBe(count);
    expect(await page.getByText('Your marks were saved elsewhere meanwhile').count()).toBe(0);
  }
  await one.context.close();
  await two.context.close();
});
