/** Server and worker killed by force at ten random moments of an upload and its ingest: the cube ends right, once. */
import { spawn, type ChildProcess } from 'node:child_process';
import { createHash } from 'node:crypto';
import { once } from 'node:events';
import { mkdtempSync, rmSync } from 'node:fs';
import { createServer, type AddressInfo } from 'node:net';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { seededRandom } from '@/shared/random';
import { freshDatabase } from '../database';
import { cubeFile } from './cubeFile';
import { signInAt, until, type SignedIn } from './harness';
import { cookieOf } from './uploading';

const KILLS = 10;
const CHUNK = 1 << 21;
const SEED = Number(process.env.SEED ?? 20261201);

let env: Record<string, string | undefined>;
let url: string;
let drop: () => Promise<void>;
const dataDir = mkdtempSync(join(tmpdir(), 'outswell-killed-'));
let running: ChildProcess[] = [];

const freePort = async () => {
  const probe = createServer().listen(0, '127.0.0.1');
  await once(probe, 'listening');
  const { port } = probe.address() as AddressInfo;
  probe.close();
  return port;
};
const start = () =>
  (running = ['server/main.ts', 'workers/main.ts'].map((main) =>
    spawn(process.execPath, ['--import', 'tsx', main], { cwd: process.cwd(), env, stdio: 'ignore' }),
  ));
const up = () =>
  until(
    () =>
      fetch(`${url}/api/v1/health`).then(
        (r) => r.ok,
        () => false,
      ),
    Boolean,
    20_000,
  );
async function kill() {
  const ended = running.map((child) => once(child, 'exit'));
  for (const child of running) child.kill('SIGKILL');
  await Promise.all(ended);
}

beforeAll(async () => {
  const database = await freshDatabase();
  drop = database.drop;
  const port = await freePort();
  url = `http://127.0.0.1:${port}`;
  env = {
    PATH: process.env.PATH,
    NODE_ENV: 'test',
    PORT: String(port),
    DATABASE_URL: database.url,
    DATA_DIR: dataDir,
    SESSION_SECRET: 'a secret that outlives the processes of this test',
    LOG_LEVEL: 'fatal',
  };
}, 30_000);
afterAll(async () => {
  await kill();
  await drop();
  rmSync(dataDir, { recursive: true, force: true });
});

/** A client that never gives up: asks how far the upload is, sends the next piece, begins again where it must. */
async function sendPatiently(who: SignedIn, regionId: string, bytes: Buffer, done: () => boolean) {
  const base = { 'Tus-Resumable': '1.0.0', 'X-CSRF-Token': who.csrf, Cookie: cookieOf(who, url) };
  const encoded = (text: string) => Buffer.from(text).toString('base64');
  let location: string | null = null;
  while (!done()) {
    try {
      if (!location) {
        const made = await fetch(`${url}/api/v1/uploads`, {
          method: 'POST',
          headers: {
            ...base,
            'Upload-Length': String(bytes.length),
            'Upload-Metadata': `filename ${encoded('killed.fits')},regionId ${encoded(regionId)}`,
          },
        });
        location = made.status === 201 ? made.headers.get('location') : null;
        continue;
      }
      const head: Response = await fetch(`${url}${location}`, { method: 'HEAD', headers: base });
      if (head.status === 404) return location; // finished, and no longer an upload
      const offset = Number(head.headers.get('upload-offset'));
      if (offset === bytes.length) await new Promise((resolve) => setTimeout(resolve, 200));
      else
        await fetch(`${url}${location}`, {
          method: 'PATCH',
          headers: {
            ...base,
            'Upload-Offset': String(offset),
            'Content-Type': 'application/offset+octet-stream',
          },
          body: new Uint8Array(bytes.subarray(offset, offset + CHUNK)),
        });
    } catch {
      await new Promise((resolve) => setTimeout(resolve, 50)); // the server is away
    }
  }
  return location;
}

test(`the cube is ready with the right checksum (seed ${SEED})`, async () => {
  start();
  await up();
  const lead = await signInAt(url, 'lena');
  const regionId = (await lead.post('/regions', { name: 'Trial field' }).expect(201)).body.id;
  const value = (x: number, y: number, k: number) => ((x * 31 + y * 17 + k * 7) % 97) / 97;
  const bytes = cubeFile({ nx: 256, ny: 256, channels: 96, value });
  let over = false;
  const sent = sendPatiently(lead, regionId, bytes, () => over);

  const random = seededRandom(SEED);
  for (let n = 0; n < KILLS; n++) {
    await new Promise((resolve) => setTimeout(resolve, 30 + 600 * random.uniform()));
    await kill();
    start();
    await up();
  }
  type Found = { status: string; checksum: string; id: string };
  const cubes = async (): Promise<Found[]> => (await lead.get(`/regions/${regionId}/cubes`)).body.items ?? [];
  const [cube] = await until(
    () => cubes().catch(() => []),
    (list) => list.some((c) => c.status === 'ready' || c.status === 'failed'),
    60_000,
  );
  over = true;
  await sent;
  expect(await cubes()).toHaveLength(1);
  expect(cube).toMatchObject({ status: 'ready', checksum: createHash('sha256').update(bytes).digest('hex') });
  expect((await lead.get(`/cubes/${cube!.id}/channels`).expect(200)).body.total).toBe(96);
}, 120_000);
