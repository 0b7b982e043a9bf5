import { Problem } from '@/shared/contract/problem';
import { errorModel, type ErrorModel } from '@/shared/shell/errorModel';
import { LEAST_CHANNELS, LEAST_MARKS, readMarks, type FitInput } from '@/shared/shell/fitInput';
import type { FitResult } from '@/shared/shell/fitResult';
import { frameAt } from '@/shared/shell/frame';
import { solveAndRecentre, workspace, type Outcome, type ShellProblem } from '@/shared/shell/gaussNewton';
import { subset, velocityReach, type MarkSet } from '@/shared/shell/markSet';
import { offTheirRing } from '@/shared/shell/outliers';
import { solveForRecord } from '@/shared/shell/recordFit';
import { describeFit, withBootstrap } from '@/shared/shell/describeFit';
import { evaluate } from '@/shared/shell/residuals';
import { LN_W, PARAMETER_NAMES, THETA, V0, parameterCount, type ModelName } from '@/shared/shell/shellModel';
import { startValues, type StartValues } from '@/shared/shell/start';

export interface FitOptions {
  model?: ModelName;
  /** Set aside marks far off their own ring before the final fit (default), or keep all. */
  setAside?: boolean;
  /** record: Levenberg-Marquardt by the library, then polished. live: Gauss-Newton alone, for every frame. */
  optimiser?: 'record' | 'live';
  /** Draws of the channel-aware bootstrap whose percentiles become lo and hi; none by default. */
  bootstrap?: number;
  /** Seed of its random numbers. */
  seed?: number;
  /** Kept in the provenance. */
  codeVersion?: string;
  /** Receives the draws, one row of parameters each, in the order of `correlation.names`. */
  onDraws?: (values: Float64Array) => void;
  /** Called with 0 … 1 while the bootstrap runs; what it throws ends the fit. */
  onProgress?: (done: number) => void;
}

/** A fit half way: the problem on the marks that take part, its solution and its errors. */
export interface Solved {
  problem: ShellProblem;
  /** All marks, and which of them take part. */
  all: MarkSet;
  live: boolean[];
  start: StartValues;
  outcome: Outcome;
  errors: ErrorModel;
  iterations: number;
}

/**
 * Fit an expanding shell to rim marks.
 *
 * Start values by linear least squares; a robust pass, after which marks far off their own ring are set aside;
 * least squares on the rest, in which a mark's angle from the centre is compared with the ring radius averaged over
 * its channel; a covariance that knows of errors shared by a channel. Deterministic: the same marks and seed give the
 * same bits on one machine.
 *
 * @throws Problem invalid-input, marks-insufficient, marks-degenerate, fit-failed
 */
export function fitShell(input: FitInput, options: FitOptions = {}): FitResult {
  const model = options.model ?? 'sphere';
  checkOptions(options);
  const solved = solveShell(readMarks(input, model), model, input, options);
  const described = describeFit(solved, options);
  return options.bootstrap ? withBootstrap(described, solved, options) : described;
}

function checkOptions({ model, bootstrap, seed }: FitOptions): void {
  const refuse = (field: string, detail: string): never => {
    throw new Problem('invalid-input', detail, { field });
  };
  if (model !== undefined && !Object.hasOwn(PARAMETER_NAMES, model))
    refuse('model', `There is no model "${String(model)}": take ${Object.keys(PARAMETER_NAMES).join(', ')}.`);
  if (bootstrap !== undefined && !(Number.isInteger(bootstrap) && bootstrap >= 0 && bootstrap <= MOST_DRAWS))
    refuse('bootstrap', `The number of bootstrap draws is a whole number from 0 to ${MOST_DRAWS}.`);
  if (seed !== undefined && !(Number.isInteger(seed) && seed >= 0 && seed <= 0xffffffff))
    refuse('seed', 'The seed is a whole number from 0 to 4294967295.');
}

/** The fit for every frame while a person marks: no library optimiser, no bootstrap, the same answer. */
export function liveFit(
  input: FitInput,
  options: Omit<FitOptions, 'optimiser' | 'bootstrap'> = {},
): FitResult {
  return fitShell(input, { ...options, optimiser: 'live' });
}

const MOST_DRAWS = 100_000;
/** Where marks carry no sigma the fit starts with this share of theta, and takes it from the scatter. */
const START_SIGMA = 0.03;
const SIGMA_ROUNDS = 8;
const SIGMA_SETTLED = 0.02;

function solveShell(marks: MarkSet, model: ModelName, input: FitInput, options: FitOptions): Solved {
  const vSys =
    model === 'cap' && input.vSys ? { value: input.vSys.value, sigma: input.vSys.sigma ?? 0 } : null;
  const start = startValues(marks);
  const stated = marks.sigma2.every((s) => s > 0);
  let all = stated
    ? marks
    : { ...marks, sigma2: marks.sigma2.map(() => (START_SIGMA * start.p[THETA]!) ** 2) };
  let iterations = 0;
  for (let round = 0; ; round++) {
    const first = robustPass({ model, marks: all, vSys }, start);
    const live = options.setAside === false ? first.live.map(() => true) : first.live;
    const problem = { model, marks: live.every(Boolean) ? all : subset(all, (i) => live[i]!), vSys };
    const state = { frame: frameAt(problem.marks, first.outcome.frame.origin), p: first.outcome.p };
    const outcome =
      options.optimiser === 'live' ? solveAndRecentre(problem, state) : solveForRecord(problem, state);
    iterations += first.outcome.iterations + outcome.iterations;
    const errors = outcome.p.every(Number.isFinite) ? errorModel(problem, outcome) : null;
    if (errors === null) throw undetermined();
    if (stated || round === SIGMA_ROUNDS - 1 || Math.abs(Math.log(errors.scales.mark)) < SIGMA_SETTLED)
      return { problem, all, live, start, outcome, errors, iterations };
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

/** The robust fit from the best start, and the marks that stay in. */
function robustPass(problem: ShellProblem, start: StartValues): { outcome: Outcome; live: boolean[] } {
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
      { frame: frameAt(marks, start.centre), p },
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
  return { outcome: best.outcome, live: enough ? live : live.map(() => true) };
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
