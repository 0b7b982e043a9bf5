/** What a cube's own page says, what the team says over its header, and the maps of all its channels. */
import { readFileSync } from 'node:fs';
import { join } from 'node:path';
import type { Page } from 'playwright-core';
import { makeFixture, newRegion, newShell, readyCube } from '../api/fixture';
import { until, type SignedIn } from '../api/harness';
import { upload } from '../api/uploading';
import { openStage, PHONE, shot, violations, WIDE, type Screen, type Stage } from './browser';

jest.setTimeout(60_000);
let stage: Stage;
let lead: SignedIn;
let regionId: string;
let cubeId: string;
let otherId: string;
beforeAll(async () => {
  stage = await openStage();
  lead = await stage.product.signIn('lena');
  regionId = await newRegion(lead);
  cubeId = await readyCube(stage.product, lead, regionId);
  otherId = await readyCube(stage.product, lead, regionId);
});
afterAll(() => stage.close());

describe.each([PHONE, WIDE])('on a $name screen', (screen: Screen) => {
  test('says the axes in words, finds cards, leads to channels and to cubes of the same sky', async () => {
    const { page, context, errors } = await stage.open(screen, 'lena');
    await page.goto(`/cubes/${cubeId}`);
    await page.getByRole('link', { name: 'About this cube' }).click();
    await page.waitForURL(/\/about$/);
    const text = (name: string) => page.getByText(name, { exact: true }).first();
    for (const fact of [
      '64 × 60',
      '0.05° (3′)',
      'plate carrée (CAR)',
      '9′',
      '−56.0 … −25.0 km/s',
      '1420.405752 MHz',
    ])
      await text(fact).waitFor();
    await shot(page, screen, 'about');
    expect(await violations(page)).toEqual([]);

    const cards = page.getByRole('table', { name: 'Header cards' }).getByRole('row');
    await cards.first().waitFor();
    await page.getByLabel('Search the cards').fill('bmaj');
    await page.getByText(/^1 of \d+ cards$/).waitFor();
    expect(await cards.count()).toBe(2); // the head of the table, and the card
    await page.getByLabel('Search the cards').fill('nowhere');
    await page.getByRole('button', { name: 'Show all cards' }).click();
    await page.getByText(/^\d+ cards$/).waitFor();

    const channels = page.getByRole('list', { name: 'Channels by velocity' });
    expect(await channels.getByRole('listitem').count()).toBe(32);
    expect(
      await page
        .getByRole('list', { name: /same sky/ })
        .getByRole('link')
        .getAttribute('href'),
    ).toBe(`/cubes/${otherId}`);
    await channels.getByRole('link', { name: 'Channel 11, −46.0 km/s' }).click();
    await page.getByTestId('map').waitFor();
    await page.getByRole('slider', { name: 'Channel' }).waitFor();
    expect(await page.getByRole('slider', { name: 'Channel' }).getAttribute('aria-valuetext')).toContain(
      '−46.0 km/s, channel 11 of 32',
    );
    expect(errors).toEqual([]);
    await context.close();
  });

  test('what is corrected is shown with who said it, and can be taken back', async () => {
    const { page, context } = await stage.open(screen, 'lena');
    await page.goto(`/cubes/${cubeId}/about`);
    await page.getByRole('button', { name: 'Correct the header' }).click();
    await page.getByLabel('Beam, longer, ′').fill('x');
    await page.getByRole('button', { name: 'Save' }).click();
    await page.getByText('The longer width in minutes of arc.').waitFor();
    expect(await violations(page)).toEqual([]);
    await page.getByLabel('Beam, longer, ′').fill('12');
    await page.getByLabel('Brightness unit').selectOption('Jy/beam');
    await page.getByRole('button', { name: 'Save' }).click();
    const said = page.getByRole('list', { name: 'Said by the team' });
    await said.waitFor();
    expect(await said.innerText()).toMatch(/Jy\/beam[\s\S]*12′/);
    await page
      .getByText(/^lena, \d+ \w+ \d{4}/i)
      .first()
      .waitFor();
    await shot(page, screen, 'about-corrected');
    expect(await violations(page)).toEqual([]);
    for (const what of ['unit', 'beam'])
      await page.getByRole('button', { name: `Take back: ${what}` }).click();
    await page.getByText('Everything is as the header says.', { exact: false }).waitFor();
    expect((await lead.get(`/cubes/${cubeId}`)).body.axes).toMatchObject({
      unit: 'K',
      beam: { major: 0.15 },
    });
    await context.close();
  });

  test('shows the maps of all channels, marks nothing on them, and goes back to channels', async () => {
    const shellId = await newShell(lead, regionId);
    const { page, context, errors } = await stage.open(screen, 'lena');
    await page.goto(`/cubes/${cubeId}?shell=${shellId}&map=total&ch=10`);
    const map = page.getByTestId('map');
    await map.waitFor();
    await paintedAfter(page, 0);
    expect(await map.getAttribute('aria-label')).toBe('Total-intensity map, all 32 channels together.');
    await page.getByText('Marks go on channels.').waitFor();
    expect(await page.getByRole('button', { name: 'Mark', exact: true }).isDisabled()).toBe(true);
    const box = (await map.boundingBox())!;
    await page.mouse.click(box.x + box.width / 2, box.y + box.height * 0.7);
    await page.keyboard.press('w');
    const part = (name: string) => page.getByRole('radio', { name, exact: true }).click();
    await part('View');
    for (const name of ['Peak', 'Velocity', 'Dispersion']) {
      const before = await mapsPainted(page);
      await page.getByRole('radio', { name }).click();
      await page.waitForURL(new RegExp(`map=${name.toLowerCase()}`));
      await paintedAfter(page, before);
    }
    await page.getByRole('radio', { name: 'Velocity' }).click();
    await part('Colour');
    expect(await page.getByRole('radio', { name: 'Parting' }).getAttribute('aria-checked')).toBe('true');
    await shot(page, screen, 'velocity-map');
    expect(await violations(page)).toEqual([]);
    await page.getByRole('button', { name: 'Close the look of the map' }).click();
    await page.getByRole('slider', { name: 'Channel' }).focus();
    await page.keyboard.press('ArrowRight');
    await page.waitForURL((url) => url.searchParams.get('ch') === '11' && !url.searchParams.has('map'));
    expect(await map.getAttribute('aria-label')).toContain('Channel map at −45.0 kilometres per second');
    expect((await lead.get(`/shells/${shellId}/readings/mine`)).body.marks).toEqual([]);
    expect(errors).toEqual([]);
    await context.close();
  });
});

