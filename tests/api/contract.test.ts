import supertest from 'supertest';
import { ENDPOINTS } from '@/shared/contract/endpoints';
import { PROBLEMS } from '@/shared/contract/problem';
import { PERMISSIONS } from '@/shared/contract/permissions';
import { apiRoutes } from '@/server/routes/api';
import { makeFixture } from './fixture';
import { startProduct, type Product, type SignedIn } from './harness';

let product: Product;
let lead: SignedIn;
beforeAll(async () => {
  product = await startProduct();
  await product.startWorker();
  lead = await product.signIn('lena');
});
afterAll(() => product.stop());

test('every JSON route of the server is in the table of endpoints, and the other way round', () => {
  const served = apiRoutes().stack.flatMap(({ route }) =>
    route ? route.stack.map(({ method }) => `${method} ${route.path}`) : [],
  );
  const elsewhere = (path: string) =>
    path.startsWith('/uploads') || ['/events', '/health', '/openapi.json'].includes(path);
  const listed = ENDPOINTS.filter((e) => !elsewhere(e.path)).map((e) => `${e.method} ${e.path}`);
  expect(served.sort()).toEqual(listed.sort());
});

test('what the server answers is what the contract says', async () => {
  const f = await makeFixture(product, lead);
  await lead.patch(`/shells/${f.shellId}`, { adoptedFitId: f.fitId }).expect(200);
  await lead.post(`/shells/${f.shellId}/distances`, { pc: 900, method: 'kinematic' }).expect(201);
  const ids: Record<string, string> = { ...f, channel: '3' };
  const json = ENDPOINTS.filter((e) => e.method === 'get' && e.answer.schema);
  expect(json.length).toBeGreaterThan(15);
  for (const e of json) {
    const path = e.path.replace(/:(\w+)/g, (_, name: string) => ids[name]!);
    const answer = await lead.get(path);
    expect([e.path, answer.status]).toEqual([e.path, e.answer.status]);
    const parsed = e.answer.schema!.safeParse(answer.body);
    expect([e.path, parsed.error?.issues ?? []]).toEqual([e.path, []]);
  }
});

test('the OpenAPI document names every route, every schema it uses, and the problem body', async () => {
  const { body } = await supertest(product.url).get('/api/v1/openapi.json').expect(200);
  expect(body.openapi).toBe('3.1.0');
  const described = Object.entries(body.paths as Record<string, object>).flatMap(([path, methods]) =>
    Object.keys(methods).map((m) => `${m} ${path.replace(/\{(\w+)\}/g, ':$1')}`),
  );
  expect(described.sort()).toEqual(ENDPOINTS.map((e) => `${e.method} ${e.path}`).sort());
  const text = JSON.stringify(body);
  for (const [, name] of text.matchAll(/"#\/components\/schemas\/(\w+)"/g))
    expect(body.components.schemas).toHaveProperty(name!);
});

test('health answers before sign-in and names the parts', async () => {
  const { body } = await supertest(product.url).get('/api/v1/health').expect(200);
  expect(body).toEqual({
    status: 'ok',
    database: 'ok',
    queue: { waiting: expect.any(Number), running: expect.any(Number), workers: 1 },
    version: product.parts.config.codeVersion,
  });
});

test('an unknown address of the API is a problem, not a page', async () => {
  const answer = await lead.get('/stars').expect(404);
  expect(answer.headers['content-type']).toMatch(/problem\+json/);
  await lead.get('/cubes/not-an-id').expect(404);
});

test('what we did not foresee answers 500 with a number and no inner text', async () => {
  const broken = await startProduct();
  const person = await broken.signIn('lena');
  await broken.parts.db.raw('alter table regions rename to regions_away');
  const answer = await person.get('/regions').expect(500);
  expect(answer.body).toMatchObject({ type: '/problems/internal', requestId: expect.any(String) });
  expect(JSON.stringify(answer.body)).not.toMatch(/relation|regions_away|select/);
  await broken.stop();
});

test('every problem has an HTTP status and a title that a person understands', () => {
  for (const { status, title } of Object.values(PROBLEMS)) {
    expect(status).toBeGreaterThanOrEqual(400);
    expect(title).toMatch(/^[A-Z].*[^.]$/);
  }
});

test('the table of roles is the one that was agreed', () => {
  const may = (role: string) =>
    Object.entries(PERMISSIONS)
      .filter(([, roles]) => (roles as readonly string[]).includes(role))
      .map(([action]) => action);
  expect(may('reader')).toEqual(['region.read', 'cube.read', 'shell.read']);
  expect(may('reviewer')).toEqual(['region.read', 'cube.read', 'shell.read', 'reading.write', 'fit.run']);
  expect(may('lead')).toHaveLength(Object.keys(PERMISSIONS).length);
  expect(may('analyst')).toEqual(may('lead').filter((a) => a !== 'team.manage'));
});
