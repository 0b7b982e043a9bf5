import { cubeFile } from './cubeFile';
import { freshCube, newRegion, newShell, readyCube, saveMarks } from './fixture';
import { startProduct, until, type Product, type SignedIn } from './harness';
import { upload } from './uploading';

let product: Product;
let lead: SignedIn;
let regionId: string;
beforeAll(async () => {
  product = await startProduct();
  await product.startWorker();
  lead = await product.signIn('lena');
  regionId = await newRegion(lead);
});
afterAll(() => product.stop());

test('what a person says stands beside the header, with who and when, and can be taken back', async () => {
  const id = await readyCube(product, lead, regionId);
  const said = { unit: 'Jy/beam', beam: { major: 0.2, minor: 0.1, angle: 30 }, velocityFrame: 'BARYCENT' };
  const changed = (await lead.patch(`/cubes/${id}/overrides`, said).expect(200)).body;
  expect(changed.axes).toMatchObject({ unit: 'Jy/beam', beam: said.beam, spectral: { frame: 'BARYCENT' } });
  expect(changed.overrides).toMatchObject({ values: said, by: { name: 'lena' }, at: expect.any(String) });
  const { cards } = (await lead.get(`/cubes/${id}/header`)).body;
  expect(cards.find((c: { keyword: string }) => c.keyword === 'BUNIT').value).toBe('K');
  const back = (await lead.patch(`/cubes/${id}/overrides`, { unit: null, beam: null, velocityFrame: null }))
    .body;
  expect(back).toMatchObject({ overrides: null, axes: { unit: 'K', spectral: { frame: 'LSRK' } } });
});

test('another rest frequency moves the velocities of a frequency axis everywhere', async () => {
  const rest = 1420405751.768;
  const cards = { CTYPE3: 'FREQ', CRVAL3: rest, CRPIX3: 1, CDELT3: -5000, CUNIT3: 'Hz', OBJECT: 'rest' };
  const { cubeId } = await upload(
    lead,
    product.url,
    regionId,
    cubeFile({ nx: 24, ny: 20, channels: 8, cards }),
  );
  await until(
    async () => (await lead.get(`/cubes/${cubeId}`)).body,
    (c) => c.status === 'ready',
  );
  const first = async () => (await lead.get(`/cubes/${cubeId}/channels`)).body.items[0].velocity as number;
  expect(await first()).toBeCloseTo(0, 9);
  const other = rest * 1.0001;
  const cube = (await lead.patch(`/cubes/${cubeId}/overrides`, { restFrequencyHz: other }).expect(200)).body;
  // radio convention: v = c (1 − f/f₀)
  const expected = 299792.458 * (1 - rest / other);
  expect(await first()).toBeCloseTo(expected, 6);
  expect(cube.axes.spectral.velocities[0]).toBeCloseTo(expected, 6);
});

test('what cannot be is refused, naming the field', async () => {
  const id = await readyCube(product, lead, regionId);
  for (const [body, field] of [
    [{ restFrequencyHz: -1 }, 'restFrequencyHz'],
    [{ unit: 'furlong' }, 'unit'],
    [{ beam: { major: 0, minor: 1, angle: 0 } }, 'beam.major'],
    [{ colour: 'red' }, ''],
  ] as const)
    expect((await lead.patch(`/cubes/${id}/overrides`, body).expect(422)).body.field).toBe(field);
  expect((await lead.get(`/cubes/${id}`)).body.overrides).toBeNull();
});

test('another image of the file is read only if there is one and no marks lie on this one', async () => {
  const id = await readyCube(product, lead, regionId);
  expect((await lead.patch(`/cubes/${id}/source`, { hdu: 7 }).expect(422)).body.field).toBe('hdu');
  const shellId = await newShell(lead, regionId);
  await saveMarks(lead, shellId, id);
  await lead.patch(`/cubes/${id}/source`, { hdu: 0 }).expect(409);
});

test('cubes of the region that show the same sky are listed with each other', async () => {
  const region = await newRegion(lead, 'Two fields');
  const here = await readyCube(product, lead, region);
  const far = cubeFile({ nx: 24, ny: 20, channels: 8, cards: { CRVAL1: 200, OBJECT: 'far' } });
  const away = (await upload(lead, product.url, region, far)).cubeId;
  const twin = (await upload(lead, product.url, region, freshCube(), { filename: 'twin.fits' })).cubeId;
  const overlapsOf = async (id: string | null) =>
    (await lead.get(`/cubes/${id}`)).body.overlaps.map((o: { id: string }) => o.id);
  expect(await overlapsOf(here)).toEqual([twin]);
  expect(await overlapsOf(twin)).toEqual([here]);
  expect(await overlapsOf(away)).toEqual([]);
});
