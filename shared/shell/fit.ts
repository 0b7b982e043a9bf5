import { Problem } from '@/shared/contract/problem';
import { bootstrap, type BootstrapDraws } from '@/shared/shell/bootstrap';
import type { RingParameters } from '@/shared/shell/channelCurve';
import { readConstraints } from '@/shared/shell/constraints';
import { describeFit, withBootstrap } from '@/shared/shell/describeFit';
import { withExtras } from '@/shared/shell/extras/extras';
import { readMarks, type FitInput } from '@/shared/shell/fitInput';
import type { FitResult } from '@/shared/shell/fitResult';
import { PARAMETER_NAMES, type ModelName } from '@/shared/shell/shellModel';
import { solveShell, type Solved } from '@/shared/shell/solveShell';

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
  /**
   * For the fit of record: profile likelihoods, the fit without each channel, other models on the same marks. Not made
   * for more than 20 000 marks.
   */
  extras?: boolean;
  /** Kept in the provenance. */
  codeVersion?: string;
  /** Begin here, for instance with what a person set by hand, instead of with linear least squares: degrees, km/s. */
  start?: RingParameters;
  /** Receives the draws, one row of parameters each, in the order of `correlation.names`. */
  onDraws?: (values: Float64Array) => void;
  /** Called with 0 … 1 while the bootstrap runs; what it throws ends the fit. */
  onProgress?: (done: number) => void;
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
  const solved = solveFit(input, options);
  const { bootstrap: draws = 0, onProgress } = options;
  return finishFit(solved, options, draws > 0 ? bootstrapDraws(solved, options, 0, draws, onProgress) : null);
}

/** The fit for every frame while a person marks: no library optimiser, no bootstrap, the same answer. */
export function liveFit(
  input: FitInput,
  options: Omit<FitOptions, 'optimiser' | 'bootstrap'> = {},
): FitResult {
  return fitShell(input, { ...options, optimiser: 'live' });
}

/**
 * The first third of `fitShell`: the solution with its covariance, as plain data that threads can be given.
 *
 * @throws as fitShell
 */
export function solveFit(input: FitInput, options: FitOptions = {}): Solved {
  checkOptions(options);
  const model = options.model ?? 'sphere';
  const known = readConstraints(model, input.constraints, input.vSys);
  return solveShell(readMarks(input, model), model, known, options);
}

/**
 * Draws from .. to - 1 of the bootstrap. Parts made anywhere, put together in their order by `joined`, are bit for bit
 * the draws made in one go.
 *
 * @param onProgress called with the share of these draws that is done, 0 … 1; what it throws ends the work
 */
export function bootstrapDraws(
  { problem, outcome, errors }: Solved,
  { seed = 1 }: Pick<FitOptions, 'seed'>,
  from: number,
  to: number,
  onProgress?: (done: number) => void,
): BootstrapDraws {
  return bootstrap(problem, outcome, errors, { seed, from, to, onProgress });
}

/** The last third: the fit as the JSON that is stored and shown, its intervals from the draws where there are any. */
export function finishFit(solved: Solved, options: FitOptions, draws: BootstrapDraws | null): FitResult {
  const plain = describeFit(solved, options);
  const described = options.extras ? withExtras(plain, solved) : plain;
  if (draws === null) return described;
  options.onDraws?.(draws.values);
  return withBootstrap(described, draws);
}

const MOST_DRAWS = 100_000;

function checkOptions({ model, bootstrap: draws, seed, start }: FitOptions): void {
  const refuse = (field: string, detail: string): never => {
    throw new Problem('invalid-input', detail, { field });
  };
  if (model !== undefined && !Object.hasOwn(PARAMETER_NAMES, model))
    refuse('model', `There is no model "${String(model)}": take ${Object.keys(PARAMETER_NAMES).join(', ')}.`);
  if (draws !== undefined && !(Number.isInteger(draws) && draws >= 0 && draws <= MOST_DRAWS))
    refuse('bootstrap', `The number of bootstrap draws is a whole number from 0 to ${MOST_DRAWS}.`);
  if (seed !== undefined && !(Number.isInteger(seed) && seed >= 0 && seed <= 0xffffffff))
    refuse('seed', 'The seed is a whole number from 0 to 4294967295.');
  if (
    start &&
    !(start.theta > 0 && start.theta < 90 && start.vExp > 0 && Number.isFinite(start.vSys + start.vExp))
  )
    refuse(
      'start',
      'A start needs a radius between 0 and 90 degrees, a velocity, and an expansion above 0 km/s.',
    );
}
