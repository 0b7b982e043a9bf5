import { cubeFile } from './cubeFile';
import { freshCube, newRegion, readyCube } from './fixture';
import { binaryBody, startProduct, until, type Product, type SignedIn } from './harness';
import { upload } from './uploading';

let product: Product;
let lead: SignedIn;
let regionId: string;
beforeAll(async () => {
  product = await startProduct();
  lead = await product.signIn('lena');
  regionId = await newRegion(lead);
});
afterAll(() => product.stop());

const small = { nx: 24, ny: 20, channels: 8 };
const settled = (id: string | null) =>
  until(
    async () => (await lead.get(`/cubes/${id}`)).body,
    (cube) => ['ready', 'failed', 'cancelled'].includes(cube.status),
  );

test('a cube waits, can be stopped before a worker takes it, and read again', async () => {
  const { cubeId } = await upload(lead, product.url, regionId, freshCube());
  expect((await lead.get(`/cubes/${cubeId}`)).body).toMatchObject({
    status: 'uploaded',
    activity: 'waiting for a worker',
  });
  await lead.get(`/cubes/${cubeId}/channels`).expect(409);
  expect((await lead.post(`/cubes/${cubeId}/cancel`).expect(202)).body.status).toBe('cancelled');
  await lead.post(`/cubes/${cubeId}/cancel`).expect(409);
  await product.startWorker();
  expect((await lead.get(`/cubes/${cubeId}`)).body.status).toBe('cancelled');
  await lead.post(`/cubes/${cubeId}/retry`).expect(202);
  expect((await settled(cubeId)).status).toBe('ready');
  await lead.post(`/cubes/${cubeId}/retry`).expect(409);
});

test('statistics, spectrum and total intensity are those of the numbers in the file', async () => {
  const value = (x: number, y: number, k: number) => (k === 2 ? NaN : x === 5 && y === 6 ? NaN : k + x / 100);
  const { cubeId } = await upload(lead, product.url, regionId, cubeFile({ ...small, value }));
  const cube = await settled(cubeId);
  expect(cube.statistics.blanks).toBe(24 * 20 + 7);
  expect(cube.statistics.minimum).toBe(0);
  expect(cube.statistics.maximum).toBeCloseTo(7.23, 6);
  expect(cube.statistics.rms).toBeCloseTo(1.4826 * 0.06, 6);
  const { items } = (await lead.get(`/cubes/${cubeId}/channels`)).body;
  expect(items[2]).toMatchObject({ minimum: null, maximum: null, mean: null, rms: null, blanks: 480 });
  // 479 pixels: 20 rows of 0 … 23 hundredths, less one pixel of 5 hundredths
  const sum = 20 * ((23 * 24) / 2) - 5;
  expect(items[3].mean).toBeCloseTo(3 + sum / 479 / 100, 6);
  expect(items[3].minimum).toBeCloseTo(3, 6);
  expect(items[3].maximum).toBeCloseTo(3.23, 6);
  // the median is 0.12 above 3, and half of the pixels lie within 0.06 of it
  expect(items[3].rms).toBeCloseTo(1.4826 * 0.06, 6);
  const spectrum = (await lead.get(`/cubes/${cubeId}/spectrum?x=7&y=3`)).body;
  expect(spectrum.brightness[2]).toBeNull();
  expect(spectrum.brightness[4]).toBeCloseTo(4.07, 6);
  const total = await lead.get(`/cubes/${cubeId}/maps/total`).buffer(true).parse(binaryBody).expect(200);
  const values = new Uint16Array(total.body.buffer, total.body.byteOffset, 480);
  expect(values[6 * 24 + 5]).toBe(Number(total.headers['plane-blank']));
  const at = (x: number, y: number) =>
    Number(total.headers['plane-offset']) + Number(total.headers['plane-scale']) * values[y * 24 + x]!;
  expect(at(10, 3)).toBeCloseTo(0 + 1 + 3 + 4 + 5 + 6 + 7 + 7 * 0.1, 3);
});

test('a cube of blanks fails with the cause kept on it, and can be tried again', async () => {
  const { cubeId } = await upload(lead, product.url, regionId, cubeFile({ ...small, value: () => NaN }));
  const failed = await settled(cubeId);
  expect(failed).toMatchObject({
    status: 'failed',
    problem: { type: '/problems/fits-shape', detail: expect.stringMatching(/blank/) },
  });
  await lead.post(`/cubes/${cubeId}/retry`).expect(202);
  expect((await settled(cubeId)).status).toBe('failed');
});

test('a file that is gone fails after three attempts with the cause kept', async () => {
  const { cubeId } = await upload(lead, product.url, regionId, freshCube());
  await settled(cubeId);
  await product.parts.cubeFiles.remove(`cubes/${cubeId}.fits`);
  await product.parts.db('cubes').where({ id: cubeId }).update({ status: 'failed' });
  await lead.post(`/cubes/${cubeId}/retry`).expect(202);
  const failed = await settled(cubeId);
  expect(failed.status).toBe('failed');
  expect(failed.problem.detail).toEqual(expect.any(String));
});

test('the spectral axis may come first, and the frame may be equatorial', async () => {
  const cards = { NAXIS1: 8, NAXIS2: 24, NAXIS3: 20 };
  const axes = {
    CTYPE1: 'VRAD',
    CRVAL1: -56000,
    CRPIX1: 1,
    CDELT1: 1000,
    CUNIT1: 'm/s',
    CTYPE2: 'RA---TAN',
    CRVAL2: 83,
    CRPIX2: 12,
    CDELT2: -0.05,
    CUNIT2: 'deg',
    CTYPE3: 'DEC--TAN',
    CRVAL3: 5,
    CRPIX3: 10,
    CDELT3: 0.05,
    CUNIT3: 'deg',
  };
  // the writer counts its first axis fastest: here that is the channel
  const bytes = cubeFile({
    nx: 8,
    ny: 24,
    channels: 20,
    cards: { ...cards, ...axes },
    value: (k, x, y) => k + x / 100 + y / 10_000,
  });
  const { cubeId, problem } = await upload(lead, product.url, regionId, bytes);
  expect(problem).toBeNull();
  const cube = await settled(cubeId);
  expect(cube.axes).toMatchObject({ nx: 24, ny: 20, channels: 8, projection: 'TAN' });
  const spectrum = (await lead.get(`/cubes/${cubeId}/spectrum?x=7&y=3`)).body;
  spectrum.brightness.forEach((b: number, k: number) => expect(b).toBeCloseTo(k + 0.07 + 0.0003, 5));
});

test('a plane is reduced to the size asked for, with the block named', async () => {
  const id = await readyCube(product, lead, regionId);
  const plane = await lead.get(`/cubes/${id}/channels/3/plane?size=20`).expect(200);
  expect(plane.headers).toMatchObject({
    'plane-width': '16',
    'plane-height': '15',
    'plane-block': '4',
    'content-length': '480',
  });
  expect(plane.headers['cache-control']).toMatch(/private.*immutable/);
  await lead.get(`/cubes/${id}/channels/32/plane`).expect(404);
  await lead.get(`/cubes/${id}/channels/3/plane?size=3`).expect(422);
});

test('a cube taken out is gone from the lists, keeps its marks, and comes back', async () => {
  const id = await readyCube(product, lead, regionId);
  await lead.delete(`/cubes/${id}`).expect(204);
  await lead.get(`/cubes/${id}`).expect(404);
  expect((await lead.post(`/cubes/${id}/restore`).expect(200)).body.status).toBe('ready');
});
