import { startProduct, type Product } from './harness';

let product: Product;
beforeAll(async () => {
  product = await startProduct();
});
afterAll(() => product.stop());

test('a lead takes people in, changes their roles, and a role holds from the next request on', async () => {
  const { lead, reader } = await product.team();
  await reader.post('/regions', { name: 'Mine' }).expect(403);
  await lead.patch(`/members/${reader.id}`, { role: 'analyst' }).expect(200);
  await reader.post('/regions', { name: 'Mine' }).expect(201);
  await lead.delete(`/members/${reader.id}`).expect(204);
  await reader.get('/regions').expect(403);
});

test('the last lead stays lead', async () => {
  const lead = await product.signIn('lena');
  const refused = await lead.patch(`/members/${lead.id}`, { role: 'reader' }).expect(409);
  expect(refused.body.detail).toMatch(/only lead/);
  await lead.delete(`/members/${lead.id}`).expect(409);
});

test('a login that nobody has signed in with is named as such', async () => {
  const lead = await product.signIn('lena');
  const refused = await lead.post('/members', { login: 'nobody-yet', role: 'reader' }).expect(422);
  expect(refused.body).toMatchObject({ field: 'login', detail: expect.stringMatching(/sign in once/) });
});
