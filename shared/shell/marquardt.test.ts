import { dampedStep, descend, expectedGain } from '@/shared/shell/marquardt';
import { accumulate, invert } from '@/shared/shell/normalEquations';
import { strdProblems, type StrdProblem } from '@/tests/reference/nistStrd';

/** The optimiser of the shell fit on any model of one variable; derivatives by eighth-order differences. */
function fitCurve({ x, y, model }: StrdProblem, start: readonly number[]) {
  const size = start.length;
  const n = x.length;
  const p = Float64Array.from(start);
  const next = new Float64Array(size);
  const residual = new Float64Array(n);
  const jacobian = new Float64Array(n * size);
  const weight = new Float64Array(n).fill(1);
  const perParameter = () => new Float64Array(size);
  const space = {
    A: new Float64Array(size * size),
    damped: new Float64Array(size * size),
    ...{ g: perParameter(), scale: perParameter(), step: perParameter() },
  };
  const c = [4 / 5, -1 / 5, 4 / 105, -1 / 280];
  const linearise = () => {
    for (let i = 0; i < n; i++) {
      residual[i] = model(x[i]!, [...p]) - y[i]!;
      for (let a = 0; a < size; a++) {
        const h = 1e-3 * Math.abs(p[a]!);
        const moved = (by: number) =>
          model(
            x[i]!,
            [...p].map((b, j) => (j === a ? b + by : b)),
          );
        jacobian[i * size + a] = c.reduce(
          (sum, w, k) => sum + (w * (moved((k + 1) * h) - moved(-(k + 1) * h))) / h,
          0,
        );
      }
    }
    return accumulate(size, residual, jacobian, weight, space.A, space.g);
  };
  const result = descend(
    {
      linearise,
      step: (damping) => (dampedStep(size, damping, space) ? expectedGain(space) : null),
      trial: () => {
        for (let a = 0; a < size; a++) next[a] = p[a]! + space.step[a]!;
        return x.reduce((sum, at, i) => sum + (model(at, [...next]) - y[i]!) ** 2, 0);
      },
      accept: () => p.set(next),
      perDof: (cost) => cost / (n - size),
    },
    { tolerance: 1e-9, maxIterations: 2000 },
  );
  const sum = linearise();
  const inverse = invert(size, space.A)!;
  const sd = start.map((_, a) => Math.sqrt((inverse[a * size + a]! * sum) / (n - size)));
  return { ...result, p, sd, sum };
}

const relative = (mine: number, certified: number) => Math.abs(mine / certified - 1);

describe.each(strdProblems.flatMap((s) => s.starts.map((start, at) => [s.name, at + 1, s, start] as const)))(
  'NIST StRD %s from start %i',
  (_name, _at, problem, start) => {
    test('reaches the certified values and standard deviations to six digits', () => {
      const { p, sd, sum, settled } = fitCurve(problem, start);
      expect(settled).toBe(true);
      problem.certified.forEach(([value, deviation], a) => {
        expect(relative(p[a]!, value)).toBeLessThan(5e-7);
        expect(relative(sd[a]!, deviation)).toBeLessThan(5e-7);
      });
      expect(relative(sum, problem.sumOfSquares)).toBeLessThan(5e-7);
    });
  },
);
