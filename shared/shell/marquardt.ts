import { factorise, substitute } from '@/shared/shell/normalEquations';

/** A sum of squares that is to be brought down, and the point reached so far; its owner keeps both. */
export interface Descent {
  /** Fill the normal equations at the present point; the sum of squares there. */
  linearise(iteration: number): number;
  /** Find the damped step; how much the sum should fall along it, null where the equations are singular. */
  step(damping: number): number | null;
  /** The sum at the end of the step, shortened where the owner will not go that far. */
  trial(): number;
  /** Take the step. */
  accept(): void;
  /** The sum that noise alone leaves per datum: gains are judged in units of it. */
  perDof(cost: number): number;
}

export interface DescentOptions {
  /** Stop when the step should gain less than this, in standard errors. */
  tolerance: number;
  maxIterations: number;
  /** The first iteration at which it may stop. */
  settlesFrom?: number;
}

export interface Descended {
  iterations: number;
  /** The gain fell below the tolerance, or no step gains anything more. */
  settled: boolean;
  /** Why it stopped: the gain fell below the tolerance, no step lowered the sum any more, or the iterations were used up. */
  reason: 'settled' | 'no-progress' | 'iterations';
}

const FIRST_DAMPING = 1e-4;
const KINK_GAIN = 1e-6;
const FAILURES_ALLOWED = 12;
/** A refused step that promised to lower chi2/dof by more than this, a tenth of an error, was no kink. */
const NO_PROGRESS = 0.01;

/**
 * Damped Gauss-Newton (Marquardt 1963): the damping falls with every step that succeeds and rises with every one that
 * does not. The one optimiser of the live fit, of the bootstrap and of the polish of the fit of record.
 */
export function descend(
  d: Descent,
  { tolerance, maxIterations, settlesFrom = 0 }: DescentOptions,
): Descended {
  let damping = FIRST_DAMPING;
  let failures = 0;
  let gainRefused = 0; // what the first of a row of refused steps promised
  let settled = false;
  let iteration = 0;
  for (; iteration < maxIterations && !settled; iteration++) {
    const cost = d.linearise(iteration);
    const gain = d.step(damping) ?? Infinity;
    const accepted = gain < Infinity && d.trial() <= cost * (1 + 1e-9) + 1e-12;
    const perDof = d.perDof(cost);
    failures = accepted ? 0 : failures + 1;
    if (failures === 1) gainRefused = gain / perDof;
    if (iteration >= settlesFrom)
      settled = (accepted && gain < tolerance * tolerance * perDof) || failures > FAILURES_ALLOWED;
    if (iteration === maxIterations - 1) settled ||= gain < KINK_GAIN * perDof;
    damping = accepted ? Math.max(damping * 0.15, 1e-10) : Math.min(damping * 6, 1e8);
    if (accepted) d.accept();
  }
  const stuck = failures > FAILURES_ALLOWED && gainRefused > NO_PROGRESS;
  return {
    iterations: iteration,
    settled,
    reason: !settled ? 'iterations' : stuck ? 'no-progress' : 'settled',
  };
}

/** Arrays in which a step is found. */
export interface StepSpace {
  A: Float64Array;
  g: Float64Array;
  damped: Float64Array;
  scale: Float64Array;
  step: Float64Array;
}

/** Solve the damped equations, each parameter in units of its own curvature. False when even damped they are singular. */
export function dampedStep(size: number, damping: number, ws: StepSpace): boolean {
  for (let a = 0; a < size; a++) ws.scale[a] = 1 / Math.sqrt(ws.A[a * size + a]! + 1e-300);
  for (let a = 0; a < size; a++) {
    for (let b = 0; b < size; b++)
      ws.damped[a * size + b] = ws.A[a * size + b]! * ws.scale[a]! * ws.scale[b]!;
    ws.damped[a * size + a] = ws.damped[a * size + a]! + damping + 1e-13;
    ws.step[a] = -ws.g[a]! * ws.scale[a]!;
  }
  if (!factorise(size, ws.damped)) return false;
  substitute(size, ws.damped, ws.step);
  for (let a = 0; a < size; a++) ws.step[a] = ws.step[a]! * ws.scale[a]!;
  return true;
}

/** How much the sum of squares should fall along a step. */
export function expectedGain({ g, step }: Pick<StepSpace, 'g' | 'step'>): number {
  let gain = 0;
  for (let a = 0; a < g.length; a++) gain -= g[a]! * step[a]!;
  return gain;
}
