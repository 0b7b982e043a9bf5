import { spawn, type ChildProcess } from 'node:child_process';
import {
  chmodSync,
  cpSync,
  existsSync,
  mkdirSync,
  mkdtempSync,
  readFileSync,
  rmSync,
  symlinkSync,
  writeFileSync,
} from 'node:fs';
import { createServer } from 'node:net';
import { tmpdir } from 'node:os';
import { join, resolve } from 'node:path';
import { clientSources } from './machine/client.mjs';
import { freePort } from './machine/ports.mjs';

/** The real start script in a checkout of its own, whose server and worker are the smallest that can be. */
const project = resolve(__dirname, '..');
const smallServer = `
import { createServer } from 'node:http';
const server = createServer((req, res) => res.end(JSON.stringify({ path: req.url })));
server.listen(Number(process.env.PORT), process.env.HOST, () => say('listening'));
const say = (msg: string) => console.log(JSON.stringify({ level: 30, time: Date.now(), msg, demo: process.env.OUTSWELL_DEMO }));
process.on('SIGTERM', () => { say('server closes'); process.exit(0); });
`;
const smallWorker = `
const idle = setInterval(() => {}, 1000);
process.on('SIGTERM', () => { console.log('worker closes'); clearInterval(idle); });
console.log(JSON.stringify({ level: 40, time: Date.now(), msg: 'queue runs' }));
`;

let checkout: string;
let port: number;
const started: ChildProcess[] = [];

beforeAll(() => {
  checkout = mkdtempSync(join(tmpdir(), 'outswell-checkout-'));
  chmodSync(checkout, 0o755);
  for (const path of [
    'scripts',
    'migrations',
    'knexfile.js',
    'package.json',
    'package-lock.json',
    'tsconfig.json',
    'server/config.ts',
    'server/configTable.ts',
    'server/fakes/demoPeople.json',
  ])
    cpSync(join(project, path), join(checkout, path), { recursive: true });
  rmSync(join(checkout, 'scripts', 'demo.ts'), { force: true });
  symlinkSync(join(project, 'node_modules'), join(checkout, 'node_modules'));
  mkdirSync(join(checkout, 'workers'));
  mkdirSync(join(checkout, 'dist'));
  writeFileSync(join(checkout, 'dist', '.sources'), clientSources(checkout)); // as if it had been built
});
beforeEach(async () => {
  writeFileSync(join(checkout, 'server', 'main.ts'), smallServer);
  writeFileSync(join(checkout, 'workers', 'main.ts'), smallWorker);
  port = await freePort();
});
afterEach(async () => {
  for (const child of started.splice(0)) {
    if (child.exitCode !== null || child.signalCode !== null) continue;
    child.kill('SIGKILL');
    await new Promise((done) => child.once('close', done));
  }
});
afterAll(() => rmSync(checkout, { recursive: true, force: true, maxRetries: 20, retryDelay: 100 }));

function start(env: Record<string, string> = {}) {
  const child = spawn(process.execPath, [join(checkout, 'scripts', 'start.mjs')], {
    cwd: tmpdir(), // wherever the command is given
    env: { PATH: process.env.PATH, PORT: String(port), ...env },
    stdio: ['ignore', 'pipe', 'pipe'],
  });
  started.push(child);
  let output = '';
  const readers: (() => void)[] = [];
  for (const stream of [child.stdout, child.stderr])
    stream.on('data', (chunk) => {
      output += chunk;
      readers.forEach((look) => look());
    });
  const ended = new Promise<{ code: number | null; output: string }>((done) =>
    child.once('close', (code) => done({ code, output })),
  );
  const says = (pattern: RegExp) =>
    new Promise<string>((done, fail) => {
      const look = () => pattern.test(output) && done(output);
      readers.push(look);
      look();
      void ended.then(() => fail(new Error(`ended without saying ${pattern}:\n${output}`)));
    });
  return { child, ended, says };
}

const health = () => fetch(`http://127.0.0.1:${port}/api/v1/health`).then((r) => r.status);

test('a start is served, tells how to sign in, and stops in order', async () => {
  const run = start();
  await run.says(/Outswell is running/);
  expect(await health()).toBe(200);
  const output = await run.says(/queue runs/);
  expect(output).toContain(`Open http://127.0.0.1:${port}`);
  expect(output).toMatch(/Ansa Verrill +lead +\(login ansa\)/);
  expect(output).toMatch(/^\d\d:\d\d:\d\d server listening {2}demo=1$/m);
  expect(output).toMatch(/^\d\d:\d\d:\d\d worker WARN {2}queue runs$/m);
  run.child.kill('SIGINT');
  const { code, output: all } = await run.ended;
  expect(code).toBe(0);
  expect(all).toMatch(/Stopping/);
  expect(all).toContain('server closes');
  expect(all).toContain('worker closes');
  await expect(health()).rejects.toThrow();
  expect(existsSync(join(checkout, '.data', 'start.lock'))).toBe(false);
  expect(existsSync(join(checkout, '.data', 'postgres', 'data', 'postmaster.pid'))).toBe(false);
});

