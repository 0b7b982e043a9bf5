import express from 'express';
import request from 'supertest';
import { oauthProvider, CALLBACK_PATH } from './oauthProvider';

let clock = 1_700_000_000_000;
const people = [
  { login: 'ansa', name: 'Ansa <Verrill>', email: 'ansa@example.org', role: 'lead' },
  { login: 'bram', name: 'Bram Ostrevant', email: 'bram@example.org', role: 'analyst' },
];
const client = { clientId: 'outswell-local', clientSecret: 'a secret' };
const app = express();
app.use('/oauth', oauthProvider({ env: 'test', people, ...client, now: () => clock }));

const host = 'shells.example.org';
const callback = `http://${host}${CALLBACK_PATH}`;
const asked = { client_id: client.clientId, redirect_uri: callback, state: 'xyz', response_type: 'code' };

const get = (path: string) => request(app).get(`/oauth${path}`).set('host', host);
const post = (path: string, form: Record<string, string>) =>
  request(app).post(`/oauth${path}`).set('host', host).type('form').send(form);

async function codeFor(login: string): Promise<string> {
  const answer = await post('/authorize', { ...asked, login }).expect(302);
  return new URL(answer.headers.location!).searchParams.get('code')!;
}

const exchange = (code: string, other: Record<string, string> = {}) =>
  post('/token', {
    grant_type: 'authorization_code',
    code,
    redirect_uri: callback,
    client_id: client.clientId,
    client_secret: client.clientSecret,
    ...other,
  });

test('a person who chooses a name is sent back and can be read with the token', async () => {
  const page = await get('/authorize').query(asked).expect(200);
  expect(page.text).toContain('Bram Ostrevant');
  const answer = await post('/authorize', { ...asked, login: 'bram' }).expect(302);
  const back = new URL(answer.headers.location!);
  expect(back.origin + back.pathname).toBe(callback);
  expect(back.searchParams.get('state')).toBe('xyz');
  const { body } = await exchange(back.searchParams.get('code')!).expect(200);
  expect(body).toMatchObject({ token_type: 'bearer' });
  const bearer = `Bearer ${body.access_token}`;
  const user = await get('/user').set('authorization', bearer).expect(200);
  expect(user.body).toMatchObject({ login: 'bram', name: 'Bram Ostrevant' });
  const emails = await get('/user/emails').set('authorization', bearer).expect(200);
  expect(emails.body).toEqual([{ email: 'bram@example.org', primary: true, verified: true }]);
});

test('somebody new types a login and keeps the same number', async () => {
  const userOf = async (login: string) => {
    const { body } = await exchange(await codeFor(login));
    return (await get('/user').set('authorization', `Bearer ${body.access_token}`)).body;
  };
  const first = await userOf('New-Person');
  expect(first).toMatchObject({ login: 'new-person', id: expect.any(Number) });
  expect((await userOf('new-person')).id).toBe(first.id);
  expect((await userOf('other')).id).not.toBe(first.id);
});

test('the page needs no script, names its controls and escapes what it shows', async () => {
  const { text, headers } = await get('/authorize')
    .query({ ...asked, state: '"><script>' })
    .expect(200);
  expect(text).not.toContain('<script');
  expect(text).toContain('Ansa &#60;Verrill&#62;');
  expect(text).toContain('<label for="login">');
  expect(headers['content-security-policy']).toContain("default-src 'none'");
});

test('someone who would rather not is sent back with access_denied', async () => {
  const answer = await post('/authorize', { ...asked, decision: 'cancel' }).expect(302);
  expect(answer.headers.location).toBe(`${callback}?state=xyz&error=access_denied`);
});

test.each(['', '-a', 'a-', 'a b', 'é', 'x'.repeat(40), '../x'])(
  'the login %j is refused on the page',
  async (login) => {
    const { text } = await post('/authorize', { ...asked, login }).expect(422);
    expect(text).toContain('role="alert"');
  },
);

test.each([
  ['another client', { client_id: 'somebody' }],
  ['another host', { redirect_uri: `http://evil.example.org${CALLBACK_PATH}` }],
  ['another path', { redirect_uri: `http://${host}/elsewhere` }],
  ['another scheme', { redirect_uri: `javascript://${host}${CALLBACK_PATH}` }],
  ['a user name in the address', { redirect_uri: `http://${host}@evil.example.org${CALLBACK_PATH}` }],
  ['no address', { redirect_uri: '' }],
])('%s gets a page and no redirect', async (_, change) => {
  await get('/authorize')
    .query({ ...asked, ...change })
    .expect(400);
  const answer = await post('/authorize', { ...asked, login: 'bram', ...change }).expect(400);
  expect(answer.headers.location).toBeUndefined();
});

describe('a code', () => {
  test('is good once', async () => {
    const code = await codeFor('bram');
    await exchange(code).expect(200);
    await exchange(code).expect(400, { error: 'invalid_grant' });
  });

  test('is good for a minute', async () => {
    const code = await codeFor('bram');
    clock += 60_000;
    await exchange(code).expect(400, { error: 'invalid_grant' });
  });

  test.each([
    ['another address', { redirect_uri: `${callback}?x` }, 400, 'invalid_grant'],
    ['a wrong secret', { client_secret: 'guess' }, 401, 'invalid_client'],
    ['another client', { client_id: 'somebody' }, 401, 'invalid_client'],
    ['another grant type', { grant_type: 'password' }, 400, 'unsupported_grant_type'],
  ])('is worth nothing with %s', async (_, change, status, error) => {
    await exchange(await codeFor('bram'), change).expect(status, { error });
  });

  test('that was made up is worth nothing', async () => {
    await exchange('made-up').expect(400, { error: 'invalid_grant' });
  });
});

test.each(['', 'Bearer abc', 'Basic abc'])(
  'nobody is told with the authorization %j',
  async (authorization) => {
    await get('/user').set('authorization', authorization).expect(401);
    await get('/user/emails').set('authorization', authorization).expect(401);
  },
);

test('a token ends after an hour', async () => {
  const { body } = await exchange(await codeFor('bram'));
  clock += 3_600_000;
  await get('/user').set('authorization', `Bearer ${body.access_token}`).expect(401);
});

test('production refuses it', () => {
  expect(() => oauthProvider({ env: 'production', people, ...client })).toThrow(/production refuses/);
});
