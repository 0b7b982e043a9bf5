import { marksOnRing } from './cubeFile';
import { MARKS, newRegion, newShell, readyCube, saveMarks } from './fixture';
import { startProduct, type Product, type SignedIn } from './harness';

let product: Product;
let lead: SignedIn;
let regionId: string;
let cubeId: string;
beforeAll(async () => {
  product = await startProduct();
  await product.startWorker();
  lead = await product.signIn('lena');
  regionId = await newRegion(lead);
  cubeId = await readyCube(product, lead, regionId);
});
afterAll(() => product.stop());

const put = (shellId: string, body: object) => lead.put(`/shells/${shellId}/readings/mine`, body);

test('a stale save answers 409 with both sides, and changes nothing', async () => {
  const shellId = await newShell(lead, regionId);
  const [a, b, c] = [MARKS.slice(0, 3), MARKS.slice(0, 5), MARKS.slice(5, 9)];
  await put(shellId, { cubeId, marks: a, revision: 0 }).expect(200);
  await put(shellId, { cubeId, marks: b, revision: 1 }).expect(200);
  const refused = await put(shellId, { cubeId, marks: c, revision: 1 }).expect(409);
  expect(refused.body).toMatchObject({
    type: '/problems/stale-revision',
    stored: { revision: 2 },
    yours: { revision: 1 },
  });
  expect(refused.body.stored.marks).toHaveLength(5);
  expect(refused.body.yours.marks).toHaveLength(4);
  const now = (await lead.get(`/shells/${shellId}/readings/mine`)).body;
  expect(now).toMatchObject({ revision: 2 });
  // the person keeps both: a save that builds on the stored revision
  await put(shellId, { cubeId, marks: [...now.marks, ...c], revision: 2 }).expect(200);
  expect((await lead.get(`/shells/${shellId}/readings/mine`)).body.marks).toHaveLength(9);
});

test('two first saves at the same moment leave one reading and one 409', async () => {
  const shellId = await newShell(lead, regionId);
  const answers = await Promise.all(
    [1, 2].map((n) => put(shellId, { cubeId, marks: MARKS.slice(0, n), revision: 0 })),
  );
  expect(answers.map((a) => a.status).sort()).toEqual([200, 409]);
});

test('nobody sees or overwrites another person\u2019s reading', async () => {
  const shellId = await newShell(lead, regionId);
  await saveMarks(lead, shellId, cubeId);
  const { analyst } = await product.team();
  expect((await analyst.get(`/shells/${shellId}/readings/mine`)).body).toMatchObject({
    id: null,
    marks: [],
    revision: 0,
  });
  await saveMarks(analyst, shellId, cubeId, MARKS.slice(0, 2));
  expect((await lead.get(`/shells/${shellId}/readings/mine`)).body.marks).toHaveLength(MARKS.length);
});

test.each([
  ['a channel the cube does not have', { channel: 32, x: 3, y: 3 }, 'marks.1.channel'],
  ['a channel between two', { channel: 3.5, x: 3, y: 3 }, 'marks.1.channel'],
  ['a place outside the image', { channel: 3, x: 64, y: 3 }, 'marks.1.x'],
  ['a negative error', { channel: 3, x: 3, y: 3, sigma: -1 }, 'marks.1.sigma'],
  ['text for a number', { channel: 3, x: '3', y: 3 }, 'marks.1.x'],
  ['something unknown', { channel: 3, x: 3, y: 3, colour: 'red' }, 'marks.1'],
])('%s is refused, naming the field', async (_name, mark, field) => {
  const shellId = await newShell(lead, regionId);
  const refused = await put(shellId, {
    cubeId,
    marks: [{ channel: 3, x: 3, y: 3 }, mark],
    revision: 0,
  }).expect(422);
  expect(refused.body).toMatchObject({ type: '/problems/invalid-input', field });
  expect((await lead.get(`/shells/${shellId}/readings/mine`)).body.revision).toBe(0);
});

test('NaN in the JSON is named as what it is', async () => {
  const shellId = await newShell(lead, regionId);
  const refused = await lead.agent
    .put(`/api/v1/shells/${shellId}/readings/mine`)
    .set({ 'X-CSRF-Token': lead.csrf, 'Content-Type': 'application/json' })
    .send(`{"cubeId": "${cubeId}", "revision": 0, "marks": [{"channel": 3, "x": NaN, "y": 3}]}`)
    .expect(400);
  expect(refused.body).toMatchObject({
    type: '/problems/malformed-json',
    detail: expect.stringMatching(/NaN/),
  });
});

test('a cube of another region cannot carry the marks', async () => {
  const elsewhere = await newRegion(lead, 'Other field');
  const shellId = await newShell(lead, elsewhere);
  expect((await put(shellId, { cubeId, marks: [], revision: 0 }).expect(422)).body.field).toBe('cubeId');
});

describe('marks that cannot make a shell are refused where the fit is asked for', () => {
  test.each([
    ['one channel only', marksOnRing(16, 12), 'marks-insufficient', /channel/],
    ['two channels', [...marksOnRing(14), ...marksOnRing(16)], 'marks-insufficient', /channel/],
    [
      'a straight line',
      [10, 13, 16, 19].flatMap((k) => [1, 2, 3].map((i) => ({ channel: k, x: 10 + 5 * i, y: 20 + 2 * i }))),
      'marks-degenerate',
      /line/,
    ],
    [
      'one point',
      [10, 13, 16, 19].flatMap((k) => [1, 2].map(() => ({ channel: k, x: 10, y: 20 }))),
      'marks-insufficient',
      /different/,
    ],
    ['no marks', [], 'marks-insufficient', /mark/],
  ])('%s', async (_name, marks, type, words) => {
    const shellId = await newShell(lead, regionId);
    const readingId = await saveMarks(lead, shellId, cubeId, marks);
    const refused = await lead.post(`/shells/${shellId}/fits`, { readingId }).expect(422);
    expect(refused.body).toMatchObject({ type: `/problems/${type}`, detail: expect.stringMatching(words) });
    expect((await lead.get(`/shells/${shellId}/fits`)).body.total).toBe(0);
  });
});
