import { randomUUID } from 'node:crypto';
import { existsSync, mkdtempSync, readdirSync, rmSync, writeFileSync } from 'node:fs';
import { connect, createServer, type AddressInfo } from 'node:net';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { startObjectStore } from '../fakes/objectStore';
import { makeCubeStore, type CubeStore } from './cubeStore';
import { freeBytes } from './diskSpace';
import { s3CubeStore } from './s3CubeStore';

let dir: string;
beforeAll(() => {
  dir = mkdtempSync(join(tmpdir(), 'outswell-store-'));
});
afterAll(() => rmSync(dir, { recursive: true, force: true }));

/** Bytes that tell their own position, so that a slice from the wrong place is seen. */
const sample = (length: number) => Uint8Array.from({ length }, (_, i) => (i * 131 + (i >> 8) * 17) & 255);

function localFile(bytes: Uint8Array): string {
  const path = join(dir, `upload-${randomUUID()}`);
  writeFileSync(path, bytes);
  return path;
}

async function readAll(store: CubeStore, key: string): Promise<Uint8Array> {
  const source = await store.open(key);
  try {
    return await source.read(0, source.size);
  } finally {
    await source.close();
  }
}

type Opened = { store: CubeStore; stop(): Promise<void> };
const stores: [string, () => Promise<Opened>][] = [
  [
    'on disk',
    async () => {
      const store = makeCubeStore({ dataDir: join(dir, 'disk'), objectStore: null });
      return { store, stop: store.close };
    },
  ],
  [
    'in an S3 store',
    async () => {
      const fake = await startObjectStore({ env: 'test', directory: join(dir, 's3'), bucket: 'cubes' });
      const store = makeCubeStore({ dataDir: dir, objectStore: fake.config });
      return {
        store,
        async stop() {
          await store.close();
          await fake.stop();
        },
      };
    },
  ],
];

describe.each(stores)('a cube store %s', (_, start) => {
  let opened: Opened;
  let store: CubeStore;
  const key = () => `cubes/${randomUUID()}.fits`;
  beforeAll(async () => {
    opened = await start();
    store = opened.store;
  });
  afterAll(() => opened.stop());

  test('takes over a local file whole', async () => {
    const bytes = sample(100_003);
    const path = localFile(bytes);
    const k = key();
    await store.put(k, path);
    expect(existsSync(path)).toBe(false);
    expect(Buffer.compare(await readAll(store, k), bytes)).toBe(0);
  });

  test('takes over an empty file', async () => {
    const k = key();
    await store.put(k, localFile(new Uint8Array(0)));
    expect(await readAll(store, k)).toHaveLength(0);
  });

  test('does nothing when a file was already taken over', async () => {
    const path = localFile(sample(10));
    const k = key();
    await store.put(k, path);
    await store.put(k, path);
    expect(await readAll(store, k)).toHaveLength(10);
  });

  test('refuses to take over a file that was never there', async () => {
    const k = key();
    await expect(store.put(k, join(dir, 'nothing'))).rejects.toThrow(/ENOENT/);
    expect(await store.exists(k)).toBe(false);
  });

  test.each([
    ['the beginning', 0, 10, 0, 10],
    ['the middle', 2880, 512, 2880, 3392],
    ['up to the end', 5990, 10, 5990, 6000],
    ['past the end', 5990, 100, 5990, 6000],
    ['beyond the end', 7000, 5, 0, 0],
    ['nothing', 5, 0, 0, 0],
  ])('reads %s', async (_what, offset, length, from, to) => {
    const bytes = sample(6000);
    const k = key();
    await store.writeBytes(k, bytes);
    const source = await store.open(k);
    expect(source.size).toBe(6000);
    expect([...(await source.read(offset, length))]).toEqual([...bytes.subarray(from, to)]);
    await source.close();
  });

  test('replaces bytes written under the same key', async () => {
    const k = key();
    await store.writeBytes(k, sample(50));
    await store.writeBytes(k, sample(20));
    expect(await readAll(store, k)).toHaveLength(20);
  });

  test('tells what exists, and removes it once or twice', async () => {
    const k = key();
    expect(await store.exists(k)).toBe(false);
    await store.writeBytes(k, sample(5));
    expect(await store.exists(k)).toBe(true);
    await store.remove(k);
    await store.remove(k);
    expect(await store.exists(k)).toBe(false);
  });

  test('says that a file is gone, in words', async () => {
    await expect(store.open(key())).rejects.toMatchObject({ type: 'not-found', detail: /not in the store/ });
  });

  test.each([
    '../outside',
    'cubes/../../outside',
    '/etc/passwd',
    'cubes/',
    'a',
    'cubes//x',
    'cubes/.hidden',
    'cubes/a\0b',
    '',
  ])('refuses the key %j', async (bad) => {
    await expect(store.writeBytes(bad, sample(1))).rejects.toThrow(RangeError);
    await expect(store.open(bad)).rejects.toThrow(RangeError);
    await expect(store.put(bad, localFile(sample(1)))).rejects.toThrow(RangeError);
    await expect(Promise.resolve().then(() => store.remove(bad))).rejects.toThrow(RangeError);
  });
});

