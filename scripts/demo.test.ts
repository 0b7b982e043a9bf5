import { spawn } from 'node:child_process';
import type { Fit } from '@/shared/contract/fits';
import type { Region } from '@/shared/contract/regions';
import type { Shell } from '@/shared/contract/shells';
import { startProduct, type Product, type SignedIn } from '@/tests/api/harness';
import { PLAN } from './demo/plan';

let product: Product;
let reader: SignedIn;

beforeAll(async () => {
  product = await startProduct();
  await product.startWorker();
}, 60_000);
afterAll(() => product.stop());

const runDemo = (url: string | undefined) =>
  new Promise<{ code: number | null; out: string; err: string }>((resolve) => {
    const env = { ...process.env, OUTSWELL_URL: url };
    const child = spawn(process.execPath, ['--import', 'tsx', 'scripts/demo.ts'], { env });
    let [out, err] = ['', ''];
    child.stdout.on('data', (piece: Buffer) => (out += piece.toString()));
    child.stderr.on('data', (piece: Buffer) => (err += piece.toString()));
    child.on('close', (code) => resolve({ code, out, err }));
  });

const items = async <T>(path: string) => (await reader.get(path).expect(200)).body.items as T[];
const planned = PLAN.flatMap(({ cubes }) => cubes.flatMap(({ shells }) => shells));

async function everything() {
  const regions = await items<Region>('/regions');
  const shells = await items<Shell>('/shells?adopted=any');
  return { regions, shells };
}

/** What a run leaves that is killed while it sends a cube. */
async function leaveUpload(regionId: string) {
  const { agent, csrf } = await product.signIn('bram');
  const encoded = (text: string) => Buffer.from(text).toString('base64');
  await agent
    .post('/api/v1/uploads')
    .set('X-CSRF-Token', csrf)
    .set('Tus-Resumable', '1.0.0')
    .set('Upload-Length', '100000')
    .set('Upload-Metadata', `filename ${encoded('QR-1.fits')},regionId ${encoded(regionId)}`)
    .expect(201);
}

test('fills an empty installation; a second run adds nothing and clears away what a killed one left', async () => {
  const first = await runDemo(product.url);
  expect(first).toMatchObject({ code: 0, err: '' });
  reader = await product.signIn('dagny');
  const made = await everything();
  expect(made.regions.map((r) => [r.name, r.counts.cubes, r.counts.shells]).sort()).toEqual([
    ['Far Meadow', 2, 4],
    ['Quiet Reach', 2, 4],
  ]);
  expect(made.regions.map((r) => r.waiting.uploads + r.waiting.ingesting + r.waiting.failedCubes)).toEqual([
    0, 0,
  ]);
  expect(made.shells.map((s) => s.name).sort()).toEqual(planned.map((s) => s.name).sort());
  for (const shell of made.shells) {
    const plan = planned.find((s) => s.name === shell.name)!;
    expect([shell.name, shell.readings.length]).toEqual([shell.name, plan.readings.length]);
    const fits = (plan.fit ? 1 : 0) + (plan.compare?.models?.length ?? 0) + (plan.compare?.traced ? 1 : 0);
    expect([shell.name, shell.fits]).toEqual([shell.name, fits]);
    expect([shell.name, shell.adoptedFitId !== null]).toEqual([shell.name, plan.fit?.adopt ?? false]);
  }

  const quiet = made.regions.find((r) => r.name === 'Quiet Reach')!;
  await leaveUpload(quiet.id);
  expect((await everything()).regions.find((r) => r.id === quiet.id)!.waiting.uploads).toBe(1);
  const again = await runDemo(product.url);
  expect(again).toMatchObject({ code: 0, err: '' });
  expect(await everything()).toEqual(made);
}, 120_000);

test('its fits of record find the shells that are in the cubes', async () => {
  const truths = PLAN.flatMap(({ cubes }) => cubes.flatMap(({ recipe }) => recipe.shells));
  const { shells } = await everything();
  let fitted = 0;
  for (const shell of shells)
    for (const fit of await items<Fit>(`/shells/${shell.id}/fits`)) {
      const truth = truths.find((t) => t.name === shell.name)!;
      for (const name of ['l', 'b', 'theta', 'vSys', 'vExp'] as const) {
        const { value, se } = fit.parameters![name]!;
        expect(Math.abs(value - truth[name]) / se!).toBeLessThan(4);
      }
      fitted++;
    }
  expect(fitted).toBe(8);
});

test('says in a sentence why it could not be made', async () => {
  const nobody = await runDemo('http://127.0.0.1:9');
  expect(nobody.code).toBe(1);
  expect(nobody.err).toMatch(/^The demo could not be made: http:\/\/127\.0\.0\.1:9 does not answer/);
  const unsaid = await runDemo('');
  expect(unsaid).toMatchObject({ code: 1, err: expect.stringContaining('OUTSWELL_URL') });
}, 30_000);