/** How often a map, rather than a channel, has been painted; the page itself keeps count. */
const mapsPainted = (page: Page): Promise<number> =>
  page.evaluate(
    `performance.getEntriesByName('outswell:channel-painted').filter((e) => e.detail.channel === -1).length`,
  );
const paintedAfter = (page: Page, before: number) =>
  until(
    () => mapsPainted(page),
    (times) => times > before,
  );

test('each tab of the phone’s sheet begins at its top', async () => {
  const { shellId, cubeId: fitted } = await makeFixture(stage.product, lead);
  const { page, context } = await stage.open({ ...PHONE, height: 640 }, 'lena');
  await page.goto(`/cubes/${fitted}?shell=${shellId}`);
  await page.getByRole('tab', { name: 'Fit' }).click();
  const panel = page.getByRole('tabpanel').locator('> div');
  const scrolled = await until(
    () =>
      panel.evaluate((scroller) => {
        scroller.scrollTop = 10_000;
        return scroller.scrollTop;
      }),
    (top) => top > 0,
  );
  expect(scrolled).toBeGreaterThan(0);
  await page.getByRole('tab', { name: 'Results' }).click();
  await page.getByRole('heading', { name: 'Fit of record' }).waitFor();
  expect(await panel.evaluate((scroller) => scroller.scrollTop)).toBe(0);
  await context.close();
});

test('another image of the file is read when it is chosen', async () => {
  const bytes = readFileSync(join(__dirname, '..', 'reference', 'fits-corpus', 'two-cubes.fits'));
  const sent = await upload(lead, stage.product.url, regionId, bytes, { filename: 'two-cubes.fits' });
  const cube = async () => (await lead.get(`/cubes/${sent.cubeId}`)).body;
  const first = await until(cube, ({ status }) => status === 'ready');
  const { page, context } = await stage.open(PHONE, 'lena');
  await page.goto(`/cubes/${sent.cubeId}/about`);
  const choice = page.getByLabel('Image', { exact: true });
  expect(await choice.inputValue()).toBe('1');
  await choice.selectOption('2');
  const strip = page.waitForRequest((r) => r.url().includes(`/cubes/${sent.cubeId}/strip`));
  await page.getByRole('button', { name: 'Read it from there' }).click();
  const second = await until(cube, ({ status, source }) => status === 'ready' && source.hdu === 2);
  expect((await strip).url()).toContain(`v=${Date.parse(second.readyAt)}`);
  expect(second.readyAt).not.toBe(first.readyAt);
  await page.getByRole('button', { name: 'Read it from there', disabled: true }).waitFor();
  expect(await choice.inputValue()).toBe('2');
  expect(await violations(page)).toEqual([]);
  await context.close();
});

test('who only reads sees what is said and cannot change it', async () => {
  await stage.product.signIn('ruben');
  await lead.post('/members', { login: 'ruben', role: 'reader' }).expect(201);
  const { page, context } = await stage.open(WIDE, 'ruben');
  await page.goto(`/cubes/${cubeId}/about`);
  await page.getByText('Everything is as the header says.', { exact: false }).waitFor();
  expect(await page.getByRole('button', { name: 'Correct the header' }).count()).toBe(0);
  await context.close();
});
