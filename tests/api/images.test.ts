/** Companion images: what is taken in, what is refused and leaves nothing, their numbers, and who may do what. */
import { createHash } from 'node:crypto';
import { existsSync, readdirSync, readFileSync } from 'node:fs';
import { request } from 'node:http';
import { join } from 'node:path';
import { gzipSync } from 'node:zlib';
import { describeCube } from '@/shared/fits/cubeHead';
import { buildSky } from '@/shared/sky/wcs';
import type { SkySpec } from '@/shared/sky/wcsSpec';
import { cubeFile } from './cubeFile';
import { freshImage as fresh, leadOfAnotherTeam, newRegion } from './fixture';
import { binaryBody, startProduct, until, type Product, type SignedIn } from './harness';
import { listen } from './listening';
import { imageFile, NX, NY, tiledFile, valueAt } from './skyImageFile';
import { cookieOf } from './uploading';

type Who = 'lead' | 'analyst' | 'reviewer' | 'reader' | 'otherTeam' | 'stranger';

let product: Product;
let people: Record<Who, SignedIn>;
let lead: SignedIn;
let regionId: string;
beforeAll(async () => {
  product = await startProduct();
  people = { ...(await product.team()), otherTeam: await leadOfAnotherTeam(product) };
  lead = people.lead;
  regionId = await newRegion(lead);
});
afterAll(() => product.stop());

const add = (bytes: Buffer, who = lead, fileName = 'halpha.fits') =>
  who.post(`/regions/${regionId}/images?fileName=${encodeURIComponent(fileName)}`, bytes);
const added = async (bytes = fresh()) => (await add(bytes).expect(201)).body;
const plane = (id: string, query = '') =>
  lead.get(`/images/${id}/plane${query}`).buffer(true).parse(binaryBody);
const listed = async () =>
  (await lead.get(`/regions/${regionId}/images`).expect(200)).body.items.map((i: { id: string }) => i.id);
const events = async (id: string) =>
  (await product.parts.db('events').where({ subject_id: id }).orderBy('id')).map((e) => e.kind);
/** Everything that lies on disk, so that a refusal can be seen to leave nothing. */
const files = () =>
  ['images', 'working'].flatMap((folder) => {
    const path = join(product.parts.config.dataDir, folder);
    return existsSync(path) ? readdirSync(path).map((name) => `${folder}/${name}`) : [];
  });
/** The numbers of an answered plane. */
function numbers(answer: { body: Buffer; headers: Record<string, string> }): number[] {
  const { headers, body } = answer;
  const [scale, offset, blank] = ['scale', 'offset', 'blank'].map((name) => Number(headers[`plane-${name}`]));
  return Array.from({ length: body.length / 2 }, (_, i) => {
    const n = body.readUInt16LE(2 * i);
    return n === blank ? NaN : offset! + scale! * n;
  });
}
const everyValue = Array.from({ length: NX * NY }, (_, i) => valueAt(i % NX, Math.floor(i / NX)));

test('an image is taken in with its bytes, described, listed, and told to other screens', async () => {
  const bytes = fresh();
  const other = listen(product, people.reader);
  await other.open;
  const answer = await add(bytes, people.analyst, '../../H alpha map.fits').expect(201);
  const image = answer.body;
  expect(image).toMatchObject({
    regionId,
    name: 'H alpha map',
    fileName: 'H alpha map.fits',
    sizeBytes: bytes.length,
    checksum: createHash('sha256').update(bytes).digest('hex'),
    ...{ nx: NX, ny: NY, bitpix: -32, hdu: 0, unit: 'Rayleigh', frame: 'galactic', projection: 'CAR' },
    createdBy: { id: people.analyst.id },
  });
  const place = buildSky(image.sky as SkySpec).pixelToGalactic(19.5, 14.5)!;
  expect(place.l).toBeCloseTo(120, 10);
  expect(place.b).toBeCloseTo(0, 10);
  expect(await listed()).toContain(image.id);
  expect((await lead.get(`/images/${image.id}`).expect(200)).body).toEqual(image);
  const stored = readFileSync(join(product.parts.config.dataDir, `images/${image.id}.fits`));
  expect(stored.equals(bytes)).toBe(true);
  expect(await events(image.id)).toEqual(['image.added']);
  await until(
    async () => other.events,
    (seen) => seen.some((e) => e.subject === 'region' && e.id === regionId),
  );
  other.close();
});

