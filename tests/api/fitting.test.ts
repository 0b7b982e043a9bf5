/** The fit of record through the real queue: its draws, what it may be told, how it is stopped. */
import type { Fit, FitDraws, FrozenMarks } from '@/shared/contract/fits';
import { fitShell } from '@/shared/shell/fit';
import { engineInput } from '@/server/services/engineInput';
import { marksOnRing, SHELL } from './cubeFile';
import { finishedFit, MARKS, newRegion, newShell, readyCube, saveMarks } from './fixture';
import { startProduct, until, type Product, type SignedIn } from './harness';
import { listen } from './listening';

let product: Product;
let lead: SignedIn;
let regionId: string;
let cubeId: string;
let shellId: string;
let readingId: string;
beforeAll(async () => {
  product = await startProduct();
  await product.startWorker();
  lead = await product.signIn('lena');
  regionId = await newRegion(lead);
  cubeId = await readyCube(product, lead, regionId);
  shellId = await newShell(lead, regionId);
  readingId = await saveMarks(lead, shellId, cubeId);
}, 60_000);
afterAll(() => product.stop());

const fitOf = async (id: string): Promise<Fit> => (await lead.get(`/fits/${id}`).expect(200)).body;
const fitted = async (rest: object = {}) => fitOf(await finishedFit(lead, shellId, readingId, rest));

test('500 draws are the rule; they are the same bits as on one thread, and the intervals are theirs', async () => {
  const fit = await fitted();
  expect(fit).toMatchObject({
    errorBars: 'bootstrap',
    options: { bootstrap: 500, seed: 1 },
    progress: null,
    activity: null,
    traceId: null,
  });
  const draws: FitDraws = (await lead.get(`/fits/${fit.id}/draws`).expect(200)).body;
  expect(draws.names).toEqual(fit.correlation!.names);
  expect(draws.rows).toHaveLength(500);

  const frozen: FrozenMarks = (await lead.get(`/fits/${fit.id}/marks`).expect(200)).body;
  let alone = new Float64Array();
  fitShell(engineInput(frozen, fit.options), {
    bootstrap: 500,
    optimiser: 'record',
    onDraws: (values) => (alone = values as Float64Array<ArrayBuffer>),
  });
  expect(draws.rows.flat()).toEqual([...alone].map((v) => (Number.isFinite(v) ? v : null)));

  const theta = draws.rows.map((row) => row[draws.names.indexOf('theta')]!).sort((a, b) => a - b);
  expect(fit.parameters!.theta!.lo).toBe(theta[Math.round(0.1587 * 499)]);
  expect(fit.parameters!.theta!.hi).toBe(theta[Math.round(0.8413 * 499)]);
});

test('a fit begins where it is told to, keeps that, and finds the same shell', async () => {
  const start = { theta: 1.6, vSys: -44, vExp: 17 };
  const [usual, begun] = [
    await fitted({ options: { bootstrap: 0 } }),
    await fitted({ options: { bootstrap: 0, start } }),
  ];
  expect(begun.options.start).toEqual(start);
  expect(begun.provenance!.startValues.vSys).toBe(-44);
  expect(usual.options.start).toBeUndefined();
  expect(usual.provenance!.startValues.vSys).not.toBe(-44);
  expect(begun.parameters!.theta!.value).toBeCloseTo(usual.parameters!.theta!.value, 6);
  for (const wrong of [{ theta: 0 }, { theta: 90 }, { vExp: -1 }]) {
    const refused = await lead
      .post(`/shells/${shellId}/fits`, { readingId, options: { start: { ...start, ...wrong } } })
      .expect(422);
    expect(refused.body.field).toBe(`options.start.${Object.keys(wrong)[0]}`);
  }
});

test('where there are no draws the answer says why and what to do', async () => {
  const plain = await fitted({ options: { bootstrap: 0 } });
  expect(plain.errorBars).toBe('covariance');
  const none = await lead.get(`/fits/${plain.id}/draws`).expect(404);
  expect(none.body.type).toBe('/problems/not-found');
  expect(none.body.detail).toMatch(/without the bootstrap.*options\.bootstrap/);
});

test('the channels of what is left out come from the marks', async () => {
  const { extra, rings } = await fitted({ options: { bootstrap: 0 } });
  expect(rings!.map((r) => r.channel)).toEqual([10, 13, 16, 19, 22]);
  expect(extra!.leaveOneOut!.map((l) => l.channel)).toEqual([10, 13, 16, 19, 22]);
  expect(extra!.profiles!.map((p) => p.parameter).sort()).toEqual(['theta', 'vExp']);
  expect(extra!.comparison!.models.map((m) => m.model)).toEqual(
    expect.arrayContaining(['sphere', 'drifting', 'elliptical']),
  );
});

test('a held parameter stays where it is held, and the fit says so', async () => {
  const options = { bootstrap: 0, constraints: { vExp: { fixed: 9.5 }, theta: { low: 0.5, high: 2 } } };
  const fit = await fitted({ options });
  expect(fit.options.constraints).toEqual(options.constraints);
  expect(fit.parameters!.vExp).toMatchObject({ value: 9.5, constraint: { fixed: 9.5 } });
  expect(fit.parameters!.theta!.value).toBeCloseTo(SHELL.theta, 1);
});

