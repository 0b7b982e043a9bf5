/** An image of the same sky is added where contours are chosen, drawn, taken out and put back; a refusal says why. */
import type { Page } from 'playwright-core';
import { newRegion, readyCube } from '../api/fixture';
import { cubeFile } from '../api/cubeFile';
import type { SignedIn } from '../api/harness';
import { imageFile } from '../api/skyImageFile';
import { openStage, violations, WIDE, type Stage } from './browser';

jest.setTimeout(180_000);
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

/** A round cloud in the middle of the image, which is the middle of the cube. */
const cloud = imageFile({}, (x, y) => 10 - Math.hypot(x - 19.5, y - 14.5));

async function choose(page: Page, name: string, buffer: Buffer) {
  const chooser = page.waitForEvent('filechooser');
  await page.getByRole('button', { name: 'Add an image' }).click();
  await (await chooser).setFiles({ name, mimeType: 'application/fits', buffer });
}
const images = async () =>
  (await lead.get(`/regions/${regionId}/images`)).body.items.map((i: { name: string }) => i.name);

test('from the file button to contours, out again, and back', async () => {
  const { page, context, errors } = await stage.open(WIDE, 'lena');
  await page.goto(`/cubes/${cubeId}?ch=16`);
  await page.getByTestId('map').first().waitFor();
  await page.keyboard.press('w');
  await page.getByRole('radio', { name: 'Lines', exact: true }).click();
  await choose(page, 'halpha.fits', cloud);
  await page.getByText(/^At .* Rayleigh$/).waitFor();
  expect(await images()).toEqual(['halpha']);
  await page.waitForURL((url) => /^[0-9a-f-]{36},image,5$/.test(url.searchParams.get('contours') ?? ''));
  expect(await violations(page)).toEqual([]);

  await page.getByRole('button', { name: 'Take the image out' }).click();
  await page.getByText('halpha was taken out of the region.').waitFor();
  expect(await images()).toEqual([]);
  await page.getByRole('button', { name: 'Undo', exact: true }).last().click();
  await page.getByText(/^At .* Rayleigh$/).waitFor();
  expect(await images()).toEqual(['halpha']);
  expect(errors).toEqual([]);

  await choose(page, 'cube.fits', cubeFile({ nx: 8, ny: 8, channels: 4 }));
  await page.getByText(/This is a cube: its spectral axis \(axis 3\) has 4 channels/).waitFor();
  expect(await images()).toEqual(['halpha']);
  await context.close();
});