describe('its numbers', () => {
  test('are those of the file, row y = 0 first, and are kept by whoever asked', async () => {
    const { id, checksum } = await added();
    const answer = await plane(id).expect(200);
    expect(answer.headers).toMatchObject({
      'plane-width': `${NX}`,
      'plane-height': `${NY}`,
      'plane-block': '1',
      etag: `"${checksum}"`,
      'cache-control': expect.stringContaining('immutable'),
    });
    numbers(answer).forEach((n, i) => expect(Math.abs(n - everyValue[i]!)).toBeLessThan(0.01));
    await lead.get(`/images/${id}/plane`).set('If-None-Match', `"${checksum}"`).expect(304);
  });

  test('are averaged over blocks when fewer pixels are asked for', async () => {
    const { id } = await added();
    const answer = await plane(id, '?size=20').expect(200);
    expect(answer.headers).toMatchObject({ 'plane-width': '20', 'plane-height': '15', 'plane-block': '2' });
    const of = (x: number, y: number) => valueAt(x, y) + (NX + 1) / 2; // the mean of four neighbours
    expect(numbers(answer)[0]).toBeCloseTo(of(0, 0), 1);
    expect(numbers(answer)[3 * 20 + 7]).toBeCloseTo(of(14, 6), 1);
    expect((await plane(id, '?size=20&bits=8').expect(200)).body).toHaveLength(300);
  });

  test.each([
    ['a gzip file', () => gzipSync(fresh()), {}],
    ['tiles', tiledFile, { bitpix: 16, hdu: 1 }],
    ['tiles in a gzip file', () => gzipSync(tiledFile()), { bitpix: 16, hdu: 1 }],
    ['axes of length one around', () => imageFile({ NAXIS: 4, NAXIS3: 1, NAXIS4: 1, CTYPE4: 'STOKES' }), {}],
  ])('are read from %s', async (_what, make, seen) => {
    const bytes = make();
    const image = await added(bytes);
    expect(image).toMatchObject({ ...seen, sizeBytes: bytes.length, nx: NX, ny: NY });
    const values = numbers(await plane(image.id).expect(200));
    expect(values).toHaveLength(NX * NY);
    values.forEach((n, i) => expect(Math.abs(n - everyValue[i]!)).toBeLessThan(0.01));
    const stored = readFileSync(join(product.parts.config.dataDir, `images/${image.id}.fits`));
    expect(stored.equals(bytes)).toBe(true);
  });

  test('are turned where the file has latitude first', async () => {
    const turned = {
      ...{ NAXIS1: NX, NAXIS2: NY, CTYPE1: 'GLAT-CAR', CTYPE2: 'GLON-CAR', CRVAL1: 0, CRVAL2: 120 },
      ...{ CDELT1: 0.05, CDELT2: -0.05 },
    };
    const image = await added(imageFile(turned));
    expect([image.nx, image.ny]).toEqual([NY, NX]);
    const values = numbers(await plane(image.id).expect(200));
    expect(values[7 * NY + 4]).toBeCloseTo(valueAt(7, 4), 1);
  });

  test('are blank where the file has none', async () => {
    const image = await added(imageFile({}, (x, y) => (x === 3 && y === 2 ? NaN : valueAt(x, y))));
    const values = numbers(await plane(image.id).expect(200));
    expect(values.flatMap((v, i) => (Number.isNaN(v) ? [i] : []))).toEqual([2 * NX + 3]);
  });
});

