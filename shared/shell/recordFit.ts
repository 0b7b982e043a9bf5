import { levenbergMarquardt } from 'ml-levenberg-marquardt';
import { boundsOf, intoBounds } from '@/shared/shell/bounds';
import { reducedMatrix, reduction } from '@/shared/shell/constrainedStep';
import { evaluation, type Evaluation } from '@/shared/shell/frame';
import {
  solveAndRecentre,
  type Outcome,
  type ShellProblem,
  type ShellState,
} from '@/shared/shell/gaussNewton';
import { difference, intoKnown } from '@/shared/shell/known';
import { naturalJacobian, naturalValues } from '@/shared/shell/naturalParameters';
import { accumulate } from '@/shared/shell/normalEquations';
import { evaluate } from '@/shared/shell/residuals';
import { addPriors, axisOf, fixedConditions, gradient } from '@/shared/shell/stepWithin';

const ROUNDS = 8;
const STEPS_A_ROUND = 8;
/** A round that moves nothing by more than this, in standard errors, is the last. */
const SETTLED = 1e-4;

/**
 * The fit of record: rounds of Levenberg-Marquardt by ml-levenberg-marquardt, the weights renewed between rounds, then
 * a last polish to 1e-6 of a standard error, which also takes over where the library gives up.
 */
export function solveForRecord(problem: ShellProblem, state: ShellState): Outcome {
  const { model, marks, known } = problem;
  const { frame, p } = state;
  intoKnown(model, known, frame, p);
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
  const { model, marks, known } = problem;
  const size = p.length;
  const axis = axisOf(known);
  evaluate(model, marks, frame, p, at);
  const weight = at.variance.map((v) => 1 / v);
  const perError = weight.map(Math.sqrt);
  const A = new Float64Array(size * size);
  const g = new Float64Array(size);
  accumulate(size, at.residual, at.jacobian, weight, A, g);
  const natural = () => {
    const state = { frame, p };
    return { values: naturalValues(model, state), G: naturalJacobian(model, state, axis) };
  };
  const here = natural();
  addPriors(known, here, A, g);
  const scale = g.map((_, a) => 1 / Math.sqrt(A[a * size + a]! + 1e-300));
  const left = reduction(size, fixedConditions(known, here), scale);
  const n = left.free.length;
  const M = reducedMatrix(size, left, A);
  const unit = left.free.map((_, f) => 1 / Math.sqrt(M[f * n + f]!));
  if (!unit.every(Number.isFinite)) return 0;

  const origin = Float64Array.from(p);
  const bounds = boundsOf(marks);
  const place = (scaled: number[]) => {
    for (let a = 0; a < size; a++)
      p[a] = scaled.reduce((sum, s, f) => sum + left.T[a * n + f]! * unit[f]! * s, origin[a]!);
    intoBounds(model, p, bounds);
    intoKnown(model, known, frame, p);
    evaluate(model, marks, frame, p, at);
  };
  const priors = known.filter((k) => k.prior !== null); // each is one more residual
  const points = marks.count + priors.length;
  const data = { x: Array.from({ length: points }, (_, i) => i), y: new Float64Array(points) };
  const residuals = (scaled: number[]) => {
    place(scaled);
    const r = at.residual.map((value, i) => value * perError[i]!);
    const values = naturalValues(model, { frame, p });
    const ofPrior = priors.map((k) => difference(k, values[k.index]!, k.prior!.mean) / k.prior!.sd);
    return (i: number) => (i < marks.count ? r[i]! : ofPrior[i - marks.count]!);
  };
  const derivatives = (scaled: number[]) => {
    place(scaled);
    const rows = new Float64Array(points * size);
    at.jacobian.forEach((value, i) => (rows[i] = value * perError[Math.floor(i / size)]!));
    const now = natural();
    priors.forEach((k, i) =>
      rows.set(
        gradient(now, k.index).map((v) => v / k.prior!.sd),
        (marks.count + i) * size,
      ),
    );
    return (i: number) =>
      unit.map((u, f) => {
        let sum = 0;
        for (let a = 0; a < size; a++) sum += rows[i * size + a]! * left.T[a * n + f]!;
        return sum * u;
      });
  };
  let best: number[];
  try {
    best = levenbergMarquardt(data, residuals, {
      initialValues: unit.map(() => 0),
      maxIterations: STEPS_A_ROUND,
      errorTolerance: 0,
      jacobianFunction: derivatives,
    }).parameterValues;
  } catch {
    best = unit.map(() => 0); // its only complaint here is a singular matrix; the polish damps each parameter apart
  }
  place(best);
  return Math.max(...best.map(Math.abs));
}
