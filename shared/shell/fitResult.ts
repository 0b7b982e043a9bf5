import type { ModelName } from '@/shared/shell/shellModel';

/** A fitted number: lo and hi bound its central 68 %; null where the data leave it unbounded. */
export interface Parameter {
  value: number;
  se: number | null;
  lo: number | null;
  hi: number | null;
  unit: string;
  /** What was said of it before the fit; absent where it was free. */
  constraint?: Constraint;
  /** The fit ended at this bound. */
  atBound?: 'low' | 'high';
}

/** What is said of a parameter before a fit, in its own unit: held, or bounded and under a Gaussian prior. */
export interface Constraint {
  fixed?: number;
  prior?: { mean: number; sd: number };
  low?: number;
  high?: number;
}
export type Constraints = Record<string, Constraint>;

export type WarningCode =
  | 'few-channels'
  | 'vexp-unconstrained'
  | 'one-sided'
  | 'arc-too-short'
  | 'outliers'
  | 'poor-fit'
  | 'start-failed'
  | 'not-converged'
  | 'at-bound'
  | 'prior-dominated'
  | 'coarse-channels'
  | 'drawn-circles';

export interface FitWarning {
  code: WarningCode;
  message: string;
}

/** The ring of one channel: the circle through its marks, where at least three trace one, and what the model says. */
export interface FitRing {
  velocity: number;
  marks: number;
  theta: number | null;
  se: number | null;
  l: number | null;
  b: number | null;
  model: number;
}

/** One fit of one model: plain JSON, no infinities. Degrees and km/s. */
export interface FitResult {
  model: ModelName;
  parameters: Record<string, Parameter>;
  correlation: { names: string[]; matrix: (number | null)[][] };
  chi2: number;
  dof: number;
  aicc: number | null;
  bic: number | null;
  errorBars: 'covariance' | 'bootstrap';
  warnings: FitWarning[];
  /** Angle of each mark from the centre less the model radius; weight 0 for a mark set aside. */
  residuals: { mark: number; degrees: number; weight: number }[];
  rings: FitRing[];
  provenance: {
    marks: number;
    startValues: Record<string, number>;
    iterations: number;
    seed: number | null;
    optimiser: 'record' | 'live';
    codeVersion?: string;
  };
  extra: FitExtra;
}

/** What the error bars were made of, and what the warnings were judged by. */
export interface FitExtra {
  /** Rows and columns as `correlation.names`; degrees (of the coordinate, for l) and km/s. */
  covariance: (number | null)[][];
  /** Standard errors if marks were independent with the stated sigma: what an optimiser would report. */
  leastSquaresSe: Record<string, number | null>;
  /** Degrees of freedom of Student's t behind each interval. */
  tDof: Record<string, number>;
  /** Factors on sigma^2 and on the variance within a channel; rms offsets in degrees, negative where the variance is. */
  scales: { mark: number; spread: number; ringDeg: number; shiftDeg: number };
  seLnVExp: number | null;
  /** Indices of the marks set aside. */
  setAside: number[];
  /** Position angles covered by the marks, seen from the fitted centre. */
  arcDeg: number;
  /** How far the rings rise above a straight line, in sigma. */
  riseSigma: number;
  channels: number;
  /** Median sigma used; estimated from the scatter when marks carry none. */
  sigmaUsedDeg: number;
  settled: boolean;
  /** Why the fit stopped. */
  convergence?: { reason: 'settled' | 'at-bound' | 'iterations' | 'no-progress'; sentence: string };
  /** For the fit of record: chi2 along theta and v_exp, the others refitted, over the scale of the marks. */
  profiles?: { parameter: 'theta' | 'vExp'; values: number[]; deltaChi2: number[] }[];
  /** For the fit of record: the fit without each channel in turn. */
  leaveOneOut?: LeftOut[];
  /** For the fit of record: the same marks under other models. */
  comparison?: { models: ComparedModel[] };
  /** The models' two extra parameters over their errors: F statistic and its probability on a plain sphere. */
  extraParameters?: { f: number; probability: number; dof: number };
  bootstrap?: {
    draws: number;
    /** Half the width of the 68 % interval. */
    sd: Record<string, number | null>;
    /** The 50th percentile. */
    median: Record<string, number | null>;
    failed: number;
    /** Draws in which the expansion velocity ran to its bound. */
    vExpUnbounded: number;
  };
}

/** A fit without one channel: how far each parameter moves, and how well the others foretell the channel. */
export interface LeftOut {
  velocity: number;
  marks: number;
  /** Value without the channel less the value with it; degrees and km/s. */
  shift: Record<string, number>;
  shiftInSe: Record<string, number | null>;
  /** Mean squared scaled residual of the channel's marks under the fit without it. */
  score: number | null;
  problem?: string;
}

/** One model on the marks of a fit. */
export interface ComparedModel {
  model: ModelName;
  chi2: number | null;
  dof: number | null;
  aicc: number | null;
  bic: number | null;
  leaveOneOut: number | null;
  wald: { f: number; dof: number; probability: number } | null;
  parameters: Record<string, Parameter> | null;
  problem?: string;
  /** What the marks say of it, in words. */
  sentence: string;
}
