/** The guide is offered once, walks over the real controls, and can be had again. */
import { newRegion, readyCube } from '../api/fixture';
import { openStage, PHONE, shot, violations, WIDE, type Screen, type Stage } from './browser';

jest.setTimeout(120_000);
let stage: Stage;
beforeAll(async () => {
  stage = await openStage();
  const lead = await stage.product.signIn('lena');
  await readyCube(stage.product, lead, await newRegion(lead));
}, 120_000);
afterAll(() => stage.close());

test.each<[string, Screen]>([
  ['phone', PHONE],
  ['wide', WIDE],
])('five cards on a %s screen, offered once', async (_, screen) => {
  const { page, context, errors } = await stage.open({ ...screen, guide: true }, 'lena');
  await page.goto('/regions');
  const offer = page.getByRole('region', { name: 'Guide' });
  await offer.waitFor();
  expect(await violations(page)).toEqual([]);
  await shot(page, screen, 'guide-offer');
  await offer.getByRole('button', { name: 'Show me around' }).click();
  await page.waitForURL(/\/cubes\//);
  for (let card = 1; card <= 5; card++) {
    const dialog = page.getByRole('dialog', { name: new RegExp(`card ${card} of 5`) });
    await dialog.waitFor();
    if (card <= 2) await page.getByTestId(card === 1 ? 'strip' : 'map').waitFor();
    await page.waitForTimeout(400); // the card looks for its control
    const box = (await dialog.boundingBox())!;
    expect(box.x).toBeGreaterThanOrEqual(0);
    expect(box.y).toBeGreaterThanOrEqual(0);
    expect(box.x + box.width).toBeLessThanOrEqual(screen.width);
    expect(box.y + box.height).toBeLessThanOrEqual(screen.height);
    await shot(page, screen, `guide-${card}`);
    await dialog.getByRole('button', { name: card < 5 ? 'Next' : 'Done' }).click();
  }
  await page.getByRole('dialog').waitFor({ state: 'detached' });
  await page.reload();
  await page.getByTestId('map').waitFor();
  expect(await offer.count()).toBe(0);
  expect(errors).toEqual([]);
  await context.close();
});

test('who refuses it is not asked again, and finds it under the keys; Escape leaves it', async () => {
  const { page, context } = await stage.open({ ...WIDE, guide: true }, 'lena');
  await page.goto('/regions');
  await page.getByRole('button', { name: 'No, thanks' }).click();
  await page.reload();
  await page.getByRole('heading', { name: 'Regions' }).waitFor();
  expect(await page.getByRole('region', { name: 'Guide' }).count()).toBe(0);
  await page.keyboard.press('?');
  await page.getByRole('dialog', { name: 'Keys' }).getByRole('button', { name: 'Show me around' }).click();
  await page.getByRole('dialog', { name: /card 1 of 5/ }).waitFor();
  await page.keyboard.press('Escape');
  await page.getByRole('dialog').waitFor({ state: 'detached' });
  await context.close();
});
