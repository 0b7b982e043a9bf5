/** A rim measured from the brightness through the real queue, and the reading that comes of it. */
import type { Fit } from '@/shared/contract/fits';
import type { Trace } from '@/shared/contract/traces';
import { sweep } from '@/server/services/sweep';
import { seededRandom } from '@/shared/random';
import { cubeFile, marksOnRing, noisyShell, SHELL } from './cubeFile';
import {
  finishedFit,
  finishedTrace,
  makeFixture,
  newRegion,
  newShell,
  saveMarks,
  type Fixture,
} from './fixture';
import { startProduct, until, type Product, type SignedIn } from './harness';
import { listen } from './listening';
import { upload } from './uploading';

let product: Product;
let lead: SignedIn;
let analyst: SignedIn;
let f: Fixture;
beforeAll(async () => {
  product = await startProduct();
  await product.startWorker();
  ({ lead, analyst } = await product.team());
  f = await makeFixture(product, lead);
}, 90_000);
afterAll(() => product.stop());

const traceOf = async (id: string): Promise<Trace> => (await lead.get(`/traces/${id}`).expect(200)).body;
const start = (fitId: string, shellId = f.shellId) => lead.post(`/shells/${shellId}/traces`, { fitId });
const SIZE = { nx: 64, ny: 60, channels: 32 };
async function uploaded(regionId: string, bytes: Buffer): Promise<string> {
  const { cubeId } = await upload(lead, product.url, regionId, bytes);
  await until(
    async () => (await lead.get(`/cubes/${cubeId}`)).body.status,
    (status) => status === 'ready',
  );
  return cubeId!;
}
const readings = async () =>
  Number((await product.parts.db('readings').where({ kind: 'traced' }).count())[0]!.count);

test('the rim is found all around, and its fit finds the shell with the errors of a traced rim', async () => {
  const mine = listen(product, lead);
  await mine.open;
  const trace = await traceOf(await finishedTrace(lead, f.shellId, f.fitId));
  expect(trace).toMatchObject({
    fitId: f.fitId,
    cubeId: f.cubeId,
    edge: 'ridge',
    progress: null,
    problem: null,
  });
  const { seen, sectors, beamDeg, noise } = trace.outcome!;
  expect(seen).toBeGreaterThan(0.9);
  expect(beamDeg).toBeCloseTo(0.15, 6);
  expect(noise).toBeGreaterThan(0.015);
  expect(noise).toBeLessThan(0.03);
  expect(mine.events.filter((e) => e.subject === 'trace' && e.id === trace.id).map((e) => e.status)).toEqual(
    expect.arrayContaining(['queued', 'running', 'done']),
  );
  mine.close();

  const id = await finishedFit(lead, f.shellId, trace.readingId!);
  const fit: Fit = (await lead.get(`/fits/${id}`)).body;
  expect(fit).toMatchObject({ traceId: trace.id, readingId: trace.readingId });
  expect(fit.provenance!.marks).toBe(sectors.filter((s) => s.rejected === null).length);
  const { theta, vSys, vExp } = fit.parameters!;
  expect(Math.abs(theta!.value / SHELL.theta - 1)).toBeLessThan(0.03);
  expect(Math.abs(vExp!.value / SHELL.vExp - 1)).toBeLessThan(0.08);
  expect(Math.abs(vSys!.value - SHELL.vSys)).toBeLessThan(1);
  // a tenth of the beam, 3 % and 0.3 km/s at the least
  expect(theta!.se).toBeGreaterThanOrEqual(0.1 * 0.15);
  expect(vExp!.se).toBeGreaterThanOrEqual(0.03 * vExp!.value * 0.999);
  expect(vSys!.se).toBeGreaterThanOrEqual(0.3);
  // from that fit the rim can be traced again
  await finishedTrace(lead, f.shellId, id);
});

test('it leaves alone what people marked by hand', async () => {
  const before = (await lead.get(`/shells/${f.shellId}/readings/mine`)).body;
  expect(before).toMatchObject({ id: f.readingId, revision: 1 });
  expect((await lead.get(`/shells/${f.shellId}`)).body.readings).toHaveLength(1);
  // somebody who has marked nothing, and had the rim traced, still has marked nothing
  const traceId = await finishedTrace(analyst, f.shellId, f.fitId);
  expect((await analyst.get(`/shells/${f.shellId}/readings/mine`)).body).toMatchObject({
    id: null,
    marks: [],
  });
  const own = await saveMarks(analyst, f.shellId, f.cubeId, marksOnRing(16));
  expect((await analyst.get(`/shells/${f.shellId}/readings/mine`)).body).toMatchObject({
    id: own,
    revision: 1,
  });
  expect((await lead.get(`/shells/${f.shellId}`)).body.readings).toHaveLength(2);
  const { readingId } = await traceOf(traceId);
  await expect(product.parts.db('readings').where({ id: readingId }).update({ marks: '[]' })).rejects.toThrow(
    /not changed once written/,
  );
  await expect(product.parts.db('traces').where({ id: traceId }).update({ edge: 'inner' })).rejects.toThrow(
    /not changed once written/,
  );
});

