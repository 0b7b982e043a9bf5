import { request } from 'node:http';
import type { LiveEvent } from '@/shared/contract/events';
import { freshCube, leadOfAnotherTeam, newRegion } from './fixture';
import { startProduct, until, type Product, type SignedIn } from './harness';
import { cookieOf, upload } from './uploading';

let product: Product;
beforeAll(async () => {
  product = await startProduct();
});
afterAll(() => product.stop());

function listen(who: SignedIn): { events: LiveEvent[]; close: () => void; open: Promise<number> } {
  const events: LiveEvent[] = [];
  const call = request(`${product.url}/api/v1/events`, { headers: { Cookie: cookieOf(who, product.url) } });
  const open = new Promise<number>((resolve) => {
    call.on('response', (res) => {
      resolve(res.statusCode!);
      res.setEncoding('utf8').on('data', (text: string) => {
        for (const [, json] of text.matchAll(/^data: (.*)$/gm)) events.push(JSON.parse(json!));
      });
    });
  });
  call.on('error', () => undefined).end();
  return { events, open, close: () => call.destroy() };
}

test('progress of a cube reaches the pages of its team and of nobody else', async () => {
  const lead = await product.signIn('lena');
  const olga = await leadOfAnotherTeam(product);
  const mine = listen(lead);
  const theirs = listen(olga);
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
