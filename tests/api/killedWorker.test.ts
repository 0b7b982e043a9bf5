/** A worker that is killed by force in the middle of a cube: another one completes it, and nothing is doubled. */
import { spawn, type ChildProcess } from 'node:child_process';
import { once } from 'node:events';
import { cubeFile } from './cubeFile';
import { newRegion } from './fixture';
import { startProduct, until, type Product, type SignedIn } from './harness';
import { upload } from './uploading';

let product: Product;
let lead: SignedIn;
const children: ChildProcess[] = [];
beforeAll(async () => {
  product = await startProduct({ MAX_UPLOAD_BYTES: String(400e6) });
  lead = await product.signIn('lena');
});
afterAll(async () => {
  for (const child of children) child.kill('SIGKILL');
  await product.stop();
});

function spawnWorker(): ChildProcess {
  const { config } = product.parts;
  const child = spawn(process.execPath, ['--import', 'tsx', 'workers/main.ts'], {
    cwd: process.cwd(),
    env: {
      PATH: process.env.PATH,
      NODE_ENV: 'test',
      DATABASE_URL: config.databaseUrl,
      DATA_DIR: config.dataDir,
      SESSION_SECRET: config.sessionSecret,
      LOG_LEVEL: 'warn',
    },
    stdio: 'ignore',
  });
  children.push(child);
  return child;
}

test('a worker killed during ingest leaves a cube that the next worker completes once', async () => {
  const { db } = product.parts;
  const regionId = await newRegion(lead);
  const channels = 160;
  const bytes = cubeFile({
    nx: 384,
    ny: 384,
    channels,
    value: (x, y, k) => ((x * 7 + y * 13 + k) % 29) / 29,
  });
  const { cubeId } = await upload(lead, product.url, regionId, bytes, { chunkSize: 16 << 20 });
  const cube = async () => (await lead.get(`/cubes/${cubeId}`)).body;

  const doomed = spawnWorker();
  await until(cube, (c) => c.status === 'ingesting');
  doomed.kill('SIGKILL');
  await once(doomed, 'exit');
  const interrupted = await cube();
  expect(interrupted.status).toBe('ingesting');
  expect(Number((await db('channels').where({ cube_id: cubeId }).count())[0]!.count)).toBe(0);

  spawnWorker();
  const done = await until(cube, (c) => c.status === 'ready' || c.status === 'failed', 50_000);
  expect(done).toMatchObject({ status: 'ready', problem: null });
  expect(Number((await db('channels').where({ cube_id: cubeId }).count())[0]!.count)).toBe(channels);
  expect(Number((await db('cube_images').where({ cube_id: cubeId }).count())[0]!.count)).toBe(5);
  const ready = await db('events').where({ subject_id: cubeId, kind: 'cube.ready' });
  expect(ready).toHaveLength(1);
}, 90_000);
