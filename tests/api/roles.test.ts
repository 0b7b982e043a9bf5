/** Every route, asked by every role, by another team, by somebody in no team, and without sign-in. */
import supertest from 'supertest';
import { ENDPOINTS } from '@/shared/contract/endpoints';
import {
  freshImage,
  leadOfAnotherTeam,
  makeFixture,
  MARKS,
  newImage,
  newShell,
  readyCube,
  type Fixture,
} from './fixture';
import { startProduct, type Product, type SignedIn } from './harness';

type Who = 'lead' | 'analyst' | 'reviewer' | 'reader' | 'otherTeam' | 'stranger';
const WHO: Who[] = ['lead', 'analyst', 'reviewer', 'reader', 'otherTeam', 'stranger'];

let product: Product;
let people: Record<Who, SignedIn>;
let f: Fixture;
beforeAll(async () => {
  product = await startProduct();
  await product.startWorker();
  people = { ...(await product.team()), otherTeam: await leadOfAnotherTeam(product) };
  f = await makeFixture(product, people.lead);
}, 60_000);
afterAll(() => product.stop());

interface Case {
  route: string;
  /** What makes the address, afresh for each person, so that one's success does not stand in another's way. */
  path: (who: SignedIn) => string | Promise<string>;
  body?: (who: SignedIn) => object | Promise<object>;
  /** Statuses in the order of WHO. */
  expected: [number, number, number, number, number, number];
}

const lead = () => people.lead;
const failedCube = async (status: string) => {
  const id = await readyCube(product, lead(), f.regionId);
  await product.parts.db('cubes').where({ id }).update({ status });
  return id;
};
const fitIn = async (status: string) => {
  const { id } = (await lead().post(`/shells/${f.shellId}/fits`, { readingId: f.readingId })).body;
  // made by hand so that no worker takes it meanwhile
  await product.parts.db.raw(
    `update fits set status = ?, outcome = null, progress = null, activity = null where id = ? and status <> 'done'`,
    [status, id],
  );
  return id as string;
};
const traceIn = async (status: string) => {
  const { id } = (await lead().post(`/shells/${f.shellId}/traces`, { fitId: f.fitId })).body;
  await product.parts.db.raw(
    `update traces set status = ?, outcome = null, progress = null where id = ? and status <> 'done'`,
    [status, id],
  );
  return id as string;
};
const READ: Case['expected'] = [200, 200, 200, 200, 404, 403];
const WRITE: Case['expected'] = [200, 200, 403, 403, 404, 403];
const LIST: Case['expected'] = [200, 200, 200, 200, 200, 403];
const NONE = () => ({});

