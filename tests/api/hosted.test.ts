/** The hosted services that production uses, each played by a stand-in that speaks the real protocol. */
import { mkdtempSync, readdirSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { startMailbox, type Mailbox } from '@/server/fakes/mailbox';
import { startObjectStore } from '@/server/fakes/objectStore';
import { cubeFile } from './cubeFile';
import { freshCube, makeFixture, newRegion } from './fixture';
import { startProduct, until, type Product, type SignedIn } from './harness';
import { upload } from './uploading';

let product: Product;
let lead: SignedIn;
let mailbox: Mailbox;
let store: Awaited<ReturnType<typeof startObjectStore>>;
const directory = mkdtempSync(join(tmpdir(), 'outswell-objects-'));
beforeAll(async () => {
  store = await startObjectStore({ env: 'test', directory, bucket: 'cubes' });
  mailbox = await startMailbox({ env: 'test' });
  product = await startProduct({
    S3_ENDPOINT: store.config.endpoint!,
    S3_BUCKET: 'cubes',
    S3_ACCESS_KEY_ID: store.config.accessKeyId,
    S3_SECRET_ACCESS_KEY: store.config.secretAccessKey,
    SMTP_URL: mailbox.smtpUrl,
    MAIL_FROM: 'outswell@example.org',
  });
  await product.startWorker();
  lead = await product.signIn('lena');
});
afterAll(async () => {
  await product.stop();
  await mailbox.stop();
  await store.stop();
  rmSync(directory, { recursive: true, force: true });
});

test('with an object store the same job runs, and no cube stays on the server\u2019s disk', async () => {
  const { cubeId, fitId } = await makeFixture(product, lead);
  expect((await lead.get(`/fits/${fitId}`)).body.status).toBe('done');
  await lead.get(`/cubes/${cubeId}/channels/16/plane`).expect(200);
  expect((await lead.get(`/cubes/${cubeId}/spectrum?x=30&y=30&radius=3`)).body.brightness).toHaveLength(32);
  const left = readdirSync(product.parts.config.dataDir, { recursive: true }).filter((f) =>
    /fits|-/.test(String(f)),
  );
  expect(left).toEqual([]);
});

test('whoever uploaded a cube is told by mail that it is ready, or why it is not', async () => {
  const regionId = await newRegion(lead, 'Mailed');
  const good = await upload(lead, product.url, regionId, freshCube(), { filename: 'good.fits' });
  const blank = cubeFile({ nx: 20, ny: 20, channels: 6, value: () => NaN });
  mailbox.refuse(1); // a full mail server is tried again
  const bad = await upload(lead, product.url, regionId, blank, { filename: 'bad.fits' });
  expect([good.problem, bad.problem]).toEqual([null, null]);
  const about = (word: string) => mailbox.messages.find((m) => m.subject.includes(word));
  await until(
    async () => [about('good'), about('bad')].map((m) => m !== undefined),
    (seen) => seen.every(Boolean),
  );
  expect(about('good')!.text).toContain(`/cubes/${good.cubeId}`);
  expect(about('bad')!.text).toMatch(/blank/);
});
