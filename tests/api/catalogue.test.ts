import {
  finishedFit,
  makeFixture,
  newRegion,
  newShell,
  readyCube,
  saveMarks,
  type Fixture as Made,
} from './fixture';
import { marksOnRing } from './cubeFile';
import { startProduct, type Product, type SignedIn } from './harness';

type Fixture = Omit<Made, 'traceId' | 'imageId'>;

let product: Product;
let lead: SignedIn;
let near: Fixture;
let far: Fixture;
const names = async (query: string) =>
  (await lead.get(`/shells?${query}`).expect(200)).body.items.map((s: { name: string }) => s.name);

async function adopted(regionId: string, cubeId: string, name: string, channels: number[]): Promise<Fixture> {
  const shellId = await newShell(lead, regionId);
  await lead.patch(`/shells/${shellId}`, { name }).expect(200);
  const readingId = await saveMarks(
    lead,
    shellId,
    cubeId,
    channels.flatMap((k) => marksOnRing(k)),
  );
  const fitId = await finishedFit(lead, shellId, readingId);
  await lead.patch(`/shells/${shellId}`, { adoptedFitId: fitId }).expect(200);
  return { regionId, cubeId, shellId, readingId, fitId };
}

beforeAll(async () => {
  product = await startProduct();
  await product.startWorker();
  lead = await product.signIn('lena');
  const region = (await lead.post('/regions', { name: 'Near', distance: { pc: 1000, errorPc: 100 } })).body
    .id;
  const cubeId = await readyCube(product, lead, region);
  near = await adopted(region, cubeId, 'Wide ring', [9, 12, 16, 20, 23]);
  const other = await newRegion(lead, 'Afar');
  far = await adopted(other, await readyCube(product, lead, other), 'Arc of = dust', [8, 11, 14, 18, 21]);
  await newShell(lead, region);
}, 60_000);
afterAll(() => product.stop());

test('it holds the shells with an adopted fit, or all of them', async () => {
  expect((await names('')).sort()).toEqual(['Arc of = dust', 'Wide ring']);
  expect((await names('adopted=any')).sort()).toEqual(['Arc of = dust', 'Trial ring', 'Wide ring']);
});

test('sorting goes both ways; rows without the value come last in either', async () => {
  expect(await names('sort=name')).toEqual(['Arc of = dust', 'Wide ring']);
  expect(await names('sort=name&order=down')).toEqual(['Wide ring', 'Arc of = dust']);
  expect(await names('sort=radius')).toEqual(['Wide ring', 'Arc of = dust']);
  expect(await names('sort=radius&order=down')).toEqual(['Wide ring', 'Arc of = dust']);
});

test('filters by region, text, status and derived numbers', async () => {
  expect(await names(`region=${far.regionId}`)).toEqual(['Arc of = dust']);
  expect(await names(`region=${far.regionId}&region=${near.regionId}&sort=name`)).toHaveLength(2);
  expect(await names('search=WIDE')).toEqual(['Wide ring']);
  expect(await names('search=GSH%20120')).toHaveLength(2);
  expect(await names('status=accepted')).toEqual([]);
  expect(await names('radiusMin=1')).toEqual(['Wide ring']);
  expect(await names('vExpMin=100')).toEqual([]);
});

test('pages do not overlap, and a cursor of another query is refused', async () => {
  const first = (await lead.get('/shells?sort=name&limit=1').expect(200)).body;
  expect(first).toMatchObject({ total: 2, next: expect.any(String) });
  const second = (await lead.get(`/shells?sort=name&limit=1&cursor=${first.next}`).expect(200)).body;
  expect(second.next).toBeNull();
  expect([first.items[0].name, second.items[0].name]).toEqual(['Arc of = dust', 'Wide ring']);
  await lead.get(`/shells?sort=vExp&limit=1&cursor=${first.next}`).expect(422);
  await lead.get('/shells?sort=colour').expect(422);
});

test('a distance of the shell comes before that of the region, and the newest one holds', async () => {
  await lead
    .post(`/shells/${near.shellId}/distances`, { pc: 500, errorPc: 20, method: 'parallax' })
    .expect(201);
  await lead.post(`/shells/${near.shellId}/distances`, { pc: 2000, method: 'kinematic' }).expect(201);
  const shell = (await lead.get(`/shells/${near.shellId}`)).body;
  expect(shell.adopted.distance).toEqual({ pc: 2000, errorPc: null, source: 'shell' });
  expect(
    (await lead.get(`/shells/${near.shellId}/distances`)).body.items.map((d: { pc: number }) => d.pc),
  ).toEqual([2000, 500]);
  await lead.post(`/shells/${near.shellId}/distances`, { pc: -1, method: 'guess' }).expect(422);
});

test('the CSV has the same rows, numbers in full, and no cell that a spreadsheet would run', async () => {
  await lead.patch(`/shells/${far.shellId}`, { name: '=cmd()' }).expect(200);
  const { text } = await lead
    .get('/shells.csv?sort=name')
    .expect(200)
    .expect('content-type', /text\/csv/);
  const [head, ...lines] = text
    .trim()
    .split('\r\n')
    .map((l: string) => l.split(','));
  const column = (line: string[], name: string) => line[head!.indexOf(name)];
  expect(lines).toHaveLength(2);
  expect(lines.map((l: string[]) => column(l, 'name')).sort()).toEqual(["'=cmd()", 'Wide ring']);
  const shell = (await lead.get(`/shells/${near.shellId}`)).body;
  const wide = lines.find((l: string[]) => column(l, 'name') === 'Wide ring')!;
  expect(Number(column(wide, 'v_exp_km_s'))).toBe(shell.adopted.vExp.value);
  expect(Number(column(wide, 'age_factor'))).toBe(0.6);
});

test('only a finished fit of the same shell is adopted, and adoption can be taken back', async () => {
  await lead.patch(`/shells/${near.shellId}`, { adoptedFitId: far.fitId }).expect(404);
  const queued = (await lead.post(`/shells/${near.shellId}/fits`, { readingId: near.readingId })).body.id;
  await product.parts
    .db('fits')
    .where({ id: queued })
    .whereNot({ status: 'done' })
    .update({ status: 'cancelled', progress: null, activity: null });
  const { status } = (await lead.get(`/fits/${queued}`)).body;
  if (status === 'cancelled')
    await lead.patch(`/shells/${near.shellId}`, { adoptedFitId: queued }).expect(409);
  expect(
    (await lead.patch(`/shells/${near.shellId}`, { adoptedFitId: null }).expect(200)).body,
  ).toMatchObject({ designation: null, adopted: null });
  await lead.patch(`/shells/${near.shellId}`, { adoptedFitId: near.fitId }).expect(200);
});

test('a fit keeps its marks when the reading goes on', async () => {
  const made = await makeFixture(product, lead);
  await saveMarks(lead, made.shellId, made.cubeId, []);
  const frozen = (await lead.get(`/fits/${made.fitId}/marks`)).body;
  expect(frozen.marks).toHaveLength(40);
  expect(frozen.marks[0]).toMatchObject({ channel: 10, l: expect.any(Number), velocity: -46 });
});
