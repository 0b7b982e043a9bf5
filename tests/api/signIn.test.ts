import supertest from 'supertest';
import { startProduct, type Product } from './harness';

let product: Product;
beforeAll(async () => {
  product = await startProduct();
});
afterAll(() => product.stop());

test('the first person of an empty installation leads a new team, the next one is in none', async () => {
  const first = await product.signIn('lena');
  const second = await product.signIn('stella');
  expect((await first.get('/me').expect(200)).body).toMatchObject({
    login: 'lena',
    role: 'lead',
    team: { name: expect.any(String) },
  });
  expect((await second.get('/me').expect(200)).body).toMatchObject({ role: null, team: null });
  const refused = await second.get('/regions').expect(403);
  expect(refused.body.detail).toMatch(/Ask a lead/);
});

test('without sign-in every route but health and the API document answers 401 as problem+json', async () => {
  const anonymous = supertest(product.url);
  await anonymous.get('/api/v1/health').expect(200);
  await anonymous.get('/api/v1/openapi.json').expect(200);
  const refused = await anonymous.get('/api/v1/regions').expect(401);
  expect(refused.headers['content-type']).toMatch(/application\/problem\+json/);
  expect(refused.body).toMatchObject({ type: '/problems/not-signed-in', status: 401 });
});

test('the session is a new one after sign-in, httpOnly and SameSite', async () => {
  const agent = supertest.agent(product.url);
  const begun = await agent.get('/auth/github').expect(302);
  const before = String(begun.headers['set-cookie']);
  expect(before).toMatch(/HttpOnly/i);
  expect(before).toMatch(/SameSite=Lax/i);
  const asked = new URL(begun.headers.location!, product.url);
  const chosen = await agent
    .post(asked.pathname)
    .type('form')
    .send({ ...Object.fromEntries(asked.searchParams), login: 'lena' });
  const back = new URL(chosen.headers.location!, product.url);
  const done = await agent.get(back.pathname + back.search).expect(302);
  const after = String(done.headers['set-cookie']);
  const sid = (cookie: string) => /outswell=([^;]+)/.exec(cookie)![1];
  expect(sid(after)).not.toBe(sid(before));
});

test('a forged state is refused and nobody is signed in', async () => {
  const agent = supertest.agent(product.url);
  const begun = await agent.get('/auth/github').expect(302);
  const asked = new URL(begun.headers.location!, product.url);
  const chosen = await agent
    .post(asked.pathname)
    .type('form')
    .send({ ...Object.fromEntries(asked.searchParams), login: 'lena' });
  const back = new URL(chosen.headers.location!, product.url);
  back.searchParams.set('state', 'forged');
  const answer = await agent.get(back.pathname + back.search);
  expect(answer.headers.location).toMatch(/^\/sign-in\?problem=/);
  await agent.get('/api/v1/me').expect(401);
});

test('a write without the CSRF token is refused and writes nothing; reading needs none', async () => {
  const lead = await product.signIn('lena');
  const forged = await lead.agent.post('/api/v1/regions').send({ name: 'Forged' }).expect(403);
  expect(forged.body.type).toBe('/problems/csrf');
  expect((await lead.get('/regions')).body.total).toBe(0);
});

test('signing out ends the session at once', async () => {
  const lead = await product.signIn('lena');
  await lead.agent.post('/auth/sign-out').expect(403);
  await lead.agent.post('/auth/sign-out').set('X-CSRF-Token', lead.csrf).expect(204);
  await lead.get('/me').expect(401);
});

test.each([
  ['/regions', '/regions'],
  ['https://elsewhere.example/', '/'],
  ['//elsewhere.example/', '/'],
  ['/\\elsewhere.example', '/'],
])('sign-in with to=%s comes back to %s', async (to, expected) => {
  const agent = supertest.agent(product.url);
  const begun = await agent.get('/auth/github').query({ to }).expect(302);
  const asked = new URL(begun.headers.location!, product.url);
  const chosen = await agent
    .post(asked.pathname)
    .type('form')
    .send({ ...Object.fromEntries(asked.searchParams), login: 'lena' });
  const back = new URL(chosen.headers.location!, product.url);
  const done = await agent.get(back.pathname + back.search).expect(302);
  expect(done.headers.location).toBe(expected);
});

test('a personal access token signs a script in, needs no CSRF token, and ends when it is revoked', async () => {
  const lead = await product.signIn('lena');
  const made = (await lead.post('/tokens', { name: 'notebook' }).expect(201)).body;
  const script = (path: string) =>
    supertest(product.url).get(`/api/v1${path}`).set('Authorization', `Bearer ${made.secret}`);
  expect((await script('/me').expect(200)).body).toMatchObject({ login: 'lena', csrfToken: null });
  await supertest(product.url)
    .post('/api/v1/regions')
    .set('Authorization', `Bearer ${made.secret}`)
    .send({ name: 'By script' })
    .expect(201);
  expect((await lead.get('/tokens')).body.items[0]).not.toHaveProperty('secret');
  await lead.delete(`/tokens/${made.id}`).expect(204);
  await script('/me').expect(401);
});
