import { readFileSync } from 'node:fs';
import { join } from 'node:path';
import { fitShell, liveFit } from '@/shared/shell/fit';
import type { FitInput } from '@/shared/shell/fitInput';
import { meanScore } from '@/shared/shell/extras/leaveOneOut';
import type { FitResult } from '@/shared/shell/fitResult';
import type { ModelName } from '@/shared/shell/shellModel';

const folder = join(__dirname, '../../../tests/reference/shells/cases');
const load = (name: string) => JSON.parse(readFileSync(join(folder, name), 'utf8'));
const withAll = (name: string, model: ModelName, change: Partial<FitInput> = {}): FitResult =>
  liveFit({ ...load(`${name}.json`), ...change }, { model, extras: true });
const compared = (fit: FitResult, model: ModelName) =>
  fit.extra.comparison!.models.find((m) => m.model === model)!;

test('nothing of it without being asked', () => {
  expect(Object.keys(liveFit(load('01-full-8x10.json')).extra)).not.toContain('profiles');
});

describe('leave one channel out', () => {
  test.each([
    '01-full-8x10',
    '02-few-4x6',
    '03-arc-120',
    '04-cap-near-prior',
    '05-large-15deg',
    '07-outliers',
    '08-ring-bias',
    '10-one-sided',
    '11-drifting',
    '12-elliptical',
  ])('%s: the score is that of scipy', (name) => {
    const { model, fit } = load(`${name}.fit.json`);
    const score = meanScore(withAll(name, model).extra.leaveOneOut!)!;
    expect(Math.abs(score / fit.reference.leaveOneChannelOut - 1)).toBeLessThan(2e-3);
  });

  test('a shift is what a fit of the other channels gives', () => {
    const input = load('08-ring-bias.json') as FitInput;
    const fit = withAll('08-ring-bias', 'sphere');
    const [first] = fit.extra.leaveOneOut!;
    const marks = input.marks.filter((m) => Math.abs(m.velocity - first!.velocity) > 1e-6);
    expect(first!.marks).toBe(input.marks.length - marks.length);
    const without = liveFit({ ...input, marks }, { setAside: false });
    for (const [name, { value, se }] of Object.entries(fit.parameters)) {
      const shift = without.parameters[name]!.value - value;
      expect(Math.abs(first!.shift[name]! - shift)).toBeLessThan(1e-4 * se!);
      expect(first!.shiftInSe[name]).toBeCloseTo(shift / se!, 3);
    }
  });

  test('three channels cannot spare one, and a held parameter does not move', () => {
    const input = load('02-few-4x6.json') as FitInput;
    const velocities = [...new Set(input.marks.map((m) => m.velocity))].slice(0, 3);
    const marks = input.marks.filter((m) => velocities.includes(m.velocity));
    const left = liveFit({ ...input, marks }, { extras: true }).extra.leaveOneOut!;
    expect(left).toHaveLength(3);
    for (const one of left) {
      expect(one).toMatchObject({ score: null, marks: 6 });
      expect(one.problem).toMatch(/only 2, and a fit needs 3\.$/);
    }
    const held = withAll('02-few-4x6', 'sphere', { constraints: { vExp: { fixed: 15 } } });
    expect(held.extra.leaveOneOut![0]!.shift.vExp).toBeCloseTo(0, 10);
    expect(held.extra.leaveOneOut![0]!.shiftInSe.vExp).toBeNull();
  });
});

describe('profile likelihood', () => {
  test('is zero at the fit, a parabola of the least-squares error near it, and rises on both sides', () => {
    const fit = withAll('01-full-8x10', 'sphere');
    const { mark } = fit.extra.scales;
    expect(fit.extra.profiles!.map((p) => p.parameter)).toEqual(['theta', 'vExp']);
    for (const { parameter, values, deltaChi2 } of fit.extra.profiles!) {
      const { value, se } = fit.parameters[parameter]!;
      expect(values).toHaveLength(41);
      expect(values[20]).toBe(value);
      expect(deltaChi2[20]).toBe(0);
      const plain = fit.extra.leastSquaresSe[parameter]!;
      for (const at of [18, 19, 21, 22]) {
        const parabola = ((values[at]! - value) / plain) ** 2 / mark;
        expect(Math.abs(deltaChi2[at]! / parabola - 1)).toBeLessThan(0.03);
      }
      for (let i = 1; i < 41; i++) {
        const outward = i <= 20 ? deltaChi2[i - 1]! - deltaChi2[i]! : deltaChi2[i]! - deltaChi2[i - 1]!;
        expect(outward).toBeGreaterThan(0);
      }
      expect(Math.abs(values[0]! - value)).toBeGreaterThan(3 * se!);
    }
  });

  test('stays finite where v_exp is open above, ends at bounds, and leaves held parameters out', () => {
    const open = withAll('09-vexp-unconstrained', 'sphere').extra.profiles![1]!;
    expect(open.values.every(Number.isFinite) && open.deltaChi2.every(Number.isFinite)).toBe(true);
    expect(open.deltaChi2.at(-1)!).toBeLessThan(4);
    const { value } = withAll('01-full-8x10', 'sphere').parameters.theta!;
    const bounded = withAll('01-full-8x10', 'sphere', {
      constraints: { theta: { high: value + 0.001 }, vExp: { fixed: 15 } },
    }).extra.profiles!;
    expect(bounded.map((p) => p.parameter)).toEqual(['theta']);
    expect(bounded[0]!.values.at(-1)).toBeCloseTo(value + 0.001, 12);
  });
});

