import { readFileSync } from 'node:fs';
import { join } from 'node:path';
import { isProblem, type Problem } from '@/shared/contract/problem';
import { fitShell, liveFit } from '@/shared/shell/fit';
import type { FitInput } from '@/shared/shell/fitInput';
import type { Constraints, FitResult } from '@/shared/shell/fitResult';
import { PARAMETER_NAMES, type ModelName } from '@/shared/shell/shellModel';

const folder = join(__dirname, '../../tests/reference/shells/cases');
const load = (name: string): FitInput => JSON.parse(readFileSync(join(folder, `${name}.json`), 'utf8'));
const CASE: Record<ModelName, string> = {
  sphere: '05-large-15deg',
  cap: '04-cap-near-prior',
  drifting: '11-drifting',
  elliptical: '12-elliptical',
};
const free = Object.fromEntries(
  Object.entries(CASE).map(([model, name]) => [model, liveFit(load(name), { model: model as ModelName })]),
) as Record<ModelName, FitResult>;
const every = (Object.keys(CASE) as ModelName[]).flatMap((model) =>
  PARAMETER_NAMES[model]
    .filter((name) => !(model === 'cap' && name === 'vSys'))
    .map((name): [ModelName, string] => [model, name]),
);
const codes = (fit: FitResult) => fit.warnings.map((w) => w.code);

/** One and a half errors above the free fit: the others must give way. */
function displaced(model: ModelName, name: string): { value: number; se: number } {
  const { value, se } = free[model].parameters[name]!;
  return { value: value + 1.5 * se!, se: se! };
}

function run(model: ModelName, constraints: Constraints, optimiser: 'live' | 'record' = 'live'): FitResult {
  return fitShell({ ...load(CASE[model]), constraints }, { model, optimiser });
}

/** Largest difference of two fits in units of the free fit's errors, longitudes the short way round. */
function apart(model: ModelName, a: FitResult, b: FitResult): number {
  return Math.max(
    ...PARAMETER_NAMES[model].map((name) => {
      const off = a.parameters[name]!.value - b.parameters[name]!.value;
      const period = name === 'l' ? 360 : name === 'positionAngle' ? 180 : 1e9;
      return Math.abs(off - period * Math.round(off / period)) / free[model].parameters[name]!.se!;
    }),
  );
}

describe.each(every)('%s, %s', (model, name) => {
  const { value, se } = displaced(model, name);

  test('held: stays, without an error, and the others settle where a very narrow prior puts them', () => {
    const held = run(model, { [name]: { fixed: value } });
    const parameter = held.parameters[name]!;
    expect(parameter).toMatchObject({ value, se: 0, lo: value, hi: value, constraint: { fixed: value } });
    expect(held.dof).toBe(free[model].dof + 1);
    expect(held.extra.convergence!.reason).toBe('settled');
    const narrow = run(model, { [name]: { prior: { mean: value, sd: 1e-3 * se } } });
    expect(apart(model, held, narrow)).toBeLessThan(2e-3);
    expect(held.chi2).toBeGreaterThan(free[model].chi2 + 0.1);
    const at = PARAMETER_NAMES[model].indexOf(name);
    held.extra.covariance.forEach((row, a) => {
      expect(Math.abs(row[at]!)).toBeLessThan(1e-12 * (1 + se * se));
      if (a !== at) expect(row[a]!).toBeGreaterThan(0);
    });
  });

  test('held: both optimisers agree', () => {
    const constraints = { [name]: { fixed: value } };
    expect(apart(model, run(model, constraints, 'record'), run(model, constraints))).toBeLessThan(1e-4);
  });

  test('a wide prior changes nothing but the count; one as narrow as the error draws half way', () => {
    const wide = run(model, { [name]: { prior: { mean: value, sd: 1e4 * se } } });
    expect(apart(model, wide, free[model])).toBeLessThan(1e-3);
    expect(wide.dof).toBe(free[model].dof + 1);
    expect(Math.abs(wide.parameters[name]!.se! / se - 1)).toBeLessThan(2e-2);
    expect(codes(wide)).toEqual(codes(free[model]));
    const plain = free[model].extra.leastSquaresSe[name]!;
    const even = run(model, { [name]: { prior: { mean: value, sd: plain } } });
    const share = (even.parameters[name]!.value - free[model].parameters[name]!.value) / (1.5 * se);
    expect(share).toBeGreaterThan(0.3);
    expect(share).toBeLessThan(0.7);
    expect(codes(even)).not.toContain('prior-dominated');
    const leading = run(model, { [name]: { prior: { mean: value, sd: 0.3 * plain } } });
    expect(codes(leading)).toContain('prior-dominated');
    expect(leading.parameters[name]!.constraint).toEqual({ prior: { mean: value, sd: 0.3 * plain } });
  });

  test('a bound that is not reached changes nothing; one that is reached is the value', () => {
    const outside = name === 'axisRatio' ? 0.2 : value - 9 * se;
    const lax = run(model, { [name]: { low: outside, high: value + 9 * se } });
    expect(apart(model, lax, free[model])).toBeLessThan(1e-5);
    expect(codes(lax)).toEqual(codes(free[model]));
    const tight = run(model, { [name]: { low: value, high: value + 9 * se } });
    expect(tight.parameters[name]!.atBound).toBe('low');
    expect(tight.extra.convergence!.reason).toBe('at-bound');
    expect(codes(tight)).toContain('at-bound');
    expect(apart(model, tight, run(model, { [name]: { fixed: value } }))).toBeLessThan(1e-4);
    expect(
      apart(model, tight, run(model, { [name]: { low: value, high: value + 9 * se } }, 'record')),
    ).toBeLessThan(1e-4);
  });
});

