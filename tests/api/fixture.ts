/** Records to try the routes on: a ready cube, a shell with marks, a finished fit and a traced rim, and a second team. */
import { randomUUID } from 'node:crypto';
import { cubeFile, marksOnRing, noisyShell } from './cubeFile';
import { until, type Product, type SignedIn } from './harness';
import { imageFile } from './skyImageFile';
import { upload } from './uploading';

export interface Fixture {
  regionId: string;
  cubeId: string;
  shellId: string;
  readingId: string;
  fitId: string;
  traceId: string;
  imageId: string;
}

export const MARKS = [10, 13, 16, 19, 22].flatMap((k) => marksOnRing(k));

let serial = 0;
/** Bytes that no region holds yet. */
export const freshCube = () =>
  cubeFile({ nx: 64, ny: 60, channels: 32, cards: { OBJECT: `trial ${serial++}` }, value: noisyShell });

export async function readyCube(product: Product, who: SignedIn, regionId: string): Promise<string> {
  const { cubeId, problem } = await upload(who, product.url, regionId, freshCube());
  if (!cubeId) throw new Error(JSON.stringify(problem));
  await until(
    async () => (await who.get(`/cubes/${cubeId}`)).body,
    (cube) => cube.status === 'ready',
  );
  return cubeId;
}

export const newRegion = async (who: SignedIn, name = 'Trial field'): Promise<string> =>
  (await who.post('/regions', { name }).expect(201)).body.id;

export const newShell = async (who: SignedIn, regionId: string): Promise<string> =>
  (await who.post(`/regions/${regionId}/shells`, { name: 'Trial ring' }).expect(201)).body.id;

/** An image whose bytes no region holds yet. */
export const freshImage = () => imageFile({ OBJECT: `trial ${serial++}` });
export const newImage = async (who: SignedIn, regionId: string): Promise<string> =>
  (await who.post(`/regions/${regionId}/images`, freshImage()).expect(201)).body.id;

export async function saveMarks(
  who: SignedIn,
  shellId: string,
  cubeId: string,
  marks: object[] = MARKS,
): Promise<string> {
  const { revision } = (await who.get(`/shells/${shellId}/readings/mine`)).body;
  return (await who.put(`/shells/${shellId}/readings/mine`, { cubeId, marks, revision }).expect(200)).body.id;
}

export async function finishedFit(
  who: SignedIn,
  shellId: string,
  readingId: string,
  rest: object = {},
): Promise<string> {
  const { id } = (await who.post(`/shells/${shellId}/fits`, { readingId, ...rest }).expect(202)).body;
  await until(
    async () => (await who.get(`/fits/${id}`)).body,
    (fit) => fit.status === 'done',
  );
  return id;
}

export async function finishedTrace(who: SignedIn, shellId: string, fitId: string): Promise<string> {
  const { id } = (await who.post(`/shells/${shellId}/traces`, { fitId }).expect(202)).body;
  await until(
    async () => (await who.get(`/traces/${id}`)).body,
    (trace) => trace.status === 'done',
  );
  return id;
}

export async function makeFixture(product: Product, who: SignedIn): Promise<Fixture> {
  const regionId = await newRegion(who);
  const cubeId = await readyCube(product, who, regionId);
  const shellId = await newShell(who, regionId);
  const readingId = await saveMarks(who, shellId, cubeId);
  const fitId = await finishedFit(who, shellId, readingId);
  const traceId = await finishedTrace(who, shellId, fitId);
  const imageId = await newImage(who, regionId);
  return { regionId, cubeId, shellId, readingId, fitId, traceId, imageId };
}

/** Somebody who leads another team of the same installation. */
export async function leadOfAnotherTeam(product: Product, login = 'olga'): Promise<SignedIn> {
  const person = await product.signIn(login);
  const teamId = randomUUID();
  await product.parts.db('teams').insert({ id: teamId, name: 'Another team' });
  await product.parts.db('memberships').insert({ team_id: teamId, person_id: person.id, role: 'lead' });
  return person;
}
