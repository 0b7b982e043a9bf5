/** The whole job by hand, in Chromium, on a phone and on a wide screen: from sign-in to a compared shell. */
import { mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import type { Page } from 'playwright-core';
import { cubeFile, marksOnRing, SHELL } from '../api/cubeFile';
import { saveMarks } from '../api/fixture';
import { until } from '../api/harness';
import { api, openStage, PHONE, shot, signIn, violations, WIDE, type Screen, type Stage } from './browser';

const NX = 64;
const NY = 60;
jest.setTimeout(60_000); // another process may have the machine at the same time
let stage: Stage;
const folder = mkdtempSync(join(tmpdir(), 'outswell-cubes-'));
beforeAll(async () => {
  stage = await openStage();
}, 60_000);
afterAll(async () => {
  await stage.close();
  rmSync(folder, { recursive: true, force: true });
});

/** Where an image pixel is on the page, when the whole image is shown. */
async function onScreen(page: Page, x: number, y: number) {
  const box = (await page.getByTestId('map').boundingBox())!;
  const scale = Math.min(box.width / NX, box.height / NY);
  return {
    x: box.x + box.width / 2 + (x - (NX - 1) / 2) * scale,
    y: box.y + box.height / 2 - (y - (NY - 1) / 2) * scale,
  };
}

async function goToChannel(page: Page, channel: number) {
  const slider = page.getByRole('slider', { name: 'Channel' });
  await slider.focus();
  const at = () => slider.getAttribute('aria-valuetext');
  const number = (text: string | null) => Number(/channel (\d+) of/.exec(text ?? '')![1]);
  while (number(await at()) !== channel + 1)
    await page.keyboard.press(number(await at()) < channel + 1 ? 'ArrowRight' : 'ArrowLeft');
}

describe.each([PHONE, WIDE])('on a $name screen', (screen: Screen) => {
  const login = `lena-${screen.name}`;
  let page: Page;
  let errors: string[];
  let regionId: string;
  const cleanHere = async (name: string) => {
    await shot(page, screen, name);
    expect(await violations(page)).toEqual([]);
  };

  beforeAll(async () => {
    ({ page, errors } = await stage.open(screen));
  });
  afterAll(async () => {
    await page.context().close();
  });

  test('1. signs in, and the first person leads a team', async () => {
    await page.goto('/sign-in');
    await page
      .getByText(/Sign in/)
      .first()
      .waitFor();
    await cleanHere('01-sign-in');
    await signIn(page, login);
    if (screen.name !== PHONE.name) {
      // the second of our two people is taken into the team by the first
      const lead = await stage.product.signIn(`lena-${PHONE.name}`);
      await lead.post('/members', { login, role: 'lead' }).expect(201);
      await page.reload();
    }
    await page.getByRole('heading', { name: 'Regions' }).waitFor();
    await cleanHere('02-regions');
  });

  test('2. makes a region', async () => {
    await page.getByRole('button', { name: 'New region' }).first().click();
    await page.getByRole('textbox', { name: 'Name' }).fill(`Still Water ${screen.name}`);
    await page.getByLabel('Distance').first().fill('2000');
    await cleanHere('03-new-region');
    await page.getByRole('button', { name: 'Make region' }).click();
    await page.waitForURL(/regions\/[0-9a-f-]{36}/);
    regionId = /regions\/([0-9a-f-]{36})/.exec(page.url())![1]!;
  });

  test('3. and 4. uploads a cube and sees it read; a file that is none is refused beside its name', async () => {
    const good = join(folder, `still water ${screen.name}.fits`);
    writeFileSync(good, cubeFile({ nx: NX, ny: NY, channels: 32, cards: { OBJECT: screen.name } }));
    const bad = join(folder, 'notes.fits');
    writeFileSync(bad, 'These are notes and no cube.\n'.repeat(500));
    const chooser = page.waitForEvent('filechooser');
    await page
      .getByRole('button', { name: /^Upload/ })
      .first()
      .click();
    await (await chooser).setFiles([good, bad]);
    await page
      .getByText(/A FITS file begins with/)
      .first()
      .waitFor();
    await shot(page, screen, '04-upload');
    await page
      .getByRole('link', { name: new RegExp(`still water ${screen.name}`) })
      .first()
      .waitFor();
    const ready = async () =>
      (await api<{ items: { status: string }[] }>(page, `/regions/${regionId}/cubes`)).items.map(
        (c) => c.status,
      );
    while ((await ready()).some((s) => s !== 'ready')) await page.waitForTimeout(100);
    expect(await ready()).toEqual(['ready']);
    await cleanHere('05-region');
  });

  test('5. looks at the channel map, and the address reopens the same place', async () => {
    await page
      .getByRole('link', { name: new RegExp(`still water ${screen.name}`) })
      .first()
      .click();
    await page.getByTestId('map').waitFor();
    await goToChannel(page, 16);
    await until(
      async () => (() => new URL(page.url()).searchParams.get('ch'))(),
      (seen) => seen === '16',
    );
    await cleanHere('06-cube');
    await page.reload();
    const slider = page.getByRole('slider', { name: 'Channel' });
    await slider.waitFor();
    expect(await slider.getAttribute('aria-valuetext')).toMatch(/40\.0 km\/s, channel 17 of 32/);
  });

  test('6. and 7. names a shell, marks its rim on five channels, and sees the live fit', async () => {
    if (screen.touch)
      await page
        .getByRole('tab', { name: 'Marks' })
        .click()
        .catch(() => undefined);
    await page
      .getByRole('button', { name: /New shell|Name a new shell/ })
      .first()
      .click();
    await page.getByRole('textbox', { name: 'Name' }).fill(`Ring of ${screen.name}`);
    await page.getByRole('button', { name: 'Name shell' }).click();
    await until(
      async () => (() => new URL(page.url()).searchParams.get('shell'))(),
      (seen) => /^[0-9a-f-]{36}$/.test(seen ?? ''),
    );
    const mark = page.getByRole('button', { name: 'Mark', exact: true });
    if ((await mark.getAttribute('aria-pressed')) !== 'true') await mark.click();
    for (const channel of [11, 14, 16, 19, 22]) {
      await goToChannel(page, channel);
      for (const { x, y } of marksOnRing(channel, 6)) {
        const at = await onScreen(page, x, y);
        if (screen.touch) await page.touchscreen.tap(at.x, at.y);
        else await page.mouse.click(at.x, at.y);
      }
    }
    const shellId = new URL(page.url()).searchParams.get('shell')!;
    const reading = () =>
      api<{ marks: { channel: number; x: number; y: number }[] }>(page, `/shells/${shellId}/readings/mine`);
    await until(
      async () => (async () => (await reading()).marks.length)(),
      (seen) => seen === 30,
    );
    const first = (await reading()).marks[0]!;
    const meant = marksOnRing(11, 6)[0]!;
    expect(Math.hypot(first.x - meant.x, first.y - meant.y)).toBeLessThan(0.5);
    await page.keyboard.press('Control+z');
    await until(
      async () => (async () => (await reading()).marks.length)(),
      (seen) => seen === 29,
    );
    await page.keyboard.press('Control+Shift+z');
    await until(
      async () => (async () => (await reading()).marks.length)(),
      (seen) => seen === 30,
    );
    if (screen.touch) await page.getByRole('tab', { name: 'Fit' }).click();
    await page.getByText('Radius Θ').first().waitFor();
    await cleanHere('07-marking');
    await page.reload();
    await page.getByTestId('map').waitFor();
    expect((await reading()).marks).toHaveLength(30);
  });

  test('8. runs the fit of record, reads it, and adopts it', async () => {
    if (screen.touch) await page.getByRole('tab', { name: 'Fit' }).click();
    await page.getByRole('button', { name: 'Run the fit of record' }).first().click();
    if (screen.touch) await page.getByRole('tab', { name: 'Results' }).click();
    await page
      .getByRole('button', { name: /^Adopt/ })
      .first()
      .click();
    const shellId = new URL(page.url()).searchParams.get('shell')!;
    type Row = { designation: string; adopted: { theta: { value: number }; vExp: { value: number } } | null };
    const shell = () => api<Row>(page, `/shells/${shellId}`);
    await until(
      async () => (async () => (await shell()).adopted !== null)(),
      (seen) => seen === true,
    );
    const { adopted, designation } = await shell();
    expect(adopted!.theta.value).toBeCloseTo(SHELL.theta, 1);
    expect(adopted!.vExp.value).toBeGreaterThan(SHELL.vExp * 0.9);
    await cleanHere('08-fit');
    await page.goto(`/shells/${shellId}`);
    await page.getByText(designation).first().waitFor();
    await page.getByText(/χ²/).first().waitFor();
    await cleanHere('09-shell');
  });

  test('9. and 10. finds it in the catalogue, compares it with another, and downloads the table', async () => {
    const other = await stage.product.signIn(login);
    const shells = `/regions/${regionId}/shells`;
    const { id } = (await other.post(shells, { name: `Second of ${screen.name}` }).expect(201)).body;
    const { items } = (await other.get(`/regions/${regionId}/cubes`)).body;
    const marks = [10, 13, 16, 20, 22].flatMap((k) => marksOnRing(k));
    const readingId = await saveMarks(other, id, items[0].id, marks);
    const fit = (await other.post(`/shells/${id}/fits`, { readingId }).expect(202)).body;
    await until(
      async () => (async () => (await other.get(`/fits/${fit.id}`)).body.status)(),
      (seen) => seen === 'done',
    );
    await other.patch(`/shells/${id}`, { adoptedFitId: fit.id }).expect(200);

    await page.goto('/catalogue');
    await page.getByText(`Ring of ${screen.name}`).first().waitFor();
    await page.waitForTimeout(600); // the chart comes in a piece of its own
    await cleanHere('10-catalogue');
    for (const name of [`Ring of ${screen.name}`, `Second of ${screen.name}`])
      await page.getByRole('checkbox', { name: `Compare ${name}` }).click();
    const download = page.waitForEvent('download');
    await page
      .getByRole('link', { name: 'Download CSV' })
      .or(page.getByRole('button', { name: 'Download CSV' }))
      .click();
    expect((await download).suggestedFilename()).toMatch(/\.csv$/);
    await page
      .getByRole('button', { name: 'Compare', exact: true })
      .or(page.getByRole('link', { name: 'Compare', exact: true }))
      .click();
    await page.waitForURL(/compare/);
    await page.getByText(`Second of ${screen.name}`).first().waitFor();
    await cleanHere('11-compare');
    for (const path of ['/shells', '/inbox', '/you', '/nothing-here']) {
      await page.goto(path);
      await page.waitForTimeout(500);
      await cleanHere(`12${path.replace('/', '-')}`);
    }
    expect(errors).toEqual([]);
  });
});
