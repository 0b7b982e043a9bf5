import { request } from 'node:http';
import { existsSync, readdirSync } from 'node:fs';
import { join } from 'node:path';
import { Upload } from 'tus-js-client';
import { finishInterrupted } from '@/server/services/uploads';
import { cubeFile } from './cubeFile';
import { freshCube, leadOfAnotherTeam, newRegion } from './fixture';
import { startProduct, until, type Product, type SignedIn } from './harness';
import { cookieOf, upload } from './uploading';

let product: Product;
let people: Awaited<ReturnType<Product['team']>>;
let lead: SignedIn;
let regionId: string;
beforeAll(async () => {
  product = await startProduct({ MAX_UPLOAD_BYTES: String(4_000_000) });
  people = await product.team();
  lead = people.lead;
  regionId = await newRegion(lead);
});
afterAll(() => product.stop());

const small = { nx: 24, ny: 20, channels: 8 };
const stored = async () => ({
  cubes: (await lead.get(`/regions/${regionId}/cubes`)).body.total as number,
  files: readdirSync(join(product.parts.config.dataDir, 'uploads')).filter((f) => !f.startsWith('.')).length,
});

describe('a file that cannot work is refused, and nothing of it is stored', () => {
  const text = Buffer.from('This is no FITS file at all.'.repeat(1000));
  const png = Buffer.concat([Buffer.from([0x89, 0x50, 0x4e, 0x47, 13, 10, 26, 10]), Buffer.alloc(20_000)]);
  const truncated = cubeFile(small).subarray(0, 2880 * 2 + 100);
  test.each([
    ['text', text, 'not-fits', null],
    ['a picture', png, 'not-fits', null],
    ['a truncated cube', truncated, 'fits-truncated', null],
    [
      'a 2-D image',
      cubeFile({
        ...small,
        channels: 1,
        cards: {
          NAXIS: 2,
          NAXIS3: null,
          CTYPE3: null,
          CRVAL3: null,
          CRPIX3: null,
          CDELT3: null,
          CUNIT3: null,
        },
      }),
      'fits-shape',
      null,
    ],
    [
      'a cube without a spectral axis',
      cubeFile({ ...small, cards: { CTYPE3: 'STOKES' } }),
      'fits-shape',
      null,
    ],
    ['a cube with an unknown BITPIX', cubeFile({ ...small, cards: { BITPIX: 12 } }), 'fits-card', 'BITPIX'],
    [
      'a cube whose channels have no width',
      cubeFile({ ...small, cards: { CDELT3: 0 } }),
      'fits-card',
      'CDELT3',
    ],
    [
      'a cube in an unknown projection',
      cubeFile({ ...small, cards: { CTYPE1: 'GLON-QQQ', CTYPE2: 'GLAT-QQQ' } }),
      'fits-card',
      'CTYPE1',
    ],
  ])('%s', async (_name, bytes, type, card) => {
    const before = await stored();
    const outcome = await upload(lead, product.url, regionId, bytes);
    expect(outcome.cubeId).toBeNull();
    expect(outcome.problem).toMatchObject({
      type: `/problems/${type}`,
      status: 422,
      detail: expect.any(String),
      ...(card && { card }),
    });
    expect(await stored()).toEqual(before);
    const listed = (await lead.get(`/regions/${regionId}/uploads`)).body.items[0];
    expect(listed).toMatchObject({ status: 'refused', problem: { type: `/problems/${type}` } });
  });

  test('an empty file', async () => {
    const { problem } = await upload(lead, product.url, regionId, Buffer.alloc(0));
    expect(problem).toMatchObject({ type: '/problems/not-fits' });
  });
});

test('the header is judged while the file is still on its way: a large picture is refused after its first piece', async () => {
  const size = 3_900_000;
  const sent: number[] = [];
  const picture = Buffer.concat([Buffer.from([0x89, 0x50, 0x4e, 0x47]), Buffer.alloc(size - 4)]);
  const outcome = await upload(lead, product.url, regionId, picture, {
    chunkSize: 200_000,
    onProgress: (bytes) => void sent.push(bytes),
  });
  expect(outcome.problem).toMatchObject({ type: '/problems/not-fits' });
  expect(Math.max(...sent)).toBeLessThanOrEqual(200_000);
});

