import { Problem } from '@/shared/contract/problem';
import { DEGREE, unitVector } from '@/shared/sky/greatCircle';
import { errorModel, type ErrorModel } from '@/shared/shell/errorModel';
import type { FitOptions } from '@/shared/shell/fit';
import { LEAST_CHANNELS, LEAST_MARKS } from '@/shared/shell/fitInput';
import { frameAt } from '@/shared/shell/frame';
import {
  solveAndRecentre,
  workspace,
  type Outcome,
  type ShellProblem,
  type ShellState,
} from '@/shared/shell/gaussNewton';
import { allowed, intoKnown, type Known } from '@/shared/shell/known';
import { subset, velocityReach, type MarkSet } from '@/shared/shell/markSet';
import { naturalValues } from '@/shared/shell/naturalParameters';
import { offTheirRing } from '@/shared/shell/outliers';
import { solveForRecord } from '@/shared/shell/recordFit';
import { evaluate } from '@/shared/shell/residuals';
import {
  EXTRA_1,
  EXTRA_2,
  LN_W,
  THETA,
  V0,
  X,
  Y,
  parameterCount,
  type ModelName,
} from '@/shared/shell/shellModel';
import { startedFrom, startValues, type StartValues } from '@/shared/shell/start';
import { axisOf } from '@/shared/shell/stepWithin';

/** A solved problem with its errors: plain data, which a thread can be given. */
export interface Solved {
  problem: ShellProblem;
  /** All marks, and which of them take part. */
  all: MarkSet;
  live: boolean[];
  start: StartValues;
  /** Some start led to a settled robust fit. */
  startSettled: boolean;
  outcome: Outcome;
  errors: ErrorModel;
  iterations: number;
}

/** Where marks carry no sigma the fit starts with this share of theta, and takes it from the scatter. */
const START_SIGMA = 0.03;
const SIGMA_ROUNDS = 8;
const SIGMA_SETTLED = 0.02;

/** Solve one model on marks: start values, robust pass, marks set aside, least squares, errors. */
export function solveShell(
  marks: MarkSet,
  model: ModelName,
  known: readonly Known[],
  options: Pick<FitOptions, 'setAside' | 'optimiser' | 'start'>,
): Solved {
  const linear = startValues(marks);
  const start = options.start ? startedFrom(linear, options.start) : linear;
  const stated = marks.sigma2.every((s) => s > 0);
  let all = stated
    ? marks
    : { ...marks, sigma2: marks.sigma2.map(() => (START_SIGMA * linear.p[THETA]!) ** 2) };
  let iterations = 0;
  for (let round = 0; ; round++) {
    const first = robustPass({ model, marks: all, known }, start);
    const live = options.setAside === false ? first.live.map(() => true) : first.live;
    const problem = { model, marks: live.every(Boolean) ? all : subset(all, (i) => live[i]!), known };
    const state = { frame: frameAt(problem.marks, first.outcome.frame.origin), p: first.outcome.p };
    const outcome =
      options.optimiser === 'live' ? solveAndRecentre(problem, state) : solveForRecord(problem, state);
    iterations += first.outcome.iterations + outcome.iterations;
    const errors = outcome.p.every(Number.isFinite) ? errorModel(problem, outcome) : null;
    if (errors === null) throw undetermined();
    if (stated || round === SIGMA_ROUNDS - 1 || Math.abs(Math.log(errors.scales.mark)) < SIGMA_SETTLED)
      return { problem, all, live, start, startSettled: first.settled, outcome, errors, iterations };
    const scale = errors.scales.mark;
    all = { ...all, sigma2: all.sigma2.map((s) => s * scale) };
  }
}

const undetermined = () =>
  new Problem(
    'fit-failed',
    'These marks leave some parameter of the shell free, so there is no answer to give. Mark the rim on more channels ' +
      'and over more of its circumference.',
    { field: 'marks' },
  );

/** Widths tried in turn, in half-spans of the marks' velocities, where the linear start does not settle. */
const OTHER_WIDTHS = [1.15, 2, 5];

interface RobustPass {
  outcome: Outcome;
  /** Some start led to a settled fit. */
  settled: boolean;
  /** Which marks stay in. */
  live: boolean[];
}

/** The robust fit from the best start, and the marks that stay in. */
function robustPass(problem: ShellProblem, start: StartValues): RobustPass {
  const { marks } = problem;
  const ws = workspace(marks, parameterCount(problem.model));
  const tried: { outcome: Outcome; settled: boolean; score: number }[] = [];
  for (const width of [null, ...OTHER_WIDTHS]) {
    const p = new Float64Array(parameterCount(problem.model));
    p.set(start.p);
    if (width !== null) {
      p[V0] = meanVelocity(marks);
      p[LN_W] = Math.log(width * velocityReach(marks).half);
    }
    const outcome = solveAndRecentre(
      problem,
      feasible(problem, { frame: frameAt(marks, start.centre), p }),
      { robust: true },
      ws,
    );
    evaluate(problem.model, marks, outcome.frame, outcome.p, ws.now);
    const settled = outcome.settled && outcome.atBound === null;
    tried.push({ outcome, settled, score: robustScore(ws.now.residual, ws.now.variance) });
    if (width === null && settled && !start.wrongCurvature) break;
  }
  const able = tried.filter((t) => t.settled);
  const best = (able.length > 0 ? able : tried).reduce((a, b) => (b.score < a.score ? b : a));
  evaluate(problem.model, marks, best.outcome.frame, best.outcome.p, ws.now);
  const off = offTheirRing(marks, ws.now);
  const live = off.map((o) => !o);
  const left = subset(marks, (i) => live[i]!);
  const least = Math.max(LEAST_MARKS, parameterCount(problem.model) + 1);
  const enough = left.count >= least && left.channels >= LEAST_CHANNELS;
  return { outcome: best.outcome, settled: able.length > 0, live: enough ? live : live.map(() => true) };
}

/** Flattening given to an ellipse whose axis is known, so that it has an axis to begin with. */
const FIRST_FLATTENING = 0.02;

/** A start moved to where the constraints allow it, the frame's origin on its centre. */
function feasible({ model, marks, known }: ShellProblem, { frame, p }: ShellState): ShellState {
  if (known.length === 0) return { frame, p };
  const axis = axisOf(known);
  if (model === 'elliptical' && axis !== undefined) {
    p[EXTRA_1] = FIRST_FLATTENING * Math.cos(2 * axis * DEGREE);
    p[EXTRA_2] = FIRST_FLATTENING * Math.sin(2 * axis * DEGREE);
  }
  const [lon, lat] = naturalValues(model, { frame, p }) as unknown as [number, number];
  const centre = { lon, lat };
  for (const k of known) {
    if (k.index === X) centre.lon = allowed(k, lon);
    if (k.index === Y) centre.lat = allowed(k, lat);
  }
  const moved = centre.lon === lon && centre.lat === lat ? frame : frameAt(marks, unitVector(centre));
  intoKnown(model, known, moved, p);
  return { frame: moved, p };
}

/** Residuals beyond three errors count as three; ln s^2 keeps a solution from buying fit with variance. */
function robustScore(residual: Float64Array, variance: Float64Array): number {
  let score = 0;
  for (let i = 0; i < residual.length; i++)
    score += Math.min(Math.abs(residual[i]!) / Math.sqrt(variance[i]!), 3) ** 2 + Math.log(variance[i]!);
  return Number.isFinite(score) ? score : Infinity;
}

function meanVelocity(marks: MarkSet): number {
  return marks.channel.reduce((sum, k) => sum + marks.velocity[k]!, 0) / marks.count;
}
