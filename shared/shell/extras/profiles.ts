import type { FitExtra, Parameter } from '@/shared/shell/fitResult';
import { solve, workspace, type ShellProblem } from '@/shared/shell/gaussNewton';
import { difference, priorChi2, type Known } from '@/shared/shell/known';
import { naturalValues } from '@/shared/shell/naturalParameters';
import { evaluate } from '@/shared/shell/residuals';
import { LN_W, THETA } from '@/shared/shell/shellModel';
import type { Solved } from '@/shared/shell/solveShell';

type Profile = NonNullable<FitExtra['profiles']>[number];

/** Points on either side of the fitted value. */
const POINTS = 20;
/** How far the curves reach, in standard errors. */
const REACH = 4;
/** The curve of v_exp ends here, in units of the fitted value, where the marks leave it open above. */
const FURTHEST = 5;

/**
 * chi2 along theta and along v_exp, the other parameters refitted at each value, above its least and over the scale of
 * the marks' errors. The weights are those of the fit, so that the least is at the fitted value and the curvature is
 * that of the least-squares error; what channels share is not in these curves, and the error bars are wider.
 *
 * A parameter that is held has no curve.
 */
export function profiles(solved: Solved, parameters: Record<string, Parameter>): Profile[] {
  const out: Profile[] = [];
  for (const [parameter, index] of [
    ['theta', THETA],
    ['vExp', LN_W],
  ] as const) {
    const { value, se } = parameters[parameter]!;
    if (se === null || !(se > 0)) continue;
    const [low, high] = index === THETA ? [value - REACH * se, value + REACH * se] : reachOfVExp(value, se);
    const known = solved.problem.known.find((k) => k.index === index);
    const values = grid(
      Math.max(low, known?.low ?? 0, 0.02 * value),
      value,
      Math.min(high, known?.high ?? Infinity),
    );
    out.push({ parameter, values, deltaChi2: profile(solved, index, values) });
  }
  return out;
}

/** v_exp's reach is even in 1/v_exp^2, as its interval is. */
function reachOfVExp(value: number, se: number): [number, number] {
  const half = (2 * REACH * se) / value;
  return [
    value / Math.sqrt(1 + half),
    Math.min(half < 1 ? value / Math.sqrt(1 - half) : Infinity, FURTHEST * value),
  ];
}

/** Even steps on either side of the middle, the ends included; a side of no width is left out. */
function grid(low: number, middle: number, high: number): number[] {
  const steps = Array.from({ length: POINTS }, (_, i) => (i + 1) / POINTS);
  return [
    ...(low < middle ? steps.map((s) => middle + s * (low - middle)).reverse() : []),
    middle,
    ...(high > middle ? steps.map((s) => middle + s * (high - middle)) : []),
  ];
}

function profile({ problem, outcome, errors }: Solved, index: number, values: number[]): number[] {
  const { model, marks, known } = problem;
  const { variance } = errors.evaluation;
  const own = known.find((k) => k.index === index);
  const others = known.filter((k) => k !== own);
  const ws = workspace(marks, outcome.p.length);
  const chi2At = (at: Pick<ShellProblem, 'known'>, p: Float64Array) => {
    evaluate(model, marks, outcome.frame, p, ws.now);
    let chi2 = priorChi2(at.known, naturalValues(model, { frame: outcome.frame, p }));
    for (let i = 0; i < marks.count; i++) chi2 += ws.now.residual[i]! ** 2 / variance[i]!;
    return chi2;
  };
  const least = chi2At(problem, outcome.p);
  const out = values.map(() => 0);
  const middle = values.findIndex((v) => v === naturalValues(model, outcome)[index]);
  const start = middle < 0 ? nearest(values, naturalValues(model, outcome)[index]!) : middle;
  for (const direction of [1, -1]) {
    const p = Float64Array.from(outcome.p);
    for (let at = start + direction; at >= 0 && at < values.length; at += direction) {
      const held: Known = {
        ...{ index, prior: null, low: -Infinity, high: Infinity, period: null, given: {} },
        fixed: values[at]!,
      };
      const there = [...others, held].sort((a, b) => b.index - a.index);
      solve({ model, marks, known: there }, { frame: outcome.frame, p }, { variance, tolerance: 1e-4 }, ws);
      let chi2 = chi2At({ known: there }, p);
      if (own?.prior) chi2 += (difference(own, values[at]!, own.prior.mean) / own.prior.sd) ** 2;
      out[at] = Math.max((chi2 - least) / errors.scales.mark, 0);
    }
  }
  return out;
}

const nearest = (values: number[], to: number) =>
  values.reduce((best, v, at) => (Math.abs(v - to) < Math.abs(values[best]! - to) ? at : best), 0);