test('a header that arrives in pieces is judged when it is whole', async () => {
  const bytes = cubeFile({ ...small, cards: { CTYPE3: 'STOKES', OBJECT: 'in pieces' } });
  const outcome = await upload(lead, product.url, regionId, bytes, { chunkSize: 500 });
  expect(outcome.problem).toMatchObject({ type: '/problems/fits-shape' });
});

test('an upload goes on where a lost connection left it, and the cube has the same bytes', async () => {
  const bytes = freshCube();
  let location = '';
  await new Promise<void>((resolve) => {
    const first = new Upload(bytes, {
      endpoint: `${product.url}/api/v1/uploads`,
      metadata: { filename: 'again.fits', regionId },
      chunkSize: 100_000,
      retryDelays: null as never,
      headers: { 'X-CSRF-Token': lead.csrf, Cookie: cookieOf(lead, product.url) },
      onChunkComplete: (_size, accepted) => {
        if (accepted < 200_000) return;
        location = first.url!;
        void first.abort().then(resolve);
      },
      onError: () => undefined,
    });
    first.start();
  });
  const waiting = (await lead.get(`/regions/${regionId}/uploads`)).body.items.find(
    (u: { fileName: string }) => u.fileName === 'again.fits',
  );
  expect(waiting).toMatchObject({ status: 'receiving', mine: true, sizeBytes: bytes.length });
  expect(waiting.receivedBytes).toBeGreaterThanOrEqual(200_000);
  const outcome = await upload(lead, product.url, regionId, bytes, {
    uploadUrl: location,
    chunkSize: 100_000,
  });
  expect(outcome.problem).toBeNull();
  const source = await product.parts.cubeFiles.open(`cubes/${outcome.cubeId}.fits`);
  expect(Buffer.from(await source.read(0, source.size)).equals(bytes)).toBe(true);
  await source.close();
});

test('the same bytes twice in a region are recognised; in another region they are welcome', async () => {
  const bytes = freshCube();
  const first = await upload(lead, product.url, regionId, bytes, { filename: 'one.fits' });
  const second = await upload(lead, product.url, regionId, bytes, { filename: 'two.fits' });
  expect(second.problem).toMatchObject({
    type: '/problems/duplicate-file',
    status: 409,
    cubeId: first.cubeId,
  });
  const elsewhere = await upload(lead, product.url, await newRegion(lead, 'Other field'), bytes);
  expect(elsewhere.cubeId).not.toBeNull();
});

test('a file over the limit is refused before its bytes', async () => {
  const outcome = await upload(lead, product.url, regionId, Buffer.alloc(4_000_001));
  expect(outcome).toMatchObject({ status: 413, problem: { type: '/problems/too-large' } });
});

test.each([
  ['analyst', null],
  ['reviewer', 403],
  ['reader', 403],
  ['stranger', 403],
] as const)('%s begins an upload: %s', async (role, refusal) => {
  const { problem } = await upload(people[role], product.url, regionId, freshCube());
  expect(problem?.status ?? null).toBe(refusal);
});

test('another team, and another person of the team, find neither the region nor the upload', async () => {
  const olga = await leadOfAnotherTeam(product);
  expect((await upload(olga, product.url, regionId, freshCube())).problem).toMatchObject({ status: 404 });
  const bytes = freshCube();
  let location = '';
  await new Promise<void>((resolve) => {
    const mine = new Upload(bytes, {
      endpoint: `${product.url}/api/v1/uploads`,
      metadata: { filename: 'mine.fits', regionId },
      chunkSize: 50_000,
      headers: { 'X-CSRF-Token': lead.csrf, Cookie: cookieOf(lead, product.url) },
      onChunkComplete: () => {
        location = mine.url!;
        void mine.abort().then(resolve);
      },
    });
    mine.start();
  });
  const path = new URL(location, product.url).pathname.replace('/api/v1', '');
  for (const who of [olga, people.analyst])
    await who.agent.head(`/api/v1${path}`).set('Tus-Resumable', '1.0.0').expect(404);
  await people.analyst.agent
    .delete(`/api/v1${path}`)
    .set({ 'Tus-Resumable': '1.0.0', 'X-CSRF-Token': people.analyst.csrf })
    .expect(404);
  await lead.agent
    .delete(`/api/v1${path}`)
    .set({ 'Tus-Resumable': '1.0.0', 'X-CSRF-Token': lead.csrf })
    .expect(204);
  expect(existsSync(join(product.parts.config.dataDir, path))).toBe(false);
  await lead.agent.head(`/api/v1${path}`).set('Tus-Resumable', '1.0.0').expect(404);
});

