import { levenbergMarquardt } from 'ml-levenberg-marquardt';
import { evaluation } from '@/shared/shell/frame';
import {
  boundsOf,
  solveAndRecentre,
  workspace,
  type Outcome,
  type ShellProblem,
  type ShellState,
} from '@/shared/shell/gaussNewton';
import { accumulate } from '@/shared/shell/normalEquations';
import { evaluate } from '@/shared/shell/residuals';
import { LN_W, THETA, V0 } from '@/shared/shell/shellModel';

const ROUNDS = 8;
const STEPS_A_ROUND = 8;
/** A round that moves nothing by more than this, in standard errors, is the last. */
const SETTLED = 1e-4;

/**
 * The fit of record: rounds of Levenberg-Marquardt by ml-levenberg-marquardt, the weights renewed between rounds, then
 * a last polish to 1e-6 of a standard error.
 *
 * The library damps all parameters alike and judges progress by absolute numbers, so it is given residuals in units of
 * their errors and parameters in units of their curvature, and a fixed number of steps. It neither refuses an uphill
 * step nor says why it stopped; it returns the best point it saw, which is what a round takes over.
 */
export function solveForRecord(problem: ShellProblem, state: ShellState): Outcome {
  const { model, marks, vSys } = problem;
  const { frame, p } = state;
  const size = p.length;
  const held = vSys !== null && vSys.sigma === 0;
  const prior = vSys !== null && vSys.sigma > 0 ? vSys : null;
  const free = Array.from({ length: size }, (_, a) => a).filter((a) => !(held && a === V0));
  if (held) p[V0] = vSys.value;
  const at = evaluation(marks, size);
  const A = new Float64Array(size * size);
  const g = new Float64Array(size);
  const points = marks.count + (prior === null ? 0 : 1); // a prior is one more residual
  const data = { x: Array.from({ length: points }, (_, i) => i), y: new Float64Array(points) };
  const bounds = boundsOf(marks);
  const lowest = (a: number) => (a === THETA ? bounds.thetaLow : a === LN_W ? bounds.lnWLow : -Infinity);
  const highest = (a: number) => (a === THETA ? bounds.thetaHigh : a === LN_W ? bounds.lnWHigh : Infinity);
  let iterations = 0;

  for (let round = 0; round < ROUNDS; round++) {
    evaluate(model, marks, frame, p, at);
    const perError = at.variance.map((v) => 1 / Math.sqrt(v));
    accumulate(
      size,
      at.residual,
      at.jacobian,
      at.variance.map((v) => 1 / v),
      A,
      g,
    );
    if (prior) A[V0 * size + V0] = A[V0 * size + V0]! + 1 / prior.sigma ** 2;
    const unit = free.map((a) => 1 / Math.sqrt(A[a * size + a]!));
    if (!unit.every(Number.isFinite)) break;
    const origin = Float64Array.from(p);
    const placed = (scaled: number[]) => {
      free.forEach((a, i) => (p[a] = origin[a]! + unit[i]! * scaled[i]!));
      evaluate(model, marks, frame, p, at);
    };
    const { parameterValues } = levenbergMarquardt(
      data,
      (scaled) => {
        placed(scaled);
        const r = at.residual.map((value, i) => value * perError[i]!);
        const fromPrior = prior ? (p[V0]! - prior.value) / prior.sigma : 0;
        return (i) => (i < marks.count ? r[i]! : fromPrior);
      },
      {
        initialValues: free.map(() => 0),
        maxIterations: STEPS_A_ROUND,
        errorTolerance: 0,
        minValues: free.map((a, i) => (lowest(a) - origin[a]!) / unit[i]!),
        maxValues: free.map((a, i) => (highest(a) - origin[a]!) / unit[i]!),
        jacobianFunction: (scaled) => {
          placed(scaled);
          const rows = Float64Array.from(at.jacobian);
          return (i) =>
            i < marks.count
              ? free.map((a, c) => rows[i * size + a]! * unit[c]! * perError[i]!)
              : free.map((a, c) => (a === V0 ? unit[c]! / prior!.sigma : 0));
        },
      },
    );
    iterations += STEPS_A_ROUND;
    free.forEach((a, i) => (p[a] = origin[a]! + unit[i]! * parameterValues[i]!));
    if (Math.max(...parameterValues.map(Math.abs)) < SETTLED) break;
  }
  const polished = solveAndRecentre(problem, { frame, p }, { tolerance: 1e-6 }, workspace(marks, size));
  return { ...polished, iterations: iterations + polished.iterations };
}