test('a start killed by force leaves nothing that blocks the next one', async () => {
  const first = start();
  await first.says(/Outswell is running/);
  const secret = readFileSync(join(checkout, '.data', 'session-secret'), 'utf8');
  first.child.kill('SIGKILL');
  await first.ended;
  const second = start(); // at once, on the same port, while what the first one ran is still stopping
  await second.says(/Outswell is running/);
  expect(await health()).toBe(200);
  expect(readFileSync(join(checkout, '.data', 'session-secret'), 'utf8')).toBe(secret);
  second.child.kill('SIGTERM');
  expect((await second.ended).code).toBe(0);
});

test('a migration killed half-way leaves nothing that blocks the next start', async () => {
  const file = join(checkout, 'migrations', '99990101000000_slow.js');
  const asleep = join(checkout, 'asleep');
  writeFileSync(
    file,
    `exports.up = async (knex) => {
  await knex.raw('create table half_done (n int)');
  require('node:fs').writeFileSync(${JSON.stringify(asleep)}, '');
  await knex.raw('select pg_sleep(30)');
};
exports.down = (knex) => knex.raw('drop table half_done');`,
  );
  const first = start();
  while (!existsSync(asleep)) await new Promise((done) => setTimeout(done, 50));
  first.child.kill('SIGKILL');
  await first.ended;
  writeFileSync(
    file,
    `exports.up = (knex) => knex.raw('create table half_done (n int)');
exports.down = (knex) => knex.raw('drop table half_done');`,
  );
  const second = start();
  expect(await second.says(/Outswell is running/)).toMatch(/brought up to date \(1 step/);
  second.child.kill('SIGTERM');
  await second.ended;
});

test('a second start beside a running one is told who runs', async () => {
  const first = start();
  await first.says(/Outswell is running/);
  const { code, output } = await start().ended;
  expect(code).toBe(1);
  expect(output).toContain(`already runs from this folder (process ${first.child.pid})`);
  expect(await health()).toBe(200);
});

test('a taken port is said before anything else, with how to choose another', async () => {
  const other = createServer().listen(port, '127.0.0.1');
  const { code, output } = await start().ended;
  other.close();
  expect(code).toBe(1);
  expect(output).toContain(`Port ${port} is taken`);
  expect(output).toContain(`PORT=${port + 1} npm start`);
});

test.each(['http', '0', '70000'])('the port %s is refused', async (bad) => {
  const { code, output } = await start({ PORT: bad }).ended;
  expect(code).toBe(1);
  expect(output).toContain('PORT must be');
});

test('wrong variables stop the start, all named, before the database is touched', async () => {
  const { code, output } = await start({ LOG_LEVEL: 'loud', S3_BUCKET: 'cubes' }).ended;
  expect(code).toBe(1);
  expect(output).toContain('LOG_LEVEL must be');
  expect(output).not.toContain('is running');
});

test('production without its variables is refused with their names', async () => {
  const { code, output } = await start({ NODE_ENV: 'production' }).ended;
  expect(code).toBe(1);
  for (const name of ['DATABASE_URL', 'PUBLIC_URL', 'SESSION_SECRET', 'GITHUB_CLIENT_ID'])
    expect(output).toContain(`${name} is missing`);
});

test('when a part ends by itself, all of it stops, and with an error', async () => {
  writeFileSync(
    join(checkout, 'workers', 'main.ts'),
    `setTimeout(() => { throw new Error('out of luck'); }, 1500);`,
  );
  const { code, output } = await start().ended;
  expect(code).toBe(1);
  expect(output).toContain('out of luck');
  expect(output).toContain('The worker ended by itself (exit code 1). Stopping.');
  await expect(health()).rejects.toThrow();
});

test('the demo is made on an empty database and taken up again when it was not finished', async () => {
  writeFileSync(
    join(checkout, 'scripts', 'demo.ts'),
    `console.log('for ' + process.env.OUTSWELL_URL); process.exit(3);`,
  );
  const first = start();
  const output = await first.says(/could not be finished/);
  expect(output).toContain(`for http://127.0.0.1:${port}`);
  first.child.kill('SIGTERM');
  await first.ended;
  const none = start({ OUTSWELL_DEMO: '0' });
  expect(await none.says(/Outswell is running/)).not.toContain('Making the demo');
  none.child.kill('SIGTERM');
  await none.ended;
  writeFileSync(join(checkout, 'scripts', 'demo.ts'), `console.log('again');`);
  const second = start();
  await second.says(/The demo is ready/);
  second.child.kill('SIGTERM');
  await second.ended;
  expect(existsSync(join(checkout, '.data', 'demo-unfinished'))).toBe(false);
});