const CASES: Case[] = [
  { route: 'get /me', path: () => '/me', expected: [200, 200, 200, 200, 200, 200] },
  { route: 'get /members', path: () => '/members', expected: LIST },
  {
    route: 'post /members',
    path: () => '/members',
    body: async () => ({
      login: (await product.signIn(`new${Math.random().toString(36).slice(2, 8)}`)).login,
      role: 'reader',
    }),
    expected: [201, 403, 403, 403, 201, 403],
  },
  {
    route: 'patch /members/:personId',
    path: () => `/members/${people.reader.id}`,
    body: () => ({ role: 'reader' }),
    expected: [200, 403, 403, 403, 404, 403],
  },
  {
    route: 'delete /members/:personId',
    path: async () => {
      const guest = await product.signIn(`guest${Math.random().toString(36).slice(2, 8)}`);
      await lead().post('/members', { login: guest.login, role: 'reader' }).expect(201);
      return `/members/${guest.id}`;
    },
    expected: [204, 403, 403, 403, 404, 403],
  },
  { route: 'get /tokens', path: () => '/tokens', expected: [200, 200, 200, 200, 200, 200] },
  {
    route: 'post /tokens',
    path: () => '/tokens',
    body: () => ({ name: 'script' }),
    expected: [201, 201, 201, 201, 201, 201],
  },
  {
    route: 'delete /tokens/:tokenId',
    path: async () => `/tokens/${(await lead().post('/tokens', { name: 'x' })).body.id}`,
    expected: [204, 404, 404, 404, 404, 404],
  },
  { route: 'get /regions', path: () => '/regions', expected: LIST },
  {
    route: 'post /regions',
    path: () => '/regions',
    body: () => ({ name: 'New field' }),
    expected: [201, 201, 403, 403, 201, 403],
  },
  { route: 'get /regions/:regionId', path: () => `/regions/${f.regionId}`, expected: READ },
  {
    route: 'patch /regions/:regionId',
    path: () => `/regions/${f.regionId}`,
    body: () => ({ name: 'Renamed' }),
    expected: WRITE,
  },
  { route: 'get /regions/:regionId/uploads', path: () => `/regions/${f.regionId}/uploads`, expected: READ },
  { route: 'get /regions/:regionId/cubes', path: () => `/regions/${f.regionId}/cubes`, expected: READ },
  { route: 'get /cubes/:cubeId', path: () => `/cubes/${f.cubeId}`, expected: READ },
  {
    route: 'patch /cubes/:cubeId',
    path: () => `/cubes/${f.cubeId}`,
    body: () => ({ name: 'Renamed' }),
    expected: WRITE,
  },
  {
    route: 'patch /cubes/:cubeId/overrides',
    path: () => `/cubes/${f.cubeId}/overrides`,
    body: () => ({ unit: 'K' }),
    expected: WRITE,
  },
  {
    route: 'patch /cubes/:cubeId/source',
    path: async () => `/cubes/${await readyCube(product, lead(), f.regionId)}/source`,
    body: () => ({ hdu: 0 }),
    expected: [202, 202, 403, 403, 404, 403],
  },
  {
    route: 'delete /cubes/:cubeId',
    path: async () => `/cubes/${await readyCube(product, lead(), f.regionId)}`,
    expected: [204, 204, 403, 403, 404, 403],
  },
  {
    route: 'post /cubes/:cubeId/restore',
    path: async () => {
      const id = await readyCube(product, lead(), f.regionId);
      await lead().delete(`/cubes/${id}`).expect(204);
      return `/cubes/${id}/restore`;
    },
    body: NONE,
    expected: WRITE,
  },
  {
    route: 'post /cubes/:cubeId/retry',
    path: async () => `/cubes/${await failedCube('failed')}/retry`,
    body: NONE,
    expected: [202, 202, 403, 403, 404, 403],
  },
  {
    route: 'post /cubes/:cubeId/cancel',
    path: async () => `/cubes/${await failedCube('ingesting')}/cancel`,
    body: NONE,
    expected: [202, 202, 403, 403, 404, 403],
  },
  { route: 'get /cubes/:cubeId/header', path: () => `/cubes/${f.cubeId}/header`, expected: READ },
  { route: 'get /cubes/:cubeId/channels', path: () => `/cubes/${f.cubeId}/channels`, expected: READ },
  {
    route: 'get /cubes/:cubeId/channels/:channel/thumbnail',
    path: () => `/cubes/${f.cubeId}/channels/3/thumbnail`,
    expected: READ,
  },
  { route: 'get /cubes/:cubeId/strip', path: () => `/cubes/${f.cubeId}/strip`, expected: READ },
  {
    route: 'get /cubes/:cubeId/channels/:channel/plane',
    path: () => `/cubes/${f.cubeId}/channels/3/plane?size=32`,
    expected: READ,
  },
  { route: 'get /cubes/:cubeId/maps/:kind', path: () => `/cubes/${f.cubeId}/maps/total`, expected: READ },
  {
    route: 'get /cubes/:cubeId/cut',
    path: () => `/cubes/${f.cubeId}/cut?l=120.5&b=-0.5&toL=119.5&toB=0.5`,
    expected: READ,
  },
  {
    route: 'get /cubes/:cubeId/spectrum',
    path: () => `/cubes/${f.cubeId}/spectrum?x=32&y=30&radius=2`,
    expected: READ,
  },
  { route: 'get /regions/:regionId/images', path: () => `/regions/${f.regionId}/images`, expected: READ },
  {
    route: 'post /regions/:regionId/images',
    path: () => `/regions/${f.regionId}/images?fileName=trial.fits`,
    body: () => freshImage(),
    expected: [201, 201, 403, 403, 404, 403],
  },
  { route: 'get /images/:imageId', path: () => `/images/${f.imageId}`, expected: READ },
  { route: 'get /images/:imageId/plane', path: () => `/images/${f.imageId}/plane?size=16`, expected: READ },
  {
    route: 'patch /images/:imageId',
    path: () => `/images/${f.imageId}`,
    body: () => ({ name: 'Renamed' }),
    expected: WRITE,
  },
  {
    route: 'delete /images/:imageId',
    path: async () => `/images/${await newImage(lead(), f.regionId)}`,
    expected: [204, 204, 403, 403, 404, 403],
  },
  {
    route: 'post /images/:imageId/restore',
    path: async () => {
      const id = await newImage(lead(), f.regionId);
      await lead().delete(`/images/${id}`).expect(204);
      return `/images/${id}/restore`;
    },
    body: NONE,
    expected: WRITE,
  },
  { route: 'get /regions/:regionId/shells', path: () => `/regions/${f.regionId}/shells`, expected: READ },
  {
    route: 'post /regions/:regionId/shells',
    path: () => `/regions/${f.regionId}/shells`,
    body: () => ({ name: 'Another' }),
    expected: [201, 201, 403, 403, 404, 403],
  },
  { route: 'get /shells', path: () => '/shells?sort=vExp&order=down', expected: LIST },
  { route: 'get /shells.csv', path: () => '/shells.csv', expected: LIST },
  { route: 'get /shells/:shellId', path: () => `/shells/${f.shellId}`, expected: READ },
  {
    route: 'patch /shells/:shellId',
    path: () => `/shells/${f.shellId}`,
    body: () => ({ adoptedFitId: f.fitId }),
    expected: WRITE,
  },
  {
    route: 'delete /shells/:shellId',
    path: async () => `/shells/${await newShell(lead(), f.regionId)}`,
    expected: [204, 204, 403, 403, 404, 403],
  },
  {
    route: 'post /shells/:shellId/restore',
    path: async () => {
      const id = await newShell(lead(), f.regionId);
      await lead().delete(`/shells/${id}`).expect(204);
      return `/shells/${id}/restore`;
    },
    body: NONE,
    expected: WRITE,
  },
  {
    route: 'get /shells/:shellId/readings/mine',
    path: () => `/shells/${f.shellId}/readings/mine`,
    expected: READ,
  },
  {
    route: 'put /shells/:shellId/readings/mine',
    path: async () => `/shells/${await newShell(lead(), f.regionId)}/readings/mine`,
    body: () => ({ cubeId: f.cubeId, marks: MARKS, revision: 0 }),
    expected: [200, 200, 200, 403, 404, 403],
  },
  { route: 'get /shells/:shellId/fits', path: () => `/shells/${f.shellId}/fits`, expected: READ },
  {
    route: 'post /shells/:shellId/fits',
    path: () => `/shells/${f.shellId}/fits`,
    body: () => ({ readingId: f.readingId }),
    expected: [202, 202, 202, 403, 404, 403],
  },
  { route: 'get /fits/:fitId', path: () => `/fits/${f.fitId}`, expected: READ },
  { route: 'get /fits/:fitId/marks', path: () => `/fits/${f.fitId}/marks`, expected: READ },
  { route: 'get /fits/:fitId/draws', path: () => `/fits/${f.fitId}/draws`, expected: READ },
  {
    route: 'post /fits/:fitId/cancel',
    path: async () => `/fits/${await fitIn('queued')}/cancel`,
    body: NONE,
    expected: [202, 202, 202, 403, 404, 403],
  },
  {
    route: 'post /fits/:fitId/retry',
    path: async () => `/fits/${await fitIn('cancelled')}/retry`,
    body: NONE,
    expected: [202, 202, 202, 403, 404, 403],
  },
  { route: 'get /shells/:shellId/traces', path: () => `/shells/${f.shellId}/traces`, expected: READ },
  {
    route: 'post /shells/:shellId/traces',
    path: () => `/shells/${f.shellId}/traces`,
    body: () => ({ fitId: f.fitId, edge: 'inner' }),
    expected: [202, 202, 202, 403, 404, 403],
  },
  { route: 'get /traces/:traceId', path: () => `/traces/${f.traceId}`, expected: READ },
  {
    route: 'post /traces/:traceId/cancel',
    path: async () => `/traces/${await traceIn('queued')}/cancel`,
    body: NONE,
    expected: [202, 202, 202, 403, 404, 403],
  },
  { route: 'get /shells/:shellId/distances', path: () => `/shells/${f.shellId}/distances`, expected: READ },
  {
    route: 'post /shells/:shellId/distances',
    path: () => `/shells/${f.shellId}/distances`,
    body: () => ({ pc: 1500, method: 'kinematic' }),
    expected: [201, 201, 403, 403, 404, 403],
  },
];

