import { readFileSync } from 'node:fs';
import { join } from 'node:path';
import { joined, percentiles } from '@/shared/shell/bootstrap';
import { bootstrapDraws, finishFit, fitShell, solveFit } from '@/shared/shell/fit';

const folder = join(__dirname, '../../tests/reference/shells/cases');
const load = (name: string) => JSON.parse(readFileSync(join(folder, name), 'utf8'));

describe('interval ends against 4000 draws made with numpy', () => {
  test.each([
    '01-full-8x10',
    '02-few-4x6',
    '03-arc-120',
    '04-cap-near-prior',
    '05-large-15deg',
    '06-small-5-beams',
    '07-outliers',
    '08-ring-bias',
    '09-vexp-unconstrained',
    '10-one-sided',
    '11-drifting',
    '12-elliptical',
  ])('%s', (name) => {
    const { model, fit, tolerance } = load(`${name}.fit.json`);
    const mine = fitShell(load(`${name}.json`), { model, bootstrap: 500, seed: 1 });
    expect(mine.errorBars).toBe('bootstrap');
    const unconstrained = fit.warnings.some((w: { code: string }) => w.code === 'vexp-unconstrained');
    for (const parameter of Object.keys(fit.parameters)) {
      if (unconstrained && ['theta', 'vSys', 'vExp'].includes(parameter)) continue;
      for (const end of ['lo', 'hi'] as const) {
        const theirs = fit.reference.bootstrap[end][parameter];
        const off = Math.abs(mine.parameters[parameter]![end]! - theirs);
        expect(off).toBeLessThan(tolerance.bootstrap * fit.parameters[parameter].se);
      }
    }
    if (unconstrained) expect(mine.parameters.vExp!.hi).toBeNull();
  });
});

test('the same seed gives the same bits, another seed other draws', () => {
  const marks = load('02-few-4x6.json');
  const run = (seed: number) => fitShell(marks, { bootstrap: 60, seed });
  expect(JSON.stringify(run(4))).toBe(JSON.stringify(run(4)));
  expect(run(4).parameters.theta!.lo).not.toBe(run(5).parameters.theta!.lo);
});

test('draws and progress are handed out, and a callback can end the fit', () => {
  const marks = load('01-full-8x10.json');
  const seen: number[] = [];
  let rows = 0;
  const fit = fitShell(marks, {
    bootstrap: 100,
    onProgress: (done) => seen.push(done),
    onDraws: (values) => (rows = values.length / 5),
  });
  expect(seen).toEqual([0.25, 0.5, 0.75, 1]);
  expect(rows).toBe(100);
  expect(fit.provenance.seed).toBe(1);
  const stop = () => {
    throw new Error('enough');
  };
  expect(() => fitShell(marks, { bootstrap: 100, onProgress: stop })).toThrow('enough');
});

test('percentiles unwrap angles and keep infinities', () => {
  const longitudes = Float64Array.from({ length: 101 }, (_, i) => (359.5 + i / 100) % 360);
  const { lo, hi } = percentiles(longitudes, 1, 0, 0, 360);
  expect(lo).toBeCloseTo(-0.34, 10);
  expect(hi).toBeCloseTo(0.34, 10);
  const unbounded = Float64Array.from({ length: 101 }, (_, i) => (i < 70 ? i : Infinity));
  expect(percentiles(unbounded, 1, 0, 20)).toEqual({ lo: 16, median: 50, hi: Infinity, sd: Infinity });
});

test('draws made in parts, by others who got the solution as plain data, are those made in one go', () => {
  const marks = load('04-cap-near-prior.json');
  const solved = solveFit(marks, { model: 'cap' });
  const parts = [
    [0, 13],
    [13, 40],
    [40, 60],
  ].map(([from, to]) => bootstrapDraws(structuredClone(solved), { seed: 9 }, from!, to!));
  const whole = bootstrapDraws(solved, { seed: 9 }, 0, 60);
  expect(joined(parts)).toEqual(whole);
  const options = { model: 'cap' as const, bootstrap: 60, seed: 9 };
  expect(JSON.stringify(finishFit(solved, options, joined(parts)))).toBe(
    JSON.stringify(fitShell(marks, options)),
  );
});