describe('what cannot be is refused by the name of its field, and nothing is stored', () => {
  test.each([
    [
      'bounds that leave nothing',
      'sphere',
      { constraints: { vExp: { low: 12, high: 8 } } },
      'options.constraints.vExp.low',
    ],
    [
      'a negative radius',
      'sphere',
      { constraints: { theta: { fixed: -1 } } },
      'options.constraints.theta.fixed',
    ],
    [
      'held and bounded',
      'sphere',
      { constraints: { theta: { fixed: 1, low: 0 } } },
      'options.constraints.theta',
    ],
    [
      'a prior without width',
      'sphere',
      { constraints: { vSys: { prior: { mean: -40, sd: 0 } } } },
      'options.constraints.vSys.prior.sd',
    ],
    [
      'a parameter of another model',
      'sphere',
      { constraints: { driftL: { fixed: 0 } } },
      'options.constraints.driftL',
    ],
    [
      'a parameter that there is not',
      'sphere',
      { constraints: { mass: { fixed: 0 } } },
      'options.constraints',
    ],
    [
      'v_sys said twice',
      'sphere',
      { vSys: { value: -40 }, constraints: { vSys: { fixed: -40 } } },
      'options.constraints.vSys',
    ],
    ['a cap without v_sys', 'cap', {}, 'options.vSys'],
  ])('%s', async (_name, model, options, field) => {
    const before = (await lead.get(`/shells/${shellId}/fits`)).body.total;
    const refused = await lead.post(`/shells/${shellId}/fits`, { readingId, model, options }).expect(422);
    expect(refused.body).toMatchObject({ type: '/problems/invalid-input', field });
    expect((await lead.get(`/shells/${shellId}/fits`)).body.total).toBe(before);
  });
});

test('a long fit tells how far it is, and stops when it is told to', async () => {
  const mine = listen(product, lead);
  await mine.open;
  const many = await newShell(lead, regionId);
  // 9500 marks, 5000 draws: minutes of work
  const marks = Array.from({ length: 19 }, (_, i) => marksOnRing(i + 7, 500)).flat();
  const reading = await saveMarks(lead, many, cubeId, marks);
  const draft = { readingId: reading, options: { bootstrap: 5000 } };
  const { id } = (await lead.post(`/shells/${many}/fits`, draft).expect(202)).body;
  const running = await until(
    () => fitOf(id),
    (fit) => fit.status !== 'queued' && (fit.progress ?? 1) > 0.05,
    60_000,
  );
  expect(running).toMatchObject({
    status: 'running',
    activity: expect.stringMatching(/5000 drawn readings/),
  });
  await lead.get(`/fits/${id}/draws`).expect(404);
  expect((await lead.post(`/fits/${id}/cancel`).expect(202)).body).toMatchObject({
    status: 'cancelled',
    progress: null,
    activity: null,
  });
  // the threads end with it: the queue is idle at once, and the next fit has them
  await until(
    async () => (await lead.get('/health')).body.queue.running,
    (jobs) => jobs === 0,
    5000,
  );
  await fitted();
  expect(await fitOf(id)).toMatchObject({ status: 'cancelled', problem: null });
  const told = mine.events.filter((e) => e.subject === 'fit' && e.id === id && e.progress !== undefined);
  expect(told.length).toBeGreaterThan(1);
  expect(told.map((e) => e.progress)).toEqual(told.map((e) => e.progress).sort((a, b) => a! - b!));
  expect(told.at(-1)).toMatchObject({ status: 'running', activity: expect.stringMatching(/drawn readings/) });
  mine.close();
}, 120_000);

test('the database refuses to change a finished fit, how far it is included', async () => {
  const { id } = await fitted({ options: { bootstrap: 0 } });
  const { db } = product.parts;
  await expect(db('fits').where({ id }).update({ progress: 0.5 })).rejects.toThrow(
    /not changed once written/,
  );
  await expect(
    db('fits')
      .where({ id })
      .update({ draws: Buffer.alloc(8) }),
  ).rejects.toThrow(/not changed once written/);
});

test('what a person said of a mark is kept by the reading, by a conflict, and by the fit', async () => {
  const shell = await newShell(lead, regionId);
  const marks = MARKS.map((mark, i) => ({ ...mark, id: `m${i}` }));
  const said = { unsure: true, note: 'behind the bright knot', placed: 'suggested' };
  Object.assign(marks[3]!, said);
  const reading = await saveMarks(lead, shell, cubeId, marks);
  expect((await lead.get(`/shells/${shell}/readings/mine`)).body.marks).toEqual(marks);
  const stale = await lead
    .put(`/shells/${shell}/readings/mine`, { cubeId, marks: [marks[3]], revision: 0 })
    .expect(409);
  expect(stale.body.stored.marks[3]).toMatchObject(said);
  expect(stale.body.yours.marks[0]).toMatchObject(said);
  const id = await finishedFit(lead, shell, reading, { options: { bootstrap: 0 } });
  const frozen: FrozenMarks = (await lead.get(`/fits/${id}/marks`)).body;
  expect(frozen.marks[3]).toMatchObject({ id: 'm3', ...said });
  expect(frozen.marks[4]).not.toHaveProperty('unsure');
});