test('a name with folders in it is only a name', async () => {
  const { cubeId } = await upload(lead, product.url, regionId, freshCube(), {
    filename: '../../etc/pass\u0000wd.fits',
  });
  expect((await lead.get(`/cubes/${cubeId}`)).body).toMatchObject({
    fileName: 'passwd.fits',
    name: 'passwd',
  });
});

test('the protocol\u2019s own refusals are problems too', async () => {
  const answer = await lead.agent
    .post('/api/v1/uploads')
    .set({ 'X-CSRF-Token': lead.csrf, 'Tus-Resumable': '1.0.0' });
  expect(answer.status).toBe(400);
  expect(answer.headers['content-type']).toMatch(/problem\+json/);
  expect(answer.body).toMatchObject({ type: '/problems/upload-protocol', status: 400 });
});

test('a server that stopped after the last byte finishes the upload when it starts again', async () => {
  const bytes = freshCube();
  const { cubeId } = await upload(lead, product.url, regionId, bytes);
  // as if the server had been killed between moving the file and writing the record
  await product.parts.db('uploads').where({ id: cubeId }).update({ status: 'checking', cube_id: null });
  await product.parts.db('cubes').where({ id: cubeId }).delete();
  await finishInterrupted(product.parts);
  await until(
    async () => (await lead.get(`/cubes/${cubeId}`)).status,
    (status) => status === 200,
  );
});

test('a connection cut in the middle of a chunk leaves a whole upload behind', async () => {
  const bytes = freshCube();
  const created = await lead.agent.post('/api/v1/uploads').set({
    'X-CSRF-Token': lead.csrf,
    'Tus-Resumable': '1.0.0',
    'Upload-Length': String(bytes.length),
    'Upload-Metadata': `filename ${Buffer.from('cut.fits').toString('base64')},regionId ${Buffer.from(regionId).toString('base64')}`,
  });
  expect(created.status).toBe(201);
  const path = created.headers.location!;
  await new Promise<void>((resolve) => {
    const cut = request(`${product.url}${path}`, {
      method: 'PATCH',
      headers: {
        'X-CSRF-Token': lead.csrf,
        Cookie: cookieOf(lead, product.url),
        'Tus-Resumable': '1.0.0',
        'Upload-Offset': '0',
        'Content-Type': 'application/offset+octet-stream',
        'Content-Length': String(bytes.length),
      },
    });
    cut.on('error', () => undefined).on('close', resolve);
    cut.write(bytes.subarray(0, 150_000), () => setTimeout(() => cut.destroy(), 100));
  });
  const outcome = await upload(lead, product.url, regionId, bytes, { uploadUrl: `${product.url}${path}` });
  expect(outcome).toMatchObject({ problem: null, cubeId: expect.any(String) });
});

test('a file that the disk cannot hold is refused before its bytes, and says how much room there is', async () => {
  const roomy = await startProduct({ MAX_UPLOAD_BYTES: String(1e15) });
  const person = await roomy.signIn('lena');
  const id = await newRegion(person);
  const encoded = (text: string) => Buffer.from(text).toString('base64');
  const answer = await person.agent.post('/api/v1/uploads').set({
    'X-CSRF-Token': person.csrf,
    'Tus-Resumable': '1.0.0',
    'Upload-Length': String(9e14),
    'Upload-Metadata': `filename ${encoded('huge.fits')},regionId ${encoded(id)}`,
  });
  expect(answer.status).toBe(507);
  expect(answer.body).toMatchObject({
    type: '/problems/disk-full',
    detail: expect.stringMatching(/MB left/),
  });
  expect((await person.get(`/regions/${id}/uploads`)).body.total).toBe(0);
  await roomy.stop();
});