describe('what is refused leaves nothing behind:', () => {
  const cube = cubeFile({ nx: 8, ny: 8, channels: 4 });
  const table = tiledFile();
  const cut = fresh();
  test.each([
    ['a cube', cube, 'fits-image', /This is a cube.*Upload it as a cube/],
    ['a gzip file of a cube', gzipSync(cube), 'fits-image', /This is a cube/],
    [
      'a table',
      Buffer.from(table.toString('latin1').replace('ZIMAGE  = T', 'ZIMAGE  = F'), 'latin1'),
      'fits-image',
      /no image/,
    ],
    ['text', Buffer.from('name,l,b\nfirst,1,2\n'), 'not-fits', /./],
    ['nothing', Buffer.alloc(0), 'not-fits', /empty/],
    ['a file cut short', cut.subarray(0, cut.length - 2880), 'fits-truncated', /too early/],
    ['gzip cut short', gzipSync(fresh()).subarray(0, -20), 'compressed-damaged', /ends early/],
    ['gzip around text', gzipSync(Buffer.from('no image')), 'not-fits', /./],
    ['an image of blanks', imageFile({}, () => NaN), 'fits-image', /Every pixel of the image is blank/],
    ['a bad card', imageFile({ CDELT2: 0 }), 'fits-card', /CDELT2 is zero/],
    ['a projection that is none', imageFile({ CTYPE1: 'GLON-QQQ', CTYPE2: 'GLAT-QQQ' }), 'fits-card', /QQQ/],
  ])('%s', async (_what, bytes, type, words) => {
    const before = [await listed(), files()];
    const { status, body } = await add(bytes);
    expect(body).toMatchObject({ type: `/problems/${type}`, detail: expect.stringMatching(words) });
    expect(status).toBe(body.status);
    expect([await listed(), files()]).toEqual(before);
  });

  test('an image with more pixels than are read', async () => {
    const header = imageFile({ NAXIS1: 6000, NAXIS2: 6000, BITPIX: 8 }).subarray(0, 2880);
    const before = files();
    const { body } = await add(gzipSync(Buffer.concat([header, Buffer.alloc(36_002_880)]))).expect(413);
    expect(body.detail).toMatch(/6000 by 6000 pixels; at most 33554432 are read/);
    expect(files()).toEqual(before);
  });

  test.each([
    ['that says so, at once', { 'Content-Length': String(65 * 2 ** 20) }, 1],
    ['that does not say so', { 'Transfer-Encoding': 'chunked' }, 65],
  ])('a file of more than 64 MiB %s', async (_what, headers, sentMiB) => {
    const before = [await listed(), files()];
    const answer = await new Promise<{ status: number; body: string }>((resolve, reject) => {
      const call = request(`${product.url}/api/v1/regions/${regionId}/images`, {
        method: 'POST',
        headers: {
          ...headers,
          'Content-Type': 'application/fits',
          Cookie: cookieOf(lead, product.url),
          'X-CSRF-Token': lead.csrf,
        },
      });
      call.on('error', reject).on('response', (res) => {
        let body = '';
        res.setEncoding('utf8').on('data', (text: string) => (body += text));
        res.on('end', () => {
          resolve({ status: res.statusCode!, body });
          call.destroy();
        });
      });
      const piece = Buffer.alloc(2 ** 20, 0x20);
      for (let i = 0; i < sentMiB; i++) call.write(piece);
    });
    expect(answer.status).toBe(413);
    expect(JSON.parse(answer.body)).toMatchObject({
      type: '/problems/too-large',
      detail: expect.stringMatching(/at most 64 MiB.*average it/),
    });
    expect([await listed(), files()]).toEqual(before);
  });

  test('a body of another kind', async () => {
    const { body } = await lead.post(`/regions/${regionId}/images`, { fits: 'no' }).expect(422);
    expect(body).toMatchObject({ type: '/problems/invalid-input', field: 'Content-Type' });
  });

  test('the same bytes a second time, unless the first are taken out', async () => {
    const bytes = fresh();
    const image = await added(bytes);
    const { body } = await add(bytes).expect(409);
    expect(body).toMatchObject({ type: '/problems/duplicate-file', imageId: image.id });
    await lead.delete(`/images/${image.id}`).expect(204);
    await add(bytes).expect(201);
    const { body: refused } = await lead.post(`/images/${image.id}/restore`).expect(409);
    expect(refused.type).toBe('/problems/conflict');
  });
});

test('a cube upload that is refused for being flat says where an image of the sky goes', () => {
  const refused = () => describeCube(new Uint8Array(fresh().subarray(0, 2880)));
  expect(refused).toThrow(/can be added to a region as a companion image/);
});

test('an image is renamed, taken out and put back, each with its event', async () => {
  const { id } = await added();
  expect((await lead.patch(`/images/${id}`, { name: ' Ionised gas ' }).expect(200)).body.name).toBe(
    'Ionised gas',
  );
  await lead.patch(`/images/${id}`, { name: '' }).expect(422);
  await lead.delete(`/images/${id}`).expect(204);
  expect(await listed()).not.toContain(id);
  await lead.get(`/images/${id}`).expect(404);
  await lead.get(`/images/${id}/plane`).expect(404);
  await lead.post(`/images/${id}/restore`).expect(200);
  expect(await listed()).toContain(id);
  await lead.post(`/images/${id}/restore`).expect(404);
  expect(await events(id)).toEqual(['image.added', 'image.renamed', 'image.removed', 'image.restored']);
});

test('whoever may not add an image writes nothing', async () => {
  const before = [await listed(), files()];
  for (const [who, status] of [
    ['reviewer', 403],
    ['reader', 403],
    ['otherTeam', 404],
    ['stranger', 403],
  ] as const)
    await add(fresh(), people[who]).expect(status);
  expect([await listed(), files()]).toEqual(before);
});