const call = async (c: Case, who: SignedIn) => {
  const method = c.route.split(' ')[0] as 'get' | 'post' | 'put' | 'patch' | 'delete';
  return who[method](await c.path(who), c.body && (await c.body(who)));
};

describe.each(CASES)('$route', (c) => {
  test.each(WHO.map((who, i) => [who, c.expected[i]!] as const))('%s gets %i', async (who, status) => {
    const answer = await call(c, people[who]);
    expect({ status: answer.status, problem: answer.status >= 400 ? answer.body.type : null }).toEqual({
      status,
      problem: status === 403 ? '/problems/not-allowed' : status === 404 ? '/problems/not-found' : null,
    });
  });

  test('nobody gets it without sign-in', async () => {
    const method = c.route.split(' ')[0] as 'get';
    const answer = await supertest(product.url)[method](`/api/v1${await c.path(people.lead)}`);
    expect(answer.status).toBe(401);
  });
});

test('a refused write has written nothing', async () => {
  const before = (await people.lead.get(`/shells/${f.shellId}`)).body;
  await people.reader.patch(`/shells/${f.shellId}`, { name: 'Taken over' }).expect(403);
  await people.otherTeam.patch(`/shells/${f.shellId}`, { name: 'Taken over' }).expect(404);
  expect((await people.lead.get(`/shells/${f.shellId}`)).body).toEqual(before);
});

test('the table above holds every route of the API that does not answer without sign-in, and the uploads apart', () => {
  const listed = ENDPOINTS.filter(
    (e) => !e.open && !e.path.startsWith('/uploads') && e.path !== '/events',
  ).map((e) => `${e.method} ${e.path}`);
  expect(CASES.map((c) => c.route).sort()).toEqual(listed.sort());
});