test('several at once: a centre held across longitude 0, a bounded radius, a prior on the expansion', () => {
  const input = load('05-large-15deg');
  const { l, b, theta, vExp } = free.sphere.parameters;
  const fit = fitShell(
    {
      ...input,
      constraints: {
        l: { low: 350, high: 10 },
        b: { fixed: b!.value },
        theta: { high: theta!.value - theta!.se! },
        vExp: { prior: { mean: vExp!.value, sd: vExp!.se! }, low: 1 },
      },
    },
    { bootstrap: 40 },
  );
  expect(fit.parameters.theta).toMatchObject({ atBound: 'high', value: theta!.value - theta!.se! });
  expect(fit.parameters.l!.atBound).toBeUndefined();
  expect(Math.abs(((fit.parameters.l!.value - l!.value + 540) % 360) - 180)).toBeLessThan(5 * l!.se!);
  expect(fit.parameters.b).toMatchObject({ se: 0, lo: b!.value, hi: b!.value });
  expect(fit.parameters.theta!.hi).toBeLessThanOrEqual(theta!.value - theta!.se!);
  expect(fit.dof).toBe(free.sphere.dof + 2);
});

test('everything held but one parameter', () => {
  const { l, b, vSys, vExp } = free.sphere.parameters;
  const fit = run('sphere', {
    l: { fixed: l!.value },
    b: { fixed: b!.value },
    vSys: { fixed: vSys!.value },
    vExp: { fixed: vExp!.value },
  });
  expect(apart('sphere', fit, free.sphere)).toBeLessThan(1e-5);
  expect(fit.parameters.theta!.se!).toBeGreaterThan(0);
  expect(fit.parameters.theta!.se!).toBeLessThan(free.sphere.parameters.theta!.se!);
});

test('vSys of the marks file is the constraint of that name', () => {
  const input = load('04-cap-near-prior');
  const { vSys, ...marks } = input;
  const constraints = { vSys: { prior: { mean: vSys!.value, sd: vSys!.sigma! } } };
  expect(liveFit({ ...marks, constraints }, { model: 'cap' })).toEqual(liveFit(input, { model: 'cap' }));
});

function refusal(constraints: unknown, model: ModelName = 'sphere'): Problem {
  try {
    fitShell({ ...load('01-full-8x10'), constraints: constraints as Constraints }, { model });
  } catch (error) {
    if (isProblem(error)) return error;
    throw error;
  }
  throw new Error('the fit was not refused');
}

test.each<[string, unknown, string, ModelName?]>([
  ['an unknown parameter', { size: { fixed: 1 } }, 'constraints.size'],
  ['a parameter of another model', { axisRatio: { fixed: 0.8 } }, 'constraints.axisRatio'],
  ['held and bounded', { theta: { fixed: 2, high: 3 } }, 'constraints.theta'],
  ['held and under a prior', { theta: { fixed: 2, prior: { mean: 2, sd: 1 } } }, 'constraints.theta'],
  ['bounds the wrong way round', { vExp: { low: 12, high: 10 } }, 'constraints.vExp.low'],
  ['bounds that meet', { vSys: { low: 3, high: 3 } }, 'constraints.vSys.low'],
  ['one direction as both bounds', { l: { low: 10, high: 370 } }, 'constraints.l.low'],
  ['a prior without width', { vExp: { prior: { mean: 10, sd: 0 } } }, 'constraints.vExp.prior.sd'],
  ['a prior that is no number', { vExp: { prior: { mean: NaN, sd: 1 } } }, 'constraints.vExp.prior.mean'],
  ['an infinite bound', { theta: { high: Infinity } }, 'constraints.theta.high'],
  ['text', { theta: { fixed: '2' } }, 'constraints.theta.fixed'],
  ['no object', { theta: 2 }, 'constraints.theta'],
  ['a radius of nothing', { theta: { fixed: 0 } }, 'constraints.theta.fixed'],
  ['a latitude beyond the pole', { b: { fixed: 91 } }, 'constraints.b.fixed'],
  ['a negative expansion', { vExp: { fixed: -3 } }, 'constraints.vExp.fixed'],
  ['a round ellipse', { axisRatio: { fixed: 1 } }, 'constraints.axisRatio.fixed', 'elliptical'],
  ['a cap without v_sys', { vSys: { low: 0 } }, 'vSys', 'cap'],
])('%s is refused and named', (_what, constraints, field, ...model) => {
  const problem = refusal(constraints, ...model);
  expect(problem.type).toBe('invalid-input');
  expect(problem.extra.field).toBe(field);
  expect(problem.detail).toMatch(/\.$/);
});
