import { randomUUID } from 'node:crypto';
import { chmodSync, mkdirSync, mkdtempSync, readFileSync, renameSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { setTimeout as sleep } from 'node:timers/promises';
import { Client } from 'pg';
import knexFactory from 'knex';
import { openDiskSource } from '@/server/files/byteSource';
import { readCubeHead } from '@/server/files/cubeHead';
import { root } from '../../scripts/machine/place.mjs';
import { freePort } from '../../scripts/machine/ports.mjs';
import { startCluster } from '../../scripts/machine/postgres.mjs';
import { startChild, type Child } from '../../scripts/start/children.mjs';
import { signInAt, type SignedIn } from '../api/harness';
import { upload } from '../api/uploading';

/** Server and worker as people run them, on a database and in a folder that are thrown away. */
export interface BenchProduct {
  url: string;
  /** A folder for files, thrown away too. */
  scratch: string;
  lead: SignedIn;
  /** Most memory the worker's process has held so far, all its threads together, bytes. */
  workerPeakBytes(): number;
  ingest(bytes: Buffer): Promise<Ingested>;
  /** The same without the upload: the file is given to the store as it is, and is gone from its place. */
  ingestFile(path: string): Promise<Ingested>;
  stop(): Promise<void>;
}

export interface Ingested {
  cubeId: string;
  /** From the first byte sent until the cube exists: header check and checksum included. */
  uploadSeconds: number;
  /** From queued until ready. */
  readySeconds: number;
}

const LOOK_MS = 20;
const CHUNK_BYTES = 16 * 2 ** 20;
const open = new Set<() => Promise<void>>();

/** Stops whatever still runs and removes its files. */
export const stopAll = () => Promise.all([...open].map((stop) => stop()));

export async function startBenchProduct(login = 'bench'): Promise<BenchProduct> {
  const scratch = mkdtempSync(join(tmpdir(), 'outswell-bench-'));
  chmodSync(scratch, 0o711); // the database's account must pass through
  const clean = () => rmSync(scratch, { recursive: true, force: true, maxRetries: 5 });
  process.once('exit', clean); // the browser's library ends the process by itself on Ctrl-C
  const undo: (() => unknown)[] = [clean];
  const stop = async () => {
    if (!open.delete(stop)) return;
    for (const step of undo.reverse()) await step();
  };
  open.add(stop);
  try {
    const cluster = await startCluster(join(scratch, 'cluster'), { durable: false });
    undo.push(() => rmSync(cluster.dir, { recursive: true, force: true, maxRetries: 5 }));
    undo.push(cluster.stop);
    await migrate(cluster.url);
    const port = await freePort();
    const env = environment(cluster.url, port, join(scratch, 'files'));
    const [server, worker] = ['server', 'worker'].map((name) => {
      const child = startChild(name, name === 'server' ? 'server/main.ts' : 'workers/main.ts', {
        cwd: root,
        env,
      });
      undo.push(child.stop);
      return child;
    }) as [Child, Child];
    const url = `http://127.0.0.1:${port}`;
    await healthy(url, [server, worker]);
    const lead = await signInAt(url, login);
    const db = new Client(cluster.url);
    await db.connect();
    undo.push(() => db.end());
    return {
      url,
      scratch,
      lead,
      stop,
      workerPeakBytes: () => peakBytes(worker.pid),
      ingest: (bytes) => ingest({ url, lead, db }, bytes),
      ingestFile: (path) => ingestFile({ lead, db }, path, join(scratch, 'files')),
    };
  } catch (error) {
    await stop();
    throw error;
  }
}

async function migrate(url: string) {
  const db = knexFactory({ client: 'pg', connection: { connectionString: url } });
  await db.migrate.latest(require('../../knexfile.js').migrations).finally(() => db.destroy());
}

const environment = (databaseUrl: string, port: number, dataDir: string) => ({
  PATH: process.env.PATH,
  NODE_ENV: 'development',
  PORT: String(port),
  DATABASE_URL: databaseUrl,
  DATA_DIR: dataDir,
  SESSION_SECRET: 'a secret of the benchmarks, long enough for anybody',
  LOG_LEVEL: 'warn',
  AWS_SDK_JS_NODE_VERSION_SUPPORT_WARNING_DISABLED: 'true',
});

/** Until the server answers and a worker is connected. */
async function healthy(url: string, children: Child[]) {
  let over = false;
  for (const child of children) void child.ended.then(() => (over = true));
  for (let waited = 0; waited < 30_000 && !over; waited += 50) {
    const answer = await fetch(`${url}/api/v1/health`).catch(() => null);
    if (answer?.ok && ((await answer.json()) as { status: string }).status === 'ok') return;
    await sleep(50);
  }
  throw new Error(
    over ? 'Server or worker ended while starting.' : 'Server and worker did not start in 30 s.',
  );
}

async function ingest(
  { url, lead, db }: { url: string; lead: SignedIn; db: Client },
  bytes: Buffer,
): Promise<Ingested> {
  // the same file twice in one region would be recognised
  const region = await lead.post('/regions', { name: `Bench ${Date.now()}` }).expect(201);
  const began = performance.now();
  const { cubeId, problem } = await upload(lead, url, region.body.id, bytes, { chunkSize: CHUNK_BYTES });
  const uploadSeconds = (performance.now() - began) / 1000;
  if (!cubeId) throw new Error(`The upload was refused: ${JSON.stringify(problem)}`);
  return { cubeId, uploadSeconds, readySeconds: await untilReady(db, cubeId) };
}

async function ingestFile(
  { lead, db }: { lead: SignedIn; db: Client },
  path: string,
  dataDir: string,
): Promise<Ingested> {
  const region = await lead.post('/regions', { name: `Bench ${Date.now()}` }).expect(201);
  const cubeId = randomUUID();
  const fileKey = `cubes/${cubeId}.fits`;
  const source = await openDiskSource(path);
  const head = await readCubeHead(source).finally(() => source.close());
  mkdirSync(join(dataDir, 'cubes'), { recursive: true });
  renameSync(path, join(dataDir, fileKey));
  await db.query(
    `insert into cubes (id, region_id, name, file_name, file_key, size_bytes, checksum, head, created_by)
     values ($1, $2, 'bench', 'bench.fits', $3, $4, $5, $6, $7)`,
    [cubeId, region.body.id, fileKey, source.size, '0'.repeat(64), JSON.stringify(head), lead.id],
  );
  await db.query(`select graphile_worker.add_job('ingest', $1::json, job_key => $2, max_attempts => 1)`, [
    JSON.stringify({ cubeId }),
    `ingest:${cubeId}`,
  ]);
  return { cubeId, uploadSeconds: 0, readySeconds: await untilReady(db, cubeId) };
}

/** Seconds from queued until ready. */
async function untilReady(db: Client, cubeId: string): Promise<number> {
  for (;;) {
    const { rows } = await db.query('select status, problem, created_at from cubes where id = $1', [cubeId]);
    const { status, problem, created_at: queuedAt } = rows[0];
    if (status === 'failed') throw new Error(`Ingest failed: ${JSON.stringify(problem)}`);
    if (status === 'ready') return (Date.now() - (queuedAt as Date).getTime()) / 1000;
    await sleep(LOOK_MS);
  }
}

function peakBytes(pid: number | undefined): number {
  if (process.platform !== 'linux') return NaN;
  const found = /^VmHWM:\s+(\d+) kB/m.exec(readFileSync(`/proc/${pid}/status`, 'utf8'));
  return Number(found?.[1] ?? NaN) * 1024;
}
