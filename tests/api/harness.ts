/** A whole product on a database of its own: HTTP on a free port, the real queue, people who sign in for real. */
import { mkdtempSync, rmSync } from 'node:fs';
import { createServer, type Server } from 'node:http';
import type { AddressInfo } from 'node:net';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import pino from 'pino';
import supertest from 'supertest';
import { makeApp, type App } from '@/server/app';
import { httpServer } from '@/server/httpServer';
import { loadConfig } from '@/server/config';
import type { Parts } from '@/server/services/context';
import { makeCubeStore } from '@/server/files/cubeStore';
import { openDatabase } from '@/server/store/db';
import { startWorker, type WorkerProcess } from '@/workers/run';
import type { Role } from '@/shared/contract/permissions';
import { freshDatabase } from '../database';

type Agent = ReturnType<typeof supertest.agent>;
type Method = 'get' | 'post' | 'put' | 'patch' | 'delete';

/** Somebody signed in: a cookie jar, and the CSRF token that goes with every write. */
export interface SignedIn {
  id: string;
  login: string;
  csrf: string;
  agent: Agent;
  get(path: string): supertest.Test;
  post(path: string, body?: object): supertest.Test;
  put(path: string, body?: object): supertest.Test;
  patch(path: string, body?: object): supertest.Test;
  delete(path: string): supertest.Test;
}

export interface Product {
  parts: Parts;
  url: string;
  signIn(login: string): Promise<SignedIn>;
  /** The lead of the one team, an analyst, a reviewer, a reader, and somebody in no team. */
  team(): Promise<Record<Role | 'stranger', SignedIn>>;
  startWorker(): Promise<WorkerProcess>;
  stop(): Promise<void>;
}

export const freePort = () =>
  new Promise<number>((resolve) => {
    const probe = createServer().listen(0, '127.0.0.1', () => {
      const found = (probe.address() as AddressInfo).port;
      probe.close(() => resolve(found));
    });
  });

export async function startProduct(env: Record<string, string> = {}): Promise<Product> {
  const database = await freshDatabase();
  const dataDir = mkdtempSync(join(tmpdir(), 'outswell-files-'));
  const config = loadConfig({
    NODE_ENV: 'test',
    PORT: String(await freePort()),
    DATABASE_URL: database.url,
    DATA_DIR: dataDir,
    SESSION_SECRET: 'a secret of the tests, long enough for anybody',
    LOG_LEVEL: 'fatal',
    ...env,
  });
  const log = pino({ level: config.logLevel });
  const parts: Parts = { config, log, db: openDatabase(database.url), cubeFiles: makeCubeStore(config) };
  const app: App = await makeApp(parts);
  const server: Server = httpServer(app.express);
  await new Promise<void>((resolve) => server.listen(config.port, '127.0.0.1', resolve));
  const url = `http://127.0.0.1:${config.port}`;
  const workers: WorkerProcess[] = [];

  const signIn = (login: string) => signInAt(url, login);
  return {
    parts,
    url,
    signIn,
    async team() {
      const lead = await signIn('lena');
      const others = { analyst: 'anton', reviewer: 'rosa', reader: 'ruben', stranger: 'stella' } as const;
      const people = { lead } as Record<Role | 'stranger', SignedIn>;
      for (const [role, login] of Object.entries(others) as [keyof typeof others, string][]) {
        people[role] = await signIn(login);
        if (role !== 'stranger') await lead.post('/members', { login, role }).expect(201);
      }
      return people;
    },
    async startWorker() {
      const worker = await startWorker(parts);
      workers.push(worker);
      return worker;
    },
    async stop() {
      for (const worker of workers) await worker.stop();
      server.closeAllConnections();
      await new Promise((resolve) => server.close(resolve));
      await app.close();
      await parts.cubeFiles.close();
      await parts.db.destroy();
      await database.drop();
      rmSync(dataDir, { recursive: true, force: true });
    },
  };
}

/** The authorization-code flow as a browser walks it: provider page, choice, code, callback, session. */
export async function signInAt(url: string, login: string): Promise<SignedIn> {
  const agent = supertest.agent(url);
  const begun = await agent.get('/auth/github').expect(302);
  const asked = new URL(begun.headers.location!, url);
  const fields = Object.fromEntries(asked.searchParams);
  const chosen = await agent
    .post(asked.pathname)
    .type('form')
    .send({ ...fields, login })
    .expect(302);
  const back = new URL(chosen.headers.location!, url);
  await agent.get(back.pathname + back.search).expect(302);
  const me = (await agent.get('/api/v1/me').expect(200)).body as { id: string; csrfToken: string };
  const call =
    (method: Method) =>
    (path: string, body?: object): supertest.Test => {
      const request = agent[method](`/api/v1${path}`).set('X-CSRF-Token', me.csrfToken);
      if (Buffer.isBuffer(body)) request.type('application/fits'); // a file as it is
      return (body === undefined ? request : request.send(body)) as supertest.Test;
    };
  return {
    id: me.id,
    login,
    csrf: me.csrfToken,
    agent,
    get: call('get'),
    post: call('post'),
    put: call('put'),
    patch: call('patch'),
    delete: call('delete'),
  };
}

/** Wait until something holds, looking often; fails with what was seen last. */
export async function until<T>(
  look: () => Promise<T>,
  holds: (seen: T) => boolean,
  timeoutMs = 45_000,
): Promise<T> {
  const end = Date.now() + timeoutMs;
  for (;;) {
    const seen = await look();
    if (holds(seen)) return seen;
    if (Date.now() > end)
      throw new Error(`still not so after ${timeoutMs} ms: ${JSON.stringify(seen).slice(0, 500)}`);
    await new Promise((resolve) => setTimeout(resolve, 50));
  }
}

/** For supertest: the body as bytes. */
export const binaryBody = (
  res: supertest.Response,
  done: (error: Error | null, body: Buffer) => void,
): void => {
  const parts: Buffer[] = [];
  const stream = res as unknown as NodeJS.ReadableStream; // what superagent hands over, whatever its types say
  stream.on('data', (d: Buffer) => parts.push(d)).on('end', () => done(null, Buffer.concat(parts)));
};
