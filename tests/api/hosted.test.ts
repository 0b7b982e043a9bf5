/** The hosted services that production uses, each played by a stand-in that speaks the real protocol. */
import { mkdtempSync, readdirSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { gzipSync } from 'node:zlib';
import { startMailbox, type Mailbox } from '@/server/fakes/mailbox';
import { startObjectStore } from '@/server/fakes/objectStore';
import { cubeFile } from './cubeFile';
import { freshCube, makeFixture, newRegion } from './fixture';
import { binaryBody, startProduct, until, type Product, type SignedIn } from './harness';
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
    COPY_FROM_BYTES: '1000000',
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

test('what ingest writes beside a cube lies in the object store, is read from there, and is replaced there', async () => {
  const value = (x: number, y: number, k: number) => Math.fround(k + x / 4096 + y / 512);
  const shape = { nx: 1100, ny: 40, channels: 8 };
  const regionId = await newRegion(lead, 'Copies');
  const packed = gzipSync(cubeFile({ ...shape, value }));
  const { cubeId } = await upload(lead, product.url, regionId, packed, { filename: 'packed.fits.gz' });
  const ready = () =>
    until(
      async () => (await lead.get(`/cubes/${cubeId}`)).body.status,
      (status) => ['ready', 'failed'].includes(status),
    );
  expect(await ready()).toBe('ready');
  const objects = () =>
    readdirSync(directory, { recursive: true, withFileTypes: true })
      .filter((entry) => entry.isFile() && entry.name.includes(cubeId!) && entry.name.endsWith('_object'))
      .map((entry) =>
        entry.name
          .replace(cubeId!, '')
          .replace(/\._\w+$/, '')
          .replace(/\.[0-9a-f]{10}\./, '.'),
      )
      .sort();
  const kinds = ['.fits', '.plain', '.reduced', '.spectra'];
  expect(objects()).toEqual(kinds);
  const look = async () => {
    const plane = await lead
      .get(`/cubes/${cubeId}/channels/5/plane`)
      .buffer(true)
      .parse(binaryBody)
      .expect(200);
    const stored = new Uint16Array(Uint8Array.from(plane.body as Buffer).buffer);
    const at = (x: number, y: number) =>
      Number(plane.headers['plane-offset']) + Number(plane.headers['plane-scale']) * stored[1100 * y + x]!;
    expect(at(700, 31)).toBeCloseTo(value(700, 31, 5), 4);
    const { brightness } = (await lead.get(`/cubes/${cubeId}/spectrum?x=7&y=3`).expect(200)).body;
    expect(brightness).toEqual([0, 1, 2, 3, 4, 5, 6, 7].map((k) => value(7, 3, k)));
    await lead.get(`/cubes/${cubeId}/channels/5/plane?size=256`).expect(200);
    await lead.get(`/cubes/${cubeId}/cut?l=119&b=0&toL=121&toB=0.5`).expect(200);
  };
  await look();
  const keyOf = async () =>
    (await product.parts.db('cubes').where({ id: cubeId }).first('spectra_key')).spectra_key;
  const before = await keyOf();
  await product.parts.db('cubes').where({ id: cubeId }).update({ status: 'failed' });
  await lead.post(`/cubes/${cubeId}/retry`).expect(202);
  expect(await ready()).toBe('ready');
  expect(await keyOf()).not.toBe(before);
  await until(
    async () => objects(),
    (names) => names.length === kinds.length,
  );
  await look();
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