test('the list is newest first', async () => {
  const id = await finishedTrace(lead, f.shellId, f.fitId);
  const { items } = (await lead.get(`/shells/${f.shellId}/traces`)).body as { items: Trace[] };
  expect(items[0]!.id).toBe(id);
  expect(items.map((t) => t.createdAt)).toEqual(
    items
      .map((t) => t.createdAt)
      .sort()
      .reverse(),
  );
});

test('where nothing is to be found the trace says so, and there is no reading', async () => {
  const regionId = await newRegion(lead, 'Empty field');
  const random = seededRandom(7);
  const cubeId = await uploaded(regionId, cubeFile({ ...SIZE, value: () => random.normal() }));
  const shellId = await newShell(lead, regionId);
  const fitId = await finishedFit(lead, shellId, await saveMarks(lead, shellId, cubeId));
  const before = await readings();
  const { id } = (await start(fitId, shellId).expect(202)).body;
  const trace = await until(
    () => traceOf(id),
    ({ status }) => status === 'failed' || status === 'done',
  );
  expect(trace).toMatchObject({
    status: 'failed',
    outcome: null,
    readingId: null,
    problem: { type: '/problems/marks-insufficient', field: 'fitId' },
  });
  expect(await readings()).toBe(before);
});

describe('what cannot be traced is refused, and nothing is stored', () => {
  let g: Fixture;
  beforeAll(async () => {
    g = await makeFixture(product, lead);
  }, 60_000);
  const total = async () => (await lead.get(`/shells/${g.shellId}/traces`)).body.total;

  test('an edge that there is not', async () => {
    const refused = await lead
      .post(`/shells/${g.shellId}/traces`, { fitId: g.fitId, edge: 'outer' })
      .expect(422);
    expect(refused.body.field).toBe('edge');
  });

  test('a fit of another shell', async () => {
    await start(f.fitId, g.shellId).expect(404);
  });

  test('a fit that is not done', async () => {
    const { id } = (await lead.post(`/shells/${g.shellId}/fits`, { readingId: g.readingId })).body;
    await product.parts.db.raw(
      `update fits set status = 'cancelled', progress = null, activity = null where id = ? and status <> 'done'`,
      [id],
    );
    const fit = (await lead.get(`/fits/${id}`)).body;
    if (fit.status === 'cancelled') expect((await start(id, g.shellId).expect(409)).body.field).toBe('fitId');
  });

  test('a cube whose axis means something else by now', async () => {
    const rest = 1420405751.768;
    const channel = rest / 299792.458; // 1 km/s
    const axis = { CTYPE3: 'FREQ', CUNIT3: 'Hz', CRVAL3: rest + 56 * channel, CDELT3: -channel };
    const cubeId = await uploaded(g.regionId, cubeFile({ ...SIZE, cards: axis, value: noisyShell }));
    const shellId = await newShell(lead, g.regionId);
    const fitId = await finishedFit(lead, shellId, await saveMarks(lead, shellId, cubeId));
    await lead.patch(`/cubes/${cubeId}/overrides`, { restFrequencyHz: rest * 1.0001 }).expect(200);
    expect((await start(fitId, shellId).expect(409)).body.detail).toMatch(/understood otherwise/);
    await lead.patch(`/cubes/${cubeId}/overrides`, { restFrequencyHz: null }).expect(200);
    await start(fitId, shellId).expect(202);
  });

  test('a cube that is not there', async () => {
    const before = await total();
    await lead.delete(`/cubes/${g.cubeId}`).expect(204);
    expect((await start(g.fitId, g.shellId).expect(409)).body.detail).toMatch(/Put it back/);
    await lead.post(`/cubes/${g.cubeId}/restore`, {}).expect(200);
    expect(await total()).toBe(before);
  });
});

test('a trace that is stopped stays stopped; one whose worker died is taken up again and made once', async () => {
  const { db } = product.parts;
  const insert = async (row: object) => {
    const id = crypto.randomUUID();
    await db('traces').insert({
      ...{ id, shell_id: f.shellId, fit_id: f.fitId, cube_id: f.cubeId, edge: 'ridge', created_by: lead.id },
      ...row,
    });
    return id;
  };
  const stopped = await insert({ status: 'running', lease_holder: 'x', lease_until: '2100-01-01' });
  expect((await lead.post(`/traces/${stopped}/cancel`).expect(202)).body.status).toBe('cancelled');
  expect((await lead.post(`/traces/${stopped}/cancel`).expect(409)).body.detail).toMatch(/cancelled/);

  const lost = await insert({
    status: 'running',
    progress: 0.4,
    lease_holder: 'dead',
    lease_until: '2020-01-01',
  });
  await sweep(product.parts); // the worker's own sweep may have been first
  const trace = await until(
    () => traceOf(lost),
    ({ status }) => status === 'done',
  );
  expect(trace.readingId).not.toBeNull();
  expect(await db('readings').where({ trace_id: lost })).toMatchObject([{ id: trace.readingId }]);
  expect(await db('readings').where({ trace_id: stopped })).toEqual([]);
  expect(await traceOf(stopped)).toMatchObject({ status: 'cancelled', readingId: null });
  const done = await db('events').where({ subject_id: lost, kind: 'trace.done' });
  expect(done).toHaveLength(1);
});
