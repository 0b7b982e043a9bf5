import { DEGREE, lonLatOf } from '@/shared/sky/greatCircle';
import { percentiles, type BootstrapDraws } from '@/shared/shell/bootstrap';
import { arcCovered, riseAboveLine } from '@/shared/shell/arc';
import { channelCurve, curveTable } from '@/shared/shell/channelCurve';
import type { FitOptions } from '@/shared/shell/fit';
import type { FitExtra, FitResult, FitRing } from '@/shared/shell/fitResult';
import {
  boundsInWords,
  convergenceOf,
  priorShare,
  PRIOR_LEADS,
  withConstraints,
} from '@/shared/shell/findings';
import { PARAMETER_WORDS } from '@/shared/shell/constraints';
import { evaluation, frameAt } from '@/shared/shell/frame';
import { finite, report } from '@/shared/shell/intervals';
import { isInformed, reached } from '@/shared/shell/known';
import type { MarkSet } from '@/shared/shell/markSet';
import { naturalValues } from '@/shared/shell/naturalParameters';
import { qualityOf, waldTest } from '@/shared/shell/quality';
import { evaluate } from '@/shared/shell/residuals';
import { fitRing } from '@/shared/shell/ring';
import { median } from '@/shared/shell/robust';
import { LN_W, THETA, V0 } from '@/shared/shell/shellModel';
import type { Solved } from '@/shared/shell/solveShell';
import { warningsOf } from '@/shared/shell/warnings';

/** A solved problem as the JSON that is stored and shown. */
export function describeFit(solved: Solved, options: FitOptions): FitResult {
  const { problem, all, live, outcome, errors, start, iterations } = solved;
  const { model, marks, known } = problem;
  const { p } = outcome;
  const reported = report(model, outcome, errors, known);
  const quality = qualityOf(problem, outcome, errors);
  const values = naturalValues(model, outcome);
  const names = [...reported.names];
  const w = Math.exp(p[LN_W]!);
  const seLnVExp = Math.sqrt(errors.covariance[LN_W * p.length + LN_W]!);
  const setAside = live.flatMap((isLive, i) => (isLive ? [] : [i]));
  const arcDeg = arcCovered(marks, outcome.frame.origin);
  const riseSigma = riseAboveLine(marks);
  const atBounds = reached(known, values);
  const warnings = warningsOf({
    startSettled: solved.startSettled,
    stuck: outcome.reason === 'no-progress',
    atBounds: boundsInWords(model, outcome, atBounds),
    ledByPrior: known
      .filter((k) => priorShare(k, reported.plain, p.length) > PRIOR_LEADS)
      .map((k) => PARAMETER_WORDS[names[k.index]!]!),
    vSysKnown: isInformed(known, V0),
    channelInVExp: all.width / w,
    settled: outcome.settled,
    unconstrained: outcome.atBound === 'high',
    channels: marks.channels,
    marks: all.count,
    drawn: all.drawn,
    setAside: setAside.length,
    seLnVExp,
    reach: { low: (marks.velocity[0]! - p[V0]!) / w, high: (marks.velocity.at(-1)! - p[V0]!) / w },
    arcDeg,
    riseSigma,
    chi2PerDof: quality.chi2 / Math.max(quality.dof, 1),
  });
  const { lon, lat } = lonLatOf(start.centre);
  const size = names.length;
  const named = (value: (a: number) => number) =>
    Object.fromEntries(names.map((name, a) => [name, value(a)]));
  const wald = waldTest(p, errors);
  const extra: FitExtra = {
    covariance: names.map((_, a) => names.map((_, b) => finite(reported.covariance[a * size + b]!))),
    leastSquaresSe: Object.fromEntries(
      names.map((name, a) => [name, finite(Math.sqrt(reported.plain[a * size + a]!))]),
    ),
    tDof: named((a) => errors.tDof[a]!),
    scales: {
      mark: errors.scales.mark,
      spread: errors.scales.spread,
      ringDeg: signedRoot(errors.scales.ring),
      shiftDeg: signedRoot(errors.scales.shift),
    },
    seLnVExp: finite(seLnVExp),
    setAside,
    arcDeg,
    riseSigma,
    channels: marks.channels,
    sigmaUsedDeg: Math.sqrt(median(all.sigma2)) / DEGREE,
    settled: outcome.settled,
    convergence: convergenceOf(outcome, atBounds.length > 0),
    ...(wald === null ? {} : { extraParameters: wald }),
  };
  return {
    model,
    parameters: withConstraints(reported.parameters, names, known, atBounds),
    correlation: { names, matrix: reported.correlation.map((row) => row.map(finite)) },
    ...quality,
    errorBars: 'covariance',
    warnings,
    residuals: residualsOf(solved),
    rings: ringsOf(solved),
    provenance: {
      marks: all.count,
      startValues: {
        l: lon,
        b: lat,
        theta: start.p[THETA]! / DEGREE,
        vSys: start.p[V0]!,
        vExp: Math.exp(start.p[LN_W]!),
      },
      iterations,
      seed: options.bootstrap ? (options.seed ?? 1) : null,
      optimiser: options.optimiser ?? 'record',
      ...(options.codeVersion === undefined ? {} : { codeVersion: options.codeVersion }),
    },
    extra,
  };
}

