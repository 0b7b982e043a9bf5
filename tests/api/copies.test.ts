/** What ingest writes beside the uploaded file: made once, used, and never left behind. */
import { existsSync, mkdirSync, readdirSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { gzipSync } from 'node:zlib';
import { cubeFile } from './cubeFile';
import { newRegion } from './fixture';
import { binaryBody, startProduct, until, type Product, type SignedIn } from './harness';
import { upload } from './uploading';

let product: Product;
let lead: SignedIn;
let regionId: string;
beforeAll(async () => {
  product = await startProduct({ COPY_FROM_BYTES: '1000000' });
  await product.startWorker();
  lead = await product.signIn('lena');
  regionId = await newRegion(lead);
});
afterAll(() => product.stop());

const shape = { nx: 1100, ny: 40, channels: 8 };
const value = (x: number, y: number, k: number) => Math.fround(k + x / 4096 + y / 512);

const settled = (id: string) =>
  until(
    async () => (await lead.get(`/cubes/${id}`)).body,
    (c) => ['ready', 'failed'].includes(c.status),
  );

async function ingested(bytes: Buffer, name?: string): Promise<string> {
  const { cubeId, problem } = await upload(
    lead,
    product.url,
    regionId,
    bytes,
    name ? { filename: name } : {},
  );
  expect(problem).toBeNull();
  expect((await settled(cubeId!)).problem).toBeNull();
  return cubeId!;
}

const rowOf = async (id: string) =>
  (await product.parts
    .db('cubes')
    .where({ id })
    .first('planes_key', 'spectra_key', 'reduced_key', 'attempt'))!;
const inData = (...names: string[]) => join(product.parts.config.dataDir, ...names);
const leftOver = () => (existsSync(inData('working')) ? readdirSync(inData('working')) : []);

async function numbers(path: string): Promise<number[]> {
  const { headers, body } = await lead.get(path).buffer(true).parse(binaryBody).expect(200);
  const stored = new Uint16Array(Uint8Array.from(body as Buffer).buffer);
  return Array.from(stored, (n) => Number(headers['plane-offset']) + Number(headers['plane-scale']) * n);
}

async function readAgain(id: string) {
  await product.parts.db('cubes').where({ id }).update({ status: 'failed' });
  await lead.post(`/cubes/${id}/retry`).expect(202);
  expect((await settled(id)).status).toBe('ready');
}

test('a large cube has its planes, spectra and reduced planes in files of their own, next to the one uploaded', async () => {
  const id = await ingested(cubeFile({ ...shape, value }));
  const row = await rowOf(id);
  for (const key of [row.planes_key, row.spectra_key, row.reduced_key, `cubes/${id}.fits`])
    expect(existsSync(inData(key))).toBe(true);
  const full = await numbers(`/cubes/${id}/channels/5/plane`);
  full.forEach((v, i) => expect(Math.abs(v - value(i % 1100, Math.floor(i / 1100), 5))).toBeLessThan(1e-5));
  const small = await numbers(`/cubes/${id}/channels/5/plane?size=256`);
  // five by five pixels become one: their mean is the value in the middle
  small.forEach((v, i) =>
    expect(Math.abs(v - value(5 * (i % 220) + 2, 5 * Math.floor(i / 220) + 2, 5))).toBeLessThan(1e-5),
  );
});

test('reading a cube again replaces the copies, and removes what a killed worker left', async () => {
  const id = await ingested(cubeFile({ ...shape, value: (x, y, k) => value(x, y, k) + 1 }));
  const first = await rowOf(id);
  // as if a worker had been killed in the middle: its attempt stands in the row, its files lie about
  const killed = 'deadbeef00';
  mkdirSync(inData('working'), { recursive: true });
  writeFileSync(inData('working', `${id}.${killed}.planes`), 'x');
  writeFileSync(inData('cubes', `${id}.${killed}.spectra`), 'x');
  await product.parts.db('cubes').where({ id }).update({ attempt: killed });
  await readAgain(id);
  const second = await rowOf(id);
  expect(second.spectra_key).not.toBe(first.spectra_key);
  const mine = () => readdirSync(inData('cubes')).filter((name) => name.startsWith(id)).length;
  await until(
    async () => mine(),
    (n) => n === 4,
  );
  expect(existsSync(inData(second.spectra_key))).toBe(true);
  expect(leftOver()).toEqual([]);
});

test('a cube that fails leaves no copies', async () => {
  const { cubeId } = await upload(lead, product.url, regionId, cubeFile({ ...shape, value: () => NaN }));
  expect((await settled(cubeId!)).status).toBe('failed');
  await until(
    async () => readdirSync(inData('cubes')).filter((n) => n.startsWith(cubeId!)),
    (n) => n.length === 1,
  );
  expect(leftOver()).toEqual([]);
});

test('a gzip file is read through a plain copy, whatever the order of its axes', async () => {
  const plain = cubeFile({ ...shape, cards: { OBJECT: 'packed' }, value });
  const id = await ingested(gzipSync(plain), 'packed.fits.gz');
  expect((await rowOf(id)).planes_key).toMatch(/plain$/);
  const full = await numbers(`/cubes/${id}/channels/2/plane`);
  expect(Math.abs(full[1100 * 3 + 7]! - value(7, 3, 2))).toBeLessThan(1e-5);
  const { brightness } = (await lead.get(`/cubes/${id}/spectrum?x=7&y=3`).expect(200)).body;
  brightness.forEach((b: number, k: number) => expect(b).toBe(value(7, 3, k)));
  expect(leftOver()).toEqual([]);
});

test('a header that claims a million times a million pixels and more is refused at once', async () => {
  const small = cubeFile({ nx: 8, ny: 8, channels: 8, cards: { NAXIS1: 1e5, NAXIS2: 1e5, NAXIS3: 1e5 } });
  const began = Date.now();
  const { cubeId, problem } = await upload(lead, product.url, regionId, small);
  expect(cubeId).toBeNull();
  expect(problem).toMatchObject({ type: '/problems/fits-truncated' });
  expect(Date.now() - began).toBeLessThan(1000);
});
