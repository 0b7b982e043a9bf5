import { spawn } from 'node:child_process';
import {
  existsSync,
  mkdirSync,
  mkdtempSync,
  readFileSync,
  readlinkSync,
  rmSync,
  statSync,
  writeFileSync,
} from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { Client } from 'pg';
import { startCluster } from './postgres.mjs';

let dir: string;
beforeEach(() => {
  dir = mkdtempSync(join(tmpdir(), 'outswell-cluster-'));
});
afterEach(() => rmSync(dir, { recursive: true, force: true }));

const fast = { durable: false };

async function query(url: string, sql: string): Promise<unknown[]> {
  const client = new Client(url);
  await client.connect();
  try {
    return (await client.query(sql)).rows;
  } finally {
    await client.end();
  }
}

test('what was written is there after a stop and a second start', async () => {
  const first = await startCluster(dir, fast);
  await query(first.url, 'create table kept (n int)');
  await first.stop();
  const second = await startCluster(dir, fast);
  expect(await query(second.url, 'select count(*)::int as n from kept')).toEqual([{ n: 0 }]);
  await second.stop();
});

test('an initdb killed half-way does not block the next start', async () => {
  mkdirSync(join(dir, 'data.unfinished'));
  writeFileSync(join(dir, 'data.unfinished', 'PG_VERSION'), '15\n');
  const cluster = await startCluster(dir, fast);
  expect(await query(cluster.url, 'select 1 as one')).toEqual([{ one: 1 }]);
  expect(existsSync(join(dir, 'data.unfinished'))).toBe(false);
  await cluster.stop();
});

test('a pid file that names a stranger does not block the next start', async () => {
  await (await startCluster(dir, fast)).stop();
  writeFileSync(join(dir, 'data', 'postmaster.pid'), `${process.pid}\n${dir}/data\n`, { mode: 0o644 });
  const cluster = await startCluster(dir, fast);
  expect(await query(cluster.url, 'select 1 as one')).toEqual([{ one: 1 }]);
  await cluster.stop();
});

test('a database of another version is refused with what to do', async () => {
  await (await startCluster(dir, fast)).stop();
  writeFileSync(join(dir, 'data', 'PG_VERSION'), '9\n');
  await expect(startCluster(dir, fast)).rejects.toThrow(/made by PostgreSQL 9.*PG_BIN/);
});

test('the server ends with its parent, killed by force too, and the next start goes on', async () => {
  const script = `import(${JSON.stringify(join(__dirname, 'postgres.mjs'))}).then(async (m) => {
    const c = await m.startCluster(${JSON.stringify(dir)}, { durable: false });
    console.log(c.pid);
    setInterval(() => {}, 1000);
  });`;
  const parent = spawn(process.execPath, ['-e', script], { stdio: ['ignore', 'pipe', 'inherit'] });
  const pid = await new Promise<number>((done) => parent.stdout.once('data', (d) => done(Number(d))));
  const directory = () => readlinkSync(`/proc/${pid}/cwd`); // readable only while the process runs
  expect(directory()).toBe(join(dir, 'data'));
  parent.kill('SIGKILL');
  const cluster = await startCluster(dir, fast); // at once: the old server may still be stopping
  expect(cluster.pid).not.toBe(pid);
  expect(await query(cluster.url, 'select 1 as one')).toEqual([{ one: 1 }]);
  await cluster.stop();
  expect(directory).toThrow(/ENOENT/);
});

test('the password is for its owner alone', async () => {
  const cluster = await startCluster(dir, fast);
  expect(statSync(join(dir, 'password')).mode & 0o077).toBe(0);
  expect(cluster.url).toContain(readFileSync(join(dir, 'password'), 'utf8'));
  await cluster.stop();
});

const asRoot = process.getuid?.() === 0 ? test : test.skip; // only root's server runs under another account
asRoot(
  'below a folder that is closed to the server’s account, the cluster lies elsewhere and says so',
  async () => {
    const closed = join(dir, 'closed');
    mkdirSync(closed, { mode: 0o700 });
    const lines: string[] = [];
    const cluster = await startCluster(join(closed, 'postgres'), {
      ...fast,
      say: (line) => lines.push(line),
    });
    try {
      expect(await query(cluster.url, 'select 1 as one')).toEqual([{ one: 1 }]);
      expect(cluster.dir).toMatch(/^\/var\/lib\/outswell-/);
      expect(lines.join()).toContain(cluster.dir);
    } finally {
      await cluster.stop();
      rmSync(cluster.dir, { recursive: true });
    }
  },
);
