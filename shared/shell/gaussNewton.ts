import { evaluate } from '@/shared/shell/residuals';
import { evaluation, recentred, type Evaluation, type Frame } from '@/shared/shell/frame';
import { boundsOf, intoBounds } from '@/shared/shell/bounds';
import type { MarkSet } from '@/shared/shell/markSet';
import { dampedStep, descend, expectedGain, type Descended, type StepSpace } from '@/shared/shell/marquardt';
import { accumulate, hold } from '@/shared/shell/normalEquations';
import { intoKnown, isFixed, priorChi2, type Known } from '@/shared/shell/known';
import { naturalJacobian, naturalValues } from '@/shared/shell/naturalParameters';
import { addPriors, axisOf, stepWithin, type Natural } from '@/shared/shell/stepWithin';
import { robustWeights } from '@/shared/shell/robust';
import { LN_W, THETA, X, Y, parameterCount, type ModelName } from '@/shared/shell/shellModel';

/** What is to be minimised: a model on marks, with what is known of its parameters beforehand. */
export interface ShellProblem {
  model: ModelName;
  marks: MarkSet;
  /** As `readConstraints` gives it; empty where all parameters are free. */
  known: readonly Known[];
}

/** A point in parameter space: offsets in p refer to the frame. */
export interface ShellState {
  frame: Frame;
  p: Float64Array;
}

export interface SolveOptions {
  /** Down-weight marks by their residuals instead of fitting all alike. */
  robust?: boolean;
  /** Stop when a step is shorter than this many standard errors. */
  tolerance?: number;
  maxIterations?: number;
  /** Variances to weight the marks by, in place of those of the parameters reached so far. */
  variance?: Float64Array;
}

export interface Outcome extends ShellState, Descended {
  /** The expansion velocity ran into the bound that the marks' span sets. */
  atBound: 'low' | 'high' | null;
}

/** Arrays of one solver, reused from fit to fit. */
export interface Workspace extends StepSpace {
  now: Evaluation;
  trial: Evaluation;
  /** Working variance: the model's own, damped from step to step once it should have settled. */
  variance: Float64Array;
  robust: Float64Array;
  weight: Float64Array;
  scratch: Float64Array;
  next: Float64Array;
}

export function workspace(marks: MarkSet, size: number): Workspace {
  const perMark = () => new Float64Array(marks.count);
  const perParameter = () => new Float64Array(size);
  return {
    now: evaluation(marks, size),
    trial: evaluation(marks, size),
    variance: perMark(),
    robust: perMark(),
    weight: perMark(),
    scratch: perMark(),
    A: new Float64Array(size * size),
    damped: new Float64Array(size * size),
    g: perParameter(),
    step: perParameter(),
    scale: perParameter(),
    next: perParameter(),
  };
}

const HOLD_STEPS = 8; // from this iteration on the variance is the geometric mean of old and new
const ROBUST_EVERY = 3;
const ROBUST_LAST = 15;
const ROBUST_SETTLED = 17;

/**
 * Damped Gauss-Newton (Marquardt 1963) on residuals over their effective standard deviations, the deviations being
 * taken from the parameters reached so far: the answer is the fixed point of reweighting. Works on `state.p` in place.
 */
