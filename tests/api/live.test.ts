import { freshCube, leadOfAnotherTeam, newRegion } from './fixture';
import { startProduct, until, type Product } from './harness';
import { listen } from './listening';
import { upload } from './uploading';

let product: Product;
beforeAll(async () => {
  product = await startProduct();
});
afterAll(() => product.stop());

test('progress of a cube reaches the pages of its team and of nobody else', async () => {
  const lead = await product.signIn('lena');
  const olga = await leadOfAnotherTeam(product);
  const mine = listen(product, lead);
  const theirs = listen(product, olga);
  expect(await mine.open).toBe(200);
  expect(await theirs.open).toBe(200);
  const regionId = await newRegion(lead);
  const { cubeId } = await upload(lead, product.url, regionId, freshCube());
  await product.startWorker();
  const ofCube = () =>
    mine.events.filter((e) => e.subject === 'cube' && e.id === cubeId).map((e) => e.status);
  await until(
    async () => ofCube(),
    (seen) => seen.includes('ready'),
  );
  expect(ofCube()[0]).toBe('uploaded');
  expect(ofCube()).toContain('ingesting');
  expect(mine.events.some((e) => e.subject === 'upload')).toBe(true);
  expect(theirs.events).toEqual([]);
  mine.close();
  theirs.close();
});
