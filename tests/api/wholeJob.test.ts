/** The job of the product from a region to a row of the catalogue, over HTTP and the real queue. */
import { cubeFile, marksOnRing, SHELL } from './cubeFile';
import { binaryBody, startProduct, until, type Product, type SignedIn } from './harness';
import { upload } from './uploading';

let product: Product;
let lead: SignedIn;
beforeAll(async () => {
  product = await startProduct();
  await product.startWorker();
  lead = await product.signIn('lena');
});
afterAll(() => product.stop());

test('region, upload, ingest, look, mark, fit, adopt, compare, download', async () => {
  const region = (
    await lead.post('/regions', { name: 'Still Water', distance: { pc: 2000, errorPc: 200 } }).expect(201)
  ).body;
  const bytes = cubeFile({ nx: 64, ny: 60, channels: 32 });
  const { cubeId, problem } = await upload(lead, product.url, region.id, bytes, {
    filename: 'still water.fits',
  });
  expect(problem).toBeNull();

  const cube = await until(
    async () => (await lead.get(`/cubes/${cubeId}`).expect(200)).body,
    (c) => c.status === 'ready' || c.status === 'failed',
  );
  expect(cube).toMatchObject({ status: 'ready', name: 'still water', problem: null, progress: 1 });
  expect(cube.axes).toMatchObject({
    nx: 64,
    ny: 60,
    channels: 32,
    unit: 'K',
    frame: 'galactic',
    projection: 'CAR',
  });

  const channels = (await lead.get(`/cubes/${cubeId}/channels`).expect(200)).body;
  expect(channels.total).toBe(32);
  expect(channels.items[16]).toMatchObject({ channel: 16, velocity: -40, blanks: 0 });
  expect(channels.items[16].maximum).toBeGreaterThan(0.9);

  const plane = await lead
    .get(`/cubes/${cubeId}/channels/16/plane`)
    .buffer(true)
    .parse(binaryBody)
    .expect(200);
  const values = new Uint16Array(plane.body.buffer, plane.body.byteOffset, 64 * 60);
  const [scale, offset] = [Number(plane.headers['plane-scale']), Number(plane.headers['plane-offset'])];
  const pixel = (x: number, y: number) => offset + scale * values[y * 64 + x]!;
  expect(pixel(SHELL.x + 20, SHELL.y)).toBeGreaterThan(0.95);
  expect(pixel(SHELL.x, SHELL.y)).toBeLessThan(0.01);
  await lead.get(`/cubes/${cubeId}/channels/16/thumbnail`).expect(200).expect('content-type', 'image/webp');
  await lead.get(`/cubes/${cubeId}/strip`).expect(200).expect('content-type', 'image/webp');
  await lead.get(`/cubes/${cubeId}/maps/total`).expect(200).expect('plane-width', '64');

  const shell = (await lead.post(`/regions/${region.id}/shells`, { name: 'Ring one' }).expect(201)).body;
  const marks = [10, 12, 14, 16, 18, 20, 22].flatMap((k) => marksOnRing(k));
  const reading = (
    await lead.put(`/shells/${shell.id}/readings/mine`, { cubeId, marks, revision: 0 }).expect(200)
  ).body;
  expect(reading.revision).toBe(1);

  const queued = (await lead.post(`/shells/${shell.id}/fits`, { readingId: reading.id }).expect(202)).body;
  expect(queued.status).toMatch(/queued|running|done/);
  const fit = await until(
    async () => (await lead.get(`/fits/${queued.id}`).expect(200)).body,
    (f) => f.status === 'done' || f.status === 'failed',
  );
  expect(fit.problem).toBeNull();
  expect(fit.parameters.theta.value).toBeCloseTo(SHELL.theta, 2);
  expect(fit.parameters.vSys.value).toBeCloseTo(SHELL.vSys, 1);
  expect(fit.parameters.vExp.value).toBeCloseTo(SHELL.vExp, 0);
  expect(fit.rings.map((r: { channel: number }) => r.channel)).toEqual([10, 12, 14, 16, 18, 20, 22]);
  expect(fit.provenance).toMatchObject({ marks: 56, codeVersion: expect.any(String) });

  expect((await lead.get('/shells').expect(200)).body.total).toBe(0);
  await lead.patch(`/shells/${shell.id}`, { adoptedFitId: fit.id }).expect(200);
  const row = (await lead.get('/shells').expect(200)).body.items[0];
  expect(row.designation).toMatch(/^GSH 120[+-]00-040$/);
  const radius = 2000 * Math.sin((fit.parameters.theta.value * Math.PI) / 180);
  expect(row.adopted.radius.value).toBeCloseTo(radius, 6);
  expect(row.adopted.age.value).toBeCloseTo(
    (0.6 * 0.9777922216807893 * radius) / fit.parameters.vExp.value,
    6,
  );
  const csv = await lead.get('/shells.csv').expect(200);
  expect(csv.text.split('\r\n')[0]).toMatch(/^designation,name,region/);
  expect(csv.text).toContain('Ring one');
});