export function solve(
  problem: ShellProblem,
  state: ShellState,
  options: SolveOptions = {},
  ws = workspace(problem.marks, parameterCount(problem.model)),
): Outcome {
  const { robust = false, tolerance = 1e-6, maxIterations = 80 } = options;
  const { model, marks, known } = problem;
  const { frame, p } = state;
  const size = p.length;
  const bounds = boundsOf(marks);
  const informed = known.length > 0;
  const axis = axisOf(known);
  intoKnown(model, known, frame, p);

  ws.robust.fill(1);
  evaluate(model, marks, frame, p, ws.now);
  let natural: Natural | null = null;
  const descended = descend(
    {
      linearise: (iteration) => {
        if (robust && iteration % ROBUST_EVERY === 0 && iteration <= ROBUST_LAST)
          robustWeights(ws.now.residual, ws.now.variance, iteration >= ROBUST_EVERY, ws.scratch, ws.robust);
        for (let i = 0; i < marks.count; i++) {
          const fresh = options.variance?.[i] ?? ws.now.variance[i]!;
          ws.variance[i] = iteration < HOLD_STEPS ? fresh : Math.sqrt(ws.variance[i]! * fresh);
          ws.weight[i] = ws.robust[i]! / ws.variance[i]!;
        }
        let cost = accumulate(size, ws.now.residual, ws.now.jacobian, ws.weight, ws.A, ws.g);
        if (informed) {
          natural = { values: naturalValues(model, state), G: naturalJacobian(model, state, axis) };
          cost += addPriors(known, natural, ws.A, ws.g);
        }
        if (p[LN_W]! >= bounds.lnWHigh && ws.g[LN_W]! < 0) hold(size, LN_W, ws.A, ws.g);
        return cost;
      },
      step: (damping) => {
        const solved = natural
          ? stepWithin(known, natural, ws.A, ws.g, damping, ws.step)
          : dampedStep(size, damping, ws);
        return solved ? expectedGain(ws) : null;
      },
      trial: () => {
        limitStep(p, ws.step);
        for (let a = 0; a < size; a++) ws.next[a] = p[a]! + ws.step[a]!;
        intoBounds(model, ws.next, bounds);
        intoKnown(model, known, frame, ws.next);
        evaluate(model, marks, frame, ws.next, ws.trial);
        let cost = informed ? priorChi2(known, naturalValues(model, { frame, p: ws.next })) : 0;
        for (let i = 0; i < marks.count; i++) cost += ws.weight[i]! * ws.trial.residual[i]! ** 2;
        return cost;
      },
      accept: () => {
        p.set(ws.next);
        [ws.now, ws.trial] = [ws.trial, ws.now];
      },
      perDof: (cost) => Math.max(1, cost / Math.max(marks.count - size, 1)),
    },
    { tolerance, maxIterations, settlesFrom: robust ? ROBUST_SETTLED + 1 : 0 },
  );
  const atBound = isFixed(known, LN_W)
    ? null
    : p[LN_W]! >= bounds.lnWHigh - 1e-3
      ? 'high'
      : p[LN_W]! <= bounds.lnWLow + 1e-3
        ? 'low'
        : null;
  return { frame, p, ...descended, atBound };
}

/**
 * Solve, move the tangent plane on to the solution, and go on until nothing moves: the offsets are then zero and their
 * errors are errors on the sky. The robust pass needs that only where the parameters are tied to the plane's axes.
 */
export function solveAndRecentre(
  problem: ShellProblem,
  state: ShellState,
  options: SolveOptions = {},
  ws = workspace(problem.marks, parameterCount(problem.model)),
): Outcome {
  const rounds = options.robust ? (problem.model === 'drifting' ? 2 : 1) : 6;
  let outcome: Outcome = { ...state, iterations: 0, settled: false, reason: 'iterations', atBound: null };
  for (let round = 0; round < rounds; round++) {
    const next = solve(problem, outcome, options, ws);
    const moved = Math.hypot(next.p[X]!, next.p[Y]!);
    outcome = {
      ...next,
      frame: recentred(problem.marks, next.frame, next.p),
      iterations: outcome.iterations + next.iterations,
    };
    if (moved < 1e-6) break;
  }
  return outcome;
}

/** No step may change ln w by more than 0.6, theta by half of itself, the centre by 0.3 rad. */
function limitStep(p: Float64Array, step: Float64Array): void {
  const clip = (a: number, limit: number) => {
    step[a] = Math.min(Math.max(step[a]!, -limit), limit);
  };
  clip(LN_W, 0.6);
  clip(THETA, 0.5 * p[THETA]!);
  clip(X, 0.3);
  clip(Y, 0.3);
}
