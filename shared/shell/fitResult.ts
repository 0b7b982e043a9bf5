import type { ModelName } from '@/shared/shell/shellModel';

/** A fitted number: lo and hi bound its central 68 %; null where the data leave it unbounded. */
export interface Parameter {
  value: number;
  se: number | null;
  lo: number | null;
  hi: number | null;
  unit: string;
}

export type WarningCode =
  | 'few-channels'
  | 'vexp-unconstrained'
  | 'one-sided'
  | 'arc-too-short'
  | 'outliers'
  | 'poor-fit'
  | 'start-failed';

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
  /** The models' two extra parameters over their errors: F statistic and its probability on a plain sphere. */
  extraParameters?: { f: number; probability: number; dof: number };
  bootstrap?: {
    draws: number;
    /** Half the width of the 68 % interval. */
    sd: Record<string, number | null>;
    failed: number;
    /** Draws in which the expansion velocity ran to its bound. */
    vExpUnbounded: number;
  };
}
