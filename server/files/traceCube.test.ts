import { readFile } from 'node:fs/promises';
import { join } from 'node:path';
import type { Edge } from '@/shared/contract/traces';
import { fitShell } from '@/shared/shell/fit';
import type { FitResult } from '@/shared/shell/fitResult';
import { tracedInput } from '@/shared/shell/trace/traceOutcome';
import { buildWcs } from '@/shared/sky/wcs';
import { openDiskSource } from './byteSource';
import { openPlain } from './plainSource';
import { traceCube } from './traceCube';

const folder = join(__dirname, '../../tests/reference/shells/cubes');
const json = async (name: string) => JSON.parse(await readFile(join(folder, name), 'utf8'));

async function traceAround(name: string, fit: FitResult, edge: Edge, watch?: () => void) {
  const file = await openDiskSource(join(folder, `${name}.fits.gz`));
  const plain = await openPlain(file);
  try {
    const progress: number[] = [];
    const outcome = await traceCube(
      { ...plain.pixels, understood: plain.head },
      {
        fit,
        edge,
        onProgress: (done) => {
          progress.push(done);
          watch?.();
        },
      },
    );
    return { outcome, progress, width: buildWcs(plain.head.wcs).velocityStep };
  } finally {
    await plain.close();
    await file.close();
  }
}

/** Noise that was put in, K. */
const cubes = [
  { name: 'alder', noise: 0.35 },
  { name: 'birch', noise: 0.25 },
  { name: 'cedar', noise: 0.8 },
];

describe.each(cubes)('$name', ({ name, noise }) => {
  test('the ridge, traced around a fit of marks, gives the shell that was put into the cube', async () => {
    const { truth } = await json(`${name}.fit.json`);
    const { outcome, progress, width } = await traceAround(
      name,
      fitShell(await json(`${name}.sky-marks.json`)),
      'ridge',
    );
    const { parameters, warnings } = fitShell(tracedInput(outcome, width));
    expect(Math.abs(parameters.theta!.value / truth.theta - 1)).toBeLessThan(0.03);
    expect(Math.abs(parameters.vExp!.value / truth.vExp - 1)).toBeLessThan(0.08);
    expect(Math.abs(parameters.vSys!.value - truth.vSys)).toBeLessThan(1);
    // the error bars hold what the scatter does not show
    expect(parameters.theta!.se!).toBeGreaterThan(0.1 * outcome.beamDeg);
    expect(parameters.vSys!.se!).toBeGreaterThan(0.3);
    expect(parameters.vExp!.se!).toBeGreaterThan(0.03 * parameters.vExp!.value);
    expect(warnings.map((w) => w.code)).not.toContain('poor-fit');
    expect(outcome.noise / noise).toBeGreaterThan(0.9);
    expect(outcome.noise / noise).toBeLessThan(1.2);
    expect(progress.at(-1)).toBe(1);
  });
});

test('the inner edge lies inside the ridge, in the same sectors', async () => {
  const fit = fitShell(await json('alder.sky-marks.json'));
  const { outcome: ridge } = await traceAround('alder', fit, 'ridge');
  const { outcome: inner } = await traceAround('alder', fit, 'inner');
  const inwards = ridge.sectors.flatMap(({ radius }, i) =>
    radius === null ? [] : [inner.sectors[i]!.radius! - radius],
  );
  expect(inwards.length).toBeGreaterThan(300);
  expect(Math.max(...inwards)).toBeLessThan(0.01 * ridge.beamDeg);
  expect(inner.seen).toBe(ridge.seen);
});

test('a fit beside the cube is refused before anything is read', async () => {
  const fit = fitShell(await json('cedar.sky-marks.json'));
  await expect(traceAround('birch', fit, 'ridge')).rejects.toMatchObject({ extra: { field: 'fitId' } });
});

test('what the progress throws ends the trace', async () => {
  const fit = fitShell(await json('alder.sky-marks.json'));
  await expect(
    traceAround('alder', fit, 'ridge', () => {
      throw new Error('stopped');
    }),
  ).rejects.toThrow('stopped');
});