test('a large file reaches an S3 store in parts', async () => {
  const fake = await startObjectStore({ env: 'test', directory: join(dir, 's3-parts'), bucket: 'cubes' });
  const store = s3CubeStore(fake.config, { partsFromBytes: 8 * 1024 ** 2, partBytes: 5 * 1024 ** 2 });
  const bytes = sample(12 * 1024 ** 2 + 7);
  await store.put('cubes/large.fits', localFile(bytes));
  expect(Buffer.compare(await readAll(store, 'cubes/large.fits'), bytes)).toBe(0);
  await store.close();
  await fake.stop();
});

test('a connection that breaks while a file goes out is made again', async () => {
  const fake = await startObjectStore({ env: 'test', directory: join(dir, 's3-flaky'), bucket: 'cubes' });
  let connections = 0;
  const proxy = createServer((client) => {
    connections += 1;
    if (connections === 1) return void client.once('data', () => client.destroy());
    const store = connect(Number(new URL(fake.config.endpoint!).port), '127.0.0.1');
    for (const [from, to] of [
      [client, store],
      [store, client],
    ] as const)
      from.pipe(to).once('error', () => to.destroy());
  });
  await new Promise<void>((listening) => proxy.listen(0, '127.0.0.1', listening));
  const { port } = proxy.address() as AddressInfo;
  const store = s3CubeStore({ ...fake.config, endpoint: `http://127.0.0.1:${port}` });
  await store.put('cubes/flaky.fits', localFile(sample(300_000)));
  expect(connections).toBeGreaterThan(1);
  expect(Buffer.compare(await readAll(store, 'cubes/flaky.fits'), sample(300_000))).toBe(0);
  await store.close();
  await new Promise((closed) => proxy.close(closed));
  await fake.stop();
});

test('a store that does not answer is told as such, and the local file stays', async () => {
  const fake = await startObjectStore({ env: 'test', directory: join(dir, 's3-gone'), bucket: 'cubes' });
  await fake.stop();
  const store = s3CubeStore(fake.config);
  const path = localFile(sample(10));
  await expect(store.put('cubes/x.fits', path)).rejects.toMatchObject({ type: 'unavailable' });
  expect(existsSync(path)).toBe(true);
  await store.close();
});

test('a failed write leaves nothing under a name of its own', async () => {
  const store = makeCubeStore({ dataDir: join(dir, 'clean'), objectStore: null });
  await store.writeBytes('cubes/a.fits', sample(3));
  expect(readdirSync(join(dir, 'clean', 'cubes'))).toEqual(['a.fits']);
});

test('free space is told for a folder that is still to be made', async () => {
  const free = await freeBytes(join(dir, 'to', 'be', 'made'));
  expect(free).toBeGreaterThan(0);
  expect(Number.isInteger(free)).toBe(true);
});

test('the local object store refuses to run in production', async () => {
  await expect(startObjectStore({ env: 'production', directory: dir, bucket: 'cubes' })).rejects.toThrow(
    /production/,
  );
});
