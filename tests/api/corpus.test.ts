/** Every odd and broken file of the corpus through upload, ingest and the pixels that come back. */
import { readFileSync } from 'node:fs';
import { join } from 'node:path';
import { gunzipSync } from 'node:zlib';
import manifest from '../reference/fits-corpus/manifest.json';
import { newRegion } from './fixture';
import { startProduct, until, type Product, type SignedIn } from './harness';
import { upload } from './uploading';

interface Expected {
  file: string;
  expectation: 'ok' | 'ok-with-caution' | 'error';
  alsoAcceptable: string[];
  shape: { nx: number; ny: number; channels: number } | null;
  spectral: { velocities: [number, number] | null } | null;
  stats:
    | { min: number | null; max: number | null; mean: number | null; rms: number | null; blank: number }[]
    | null;
}
const FILES = manifest.files as unknown as Expected[];
const FOLDER = join(__dirname, '../reference/fits-corpus');

let product: Product;
let lead: SignedIn;
let regionId: string;
beforeAll(async () => {
  product = await startProduct({ MAX_EXPANDED_BYTES: String(50e6) });
  await product.startWorker();
  lead = await product.signIn('lena');
  regionId = await newRegion(lead);
});
afterAll(() => product.stop());

const bytesOf = (name: string): Buffer => {
  const bytes = readFileSync(join(FOLDER, name));
  // stored compressed once more, so that no tool expands it by accident
  return name.endsWith('.gz.gz') ? gunzipSync(bytes) : bytes;
};
const near = (found: number | null, expected: number | null, scale: number) =>
  expected === null
    ? expect(found).toBeNull()
    : expect(Math.abs(found! - expected)).toBeLessThanOrEqual(2e-7 * scale);

async function bring(name: string) {
  const filename = name.replace(/\.gz\.gz$/, '.gz');
  const { cubeId, problem } = await upload(lead, product.url, regionId, bytesOf(name), { filename });
  if (!cubeId) return { cube: null, problem };
  const cube = await until(
    async () => (await lead.get(`/cubes/${cubeId}`)).body,
    (c) => c.status === 'ready' || c.status === 'failed',
  );
  return { cube, problem: cube.problem };
}

test.each(FILES.map((f) => [f.file, f] as const))('%s', async (name, expected) => {
  const { cube, problem } = await bring(name);
  const outcome = cube?.status === 'ready' ? (cube.cautions.length > 0 ? 'ok-with-caution' : 'ok') : 'error';
  if (problem) {
    expect([expected.expectation, ...expected.alsoAcceptable]).toContain('error');
    expect(problem).toMatchObject({ title: expect.any(String), detail: expect.stringMatching(/\w{3}/) });
    return;
  }
  expect([expected.expectation, ...expected.alsoAcceptable].map((e) => e.slice(0, 2))).toContain(
    outcome.slice(0, 2),
  );
  if (!expected.shape) return; // readable by a judgement that the reference does not make
  expect(cube.axes).toMatchObject(expected.shape);
  const { items } = (await lead.get(`/cubes/${cube.id}/channels`).expect(200)).body;
  expected.stats!.forEach((s, k) => {
    const scale = Math.max(Math.abs(s.min ?? 1), Math.abs(s.max ?? 1));
    expect(items[k].blanks).toBe(s.blank);
    near(items[k].minimum, s.min, scale);
    near(items[k].maximum, s.max, scale);
    near(items[k].mean, s.mean, scale);
    near(items[k].rmsAboutZero, s.rms, scale);
  });
  if (expected.spectral?.velocities) {
    expect(items[0].velocity).toBeCloseTo(expected.spectral.velocities[0], 6);
    expect(items.at(-1).velocity).toBeCloseTo(expected.spectral.velocities[1], 6);
  }
  await lead.get(`/cubes/${cube.id}/channels/0/plane`).expect(200);
  await lead.get(`/cubes/${cube.id}/strip`).expect(200);
});

test('after all of them the region holds the good ones, and nothing broken', async () => {
  const { items } = (await lead.get(`/regions/${regionId}/cubes`)).body;
  expect(items.length).toBeGreaterThan(60);
  expect(items.filter((c: { status: string }) => !['ready', 'failed'].includes(c.status))).toEqual([]);
});