describe('other models on the same marks', () => {
  test('a sphere needs neither a drift nor an ellipse', () => {
    const fit = withAll('01-full-8x10', 'sphere');
    expect(fit.extra.comparison!.models.map((m) => m.model)).toEqual(['sphere', 'drifting', 'elliptical']);
    const sphere = compared(fit, 'sphere');
    expect(sphere).toMatchObject({ chi2: fit.chi2, dof: fit.dof, aicc: fit.aicc, bic: fit.bic, wald: null });
    expect(compared(fit, 'drifting').sentence).toMatch(/^The marks do not support a drift \(p = 0\.\d+\)\.$/);
    const ellipse = compared(fit, 'elliptical');
    expect(ellipse.sentence).toMatch(/^The marks do not support an ellipse \(p = 0\.\d+\)\.$/);
    expect(Object.keys(ellipse.parameters!)).toEqual(['l', 'b', 'theta', 'vSys', 'vExp']);
    for (const { leaveOneOut } of fit.extra.comparison!.models) expect(leaveOneOut).toBeGreaterThan(0);
  });

  test.each<[string, ModelName, RegExp]>([
    ['11-drifting', 'drifting', /^The marks support a drift of 0\.\d+ degrees per km\/s \(p < 0\.001\)\.$/],
    ['12-elliptical', 'elliptical', /^The marks support an ellipse of axis ratio 0\.7\d \(p < 0\.001\)\.$/],
  ])('%s is found from a sphere, and the numbers are those of its own fit', (name, model, said) => {
    const found = compared(withAll(name, 'sphere'), model);
    expect(found.sentence).toMatch(said);
    const own = fitShell(load(`${name}.json`), { model });
    expect(found.chi2! / own.chi2).toBeCloseTo(1, 6);
    expect(found.wald!.f / own.extra.extraParameters!.f).toBeCloseTo(1, 4);
    expect(found).toMatchObject({ dof: own.dof });
    const fromItself = withAll(name, model);
    expect(compared(fromItself, 'sphere').chi2).toBeGreaterThan(own.chi2 + 50);
    expect(compared(fromItself, model).chi2! / own.chi2).toBeCloseTo(1, 6);
  });

  test('under the same constraints: a cap stays a cap, a held drift is not judged', () => {
    const cap = withAll('04-cap-near-prior', 'cap');
    expect(cap.extra.comparison!.models.map((m) => m.model)).toEqual(['cap', 'drifting', 'elliptical']);
    for (const { parameters, problem } of cap.extra.comparison!.models)
      if (!problem) expect(parameters!.vSys!.value).toBeCloseTo(5.65, 0);
    const held = withAll('11-drifting', 'drifting', { constraints: { driftL: { fixed: 0.01 } } });
    expect(compared(held, 'drifting').sentence).toMatch(/cannot be told/);
  });

  test('too few marks for the larger models', () => {
    const input = load('02-few-4x6.json') as FitInput;
    const perChannel = new Map<number, number>();
    const marks = input.marks.filter(({ velocity }) => {
      perChannel.set(velocity, (perChannel.get(velocity) ?? 0) + 1);
      return perChannel.get(velocity)! <= (perChannel.size > 3 ? 1 : 2);
    });
    const fit = liveFit({ ...input, marks }, { extras: true });
    expect(marks.length).toBe(7);
    expect(compared(fit, 'drifting')).toMatchObject({ chi2: null, wald: null, parameters: null });
    expect(compared(fit, 'drifting').sentence).toMatch(/7 marks; this model needs at least 8/);
  });
});
