import { levenbergMarquardt } from 'ml-levenberg-marquardt';
import { boundsOf, intoBounds } from '@/shared/shell/bounds';
import { evaluation, type Evaluation } from '@/shared/shell/frame';
import {
  solveAndRecentre,
  type Outcome,
  type ShellProblem,
  type ShellState,
} from '@/shared/shell/gaussNewton';
import { accumulate } from '@/shared/shell/normalEquations';
import { evaluate } from '@/shared/shell/residuals';
import { V0 } from '@/shared/shell/shellModel';

const ROUNDS = 8;
const STEPS_A_ROUND = 8;
/** A round that moves nothing by more than this, in standard errors, is the last. */
const SETTLED = 1e-4;

/**
 * The fit of record: rounds of Levenberg-Marquardt by ml-levenberg-marquardt, the weights renewed between rounds, then
 * a last polish to 1e-6 of a standard error, which also takes over where the library gives up.
 */
export function solveForRecord(problem: ShellProblem, state: ShellState): Outcome {
  const { vSys, marks } = problem;
  const { p } = state;
  if (vSys !== null && vSys.sigma === 0) p[V0] = vSys.value;
  const at = evaluation(marks, p.length);
  let rounds = 0;
  for (let moved = Infinity; rounds < ROUNDS && moved > SETTLED; rounds++)
    moved = libraryRound(problem, state, at);
  const polished = solveAndRecentre(problem, state);
  return { ...polished, iterations: rounds * STEPS_A_ROUND + polished.iterations };
}

/**
 * A fixed number of the library's steps with the weights of the point they start from; p is moved in place.
 *
 * The library damps all parameters alike and judges progress by absolute numbers, so it is given residuals in units of
 * their errors and parameters in units of their curvature. It neither refuses an uphill step nor says why it stopped;
 * it returns the best point it saw.
 *
 * @returns the largest move in those units; 0 where the equations are singular and nothing was moved
 */
export function libraryRound(problem: ShellProblem, { frame, p }: ShellState, at: Evaluation): number {
  const { model, marks, vSys } = problem;
  const size = p.length;
  const held = vSys !== null && vSys.sigma === 0;
  const prior = vSys !== null && vSys.sigma > 0 ? vSys : null;
  const free = Array.from({ length: size }, (_, a) => a).filter((a) => !(held && a === V0));
  evaluate(model, marks, frame, p, at);
  const weight = at.variance.map((v) => 1 / v);
  const perError = weight.map(Math.sqrt);
  const A = new Float64Array(size * size);
  accumulate(size, at.residual, at.jacobian, weight, A, new Float64Array(size));
  if (prior) A[V0 * size + V0] = A[V0 * size + V0]! + 1 / prior.sigma ** 2;
  const unit = free.map((a) => 1 / Math.sqrt(A[a * size + a]!));
  if (!unit.every(Number.isFinite)) return 0;

  const origin = Float64Array.from(p);
  const bounds = boundsOf(marks);
  const place = (scaled: number[]) => {
    free.forEach((a, i) => (p[a] = origin[a]! + unit[i]! * scaled[i]!));
    intoBounds(model, p, bounds);
    if (held) p[V0] = vSys.value;
    evaluate(model, marks, frame, p, at);
  };
  const points = marks.count + (prior === null ? 0 : 1); // a prior is one more residual
  const data = { x: Array.from({ length: points }, (_, i) => i), y: new Float64Array(points) };
  const residuals = (scaled: number[]) => {
    place(scaled);
    const r = at.residual.map((value, i) => value * perError[i]!);
    const fromPrior = prior ? (p[V0]! - prior.value) / prior.sigma : 0;
    return (i: number) => (i < marks.count ? r[i]! : fromPrior);
  };
  const derivatives = (scaled: number[]) => {
    place(scaled);
    const rows = Float64Array.from(at.jacobian);
    return (i: number) =>
      i < marks.count
        ? free.map((a, c) => rows[i * size + a]! * unit[c]! * perError[i]!)
        : free.map((a, c) => (a === V0 ? unit[c]! / prior!.sigma : 0));
  };
  let best: number[];
  try {
    best = levenbergMarquardt(data, residuals, {
      initialValues: free.map(() => 0),
      maxIterations: STEPS_A_ROUND,
      errorTolerance: 0,
      jacobianFunction: derivatives,
    }).parameterValues;
  } catch {
    best = free.map(() => 0); // its only complaint here is a singular matrix; the polish damps each parameter apart
  }
  place(best);
  return Math.max(...best.map(Math.abs));
}