/** Replace the interval ends by the bootstrap's percentiles, and say how the draws went. */
export function withBootstrap(fit: FitResult, drawn: BootstrapDraws): FitResult {
  const { names } = fit.correlation;
  const parameters = { ...fit.parameters };
  const sd: Record<string, number | null> = {};
  const median: Record<string, number | null> = {};
  names.forEach((name, a) => {
    const fitted = fit.parameters[name]!;
    const period = name === 'l' ? 360 : name === 'positionAngle' ? 180 : undefined;
    const found = percentiles(drawn.values, names.length, a, fitted.value, period);
    parameters[name] = { ...fitted, lo: finite(found.lo), hi: finite(found.hi) };
    sd[name] = finite(found.sd);
    median[name] = finite(found.median);
  });
  const { failed, unbounded } = drawn;
  const draws = drawn.values.length / names.length;
  const summary = { draws, sd, median, failed, vExpUnbounded: unbounded };
  return { ...fit, parameters, errorBars: 'bootstrap', extra: { ...fit.extra, bootstrap: summary } };
}

/** Residuals of all marks, those set aside included: they are shown where they lie. */
function residualsOf({ problem, all, live, outcome }: Solved): FitResult['residuals'] {
  const at = evaluation(all, outcome.p.length);
  evaluate(problem.model, all, frameAt(all, outcome.frame.origin), outcome.p, at);
  return live.map((isLive, mark) => ({
    mark,
    degrees: at.residual[mark]! / DEGREE,
    weight: isLive ? 1 : 0,
  }));
}

/** The circle of each channel through the marks that take part, beside the radius that the model expects there. */
function ringsOf({ all, live, outcome }: Solved): FitRing[] {
  const { p } = outcome;
  const curve = curveTable(all.channels);
  return Array.from(all.velocity, (velocity, k) => {
    channelCurve(velocity, all.width, p[THETA]!, p[V0]!, Math.exp(p[LN_W]!), curve, k);
    const marks = ringMarks(all, (i) => live[i]! && all.channel[i] === k);
    const { ring } = fitRing(marks);
    return {
      velocity,
      marks: marks.length,
      theta: ring?.theta ?? null,
      se: ring?.se ?? null,
      l: ring?.l ?? null,
      b: ring?.b ?? null,
      model: curve.radius[k]! / DEGREE,
    };
  });
}

function ringMarks(all: MarkSet, take: (mark: number) => boolean) {
  const marks: { l: number; b: number; sigma: number }[] = [];
  for (let i = 0; i < all.count; i++) {
    if (!take(i)) continue;
    const [x, y, z] = all.direction.subarray(3 * i, 3 * i + 3) as unknown as [number, number, number];
    const { lon, lat } = lonLatOf([x, y, z]);
    marks.push({ l: lon, b: lat, sigma: Math.sqrt(all.sigma2[i]!) / DEGREE });
  }
  return marks;
}

/** rms of a variance in rad^2, in degrees; negative where the estimate of the variance is. */
const signedRoot = (variance: number) => (Math.sign(variance) * Math.sqrt(Math.abs(variance))) / DEGREE;
