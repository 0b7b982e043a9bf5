import { execFile } from 'node:child_process';
import { mkdtemp, readFile, rm, writeFile } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { gunzipSync } from 'node:zlib';
import { TraceOutcome } from '@/shared/contract/traces';

const root = join(__dirname, '../..');
const cubes = join(root, 'tests/reference/shells/cubes');
let folder: string;
beforeAll(async () => (folder = await mkdtemp(join(tmpdir(), 'trace-'))));
afterAll(() => rm(folder, { recursive: true }));

const fit = (...args: string[]): Promise<{ code: number; stdout: string; stderr: string }> =>
  new Promise((resolve) => {
    execFile(
      process.execPath,
      ['--import', 'tsx', 'scripts/fit.ts', ...args],
      { cwd: root, maxBuffer: 64 * 2 ** 20 },
      (error, stdout, stderr) => resolve({ code: Number(error?.code ?? 0), stdout, stderr }),
    );
  });

describe('npm run fit with --trace', () => {
  it.each([
    ['ridge', 'cedar', false],
    ['inner', 'alder', true],
  ])('fits the %s of %s, and prints what was found where', async (edge, name, plain) => {
    let cube = join(cubes, `${name}.fits.gz`);
    if (plain)
      await writeFile(
        (cube = join(folder, `${name}.fits`)),
        gunzipSync(await readFile(join(cubes, `${name}.fits.gz`))),
      );
    const { code, stdout, stderr } = await fit(cube, join(cubes, `${name}.marks.json`), '--trace', edge);
    expect({ code, stderr }).toEqual({ code: 0, stderr: '' });
    const { parameters, extra, provenance, rings } = JSON.parse(stdout);
    const outcome = TraceOutcome.parse(extra.trace);
    const found = outcome.sectors.filter((s) => s.rejected === null);
    expect(provenance.marks).toBe(found.length);
    expect(outcome.seen).toBeCloseTo(found.length / outcome.sectors.length, 12);
    expect(rings[0].channel).toBe(outcome.seenByChannel.find((c) => c.seen > 0)!.channel);
    const { truth } = JSON.parse(await readFile(join(cubes, `${name}.fit.json`), 'utf8'));
    expect(Math.abs(parameters.vSys.value - truth.vSys)).toBeLessThan(1);
    const off = (parameters.theta.value - truth.theta) / outcome.beamDeg;
    if (edge === 'ridge') {
      expect(Math.abs(parameters.theta.value / truth.theta - 1)).toBeLessThan(0.03);
      expect(Math.abs(parameters.vExp.value / truth.vExp - 1)).toBeLessThan(0.08);
    } else {
      expect(off).toBeLessThan(-0.4); // inner edges lie 0.5 to 1.3 beams inside
      expect(off).toBeGreaterThan(-1.5);
    }
  });
});
