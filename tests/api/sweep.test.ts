import { sweep } from '@/server/services/sweep';
import { freshCube, newRegion } from './fixture';
import { startProduct, until, type Product } from './harness';
import { upload } from './uploading';

let product: Product;
beforeAll(async () => {
  product = await startProduct();
});
afterAll(() => product.stop());

test('a job that a killed worker took and never began is queued again; one that waits is left alone', async () => {
  const { db } = product.parts;
  const lead = await product.signIn('lena');
  const { cubeId } = await upload(lead, product.url, await newRegion(lead), freshCube());
  expect(await sweep(product.parts)).toEqual({ cubes: 0, fits: 0, traces: 0 });
  // as a worker leaves it that is killed between taking the job and claiming the cube: locked, with the cube untouched
  const lock = (ago: string) =>
    db.raw(
      `update graphile_worker._private_jobs set locked_at = now() - ?::interval, locked_by = 'dead', attempts = 1
       where key = ?`,
      [ago, `ingest:${cubeId}`],
    );
  await lock('1 second');
  expect(await sweep(product.parts)).toEqual({ cubes: 0, fits: 0, traces: 0 }); // it may only just have been taken
  await lock('1 minute');
  expect(await sweep(product.parts)).toEqual({ cubes: 1, fits: 0, traces: 0 });
  await product.startWorker();
  await until(
    async () => (await lead.get(`/cubes/${cubeId}`)).body.status,
    (status) => status === 'ready',
  );
});
