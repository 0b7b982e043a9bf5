import { plainNumber } from '@/shared/physics/quantity';
import { channelsOf, extraOf } from './fitExtra';
import type { DoneFit } from './fitFacts';
import { writtenValue } from './parameterWords';

export interface ErrorBar {
  name: string;
  /** What an interval is, and what went into it. */
  covers: string;
}

/** Which error bar a fit shows, and what it covers. */
export function errorBarOf(fit: DoneFit): ErrorBar {
  const sources =
    'single marks, spread within a channel, rings that differ in radius, and rings that are shifted';
  if (fit.errorBars === 'bootstrap') {
    const draws = extraOf(fit).bootstrap?.draws ?? fit.options?.bootstrap;
    return {
      name: `Channel-aware bootstrap${draws ? `, ${draws} draws` : ''}`,
      covers: `+a −b bound the central 68 % of the draws. Covered: ${sources}.`,
    };
  }
  return {
    name: 'Four-source covariance',
    covers: `One standard error; +a −b where the central 68 % is lopsided. Covered: ${sources}.`,
  };
}

/** A limit of the error bars, and the parameters it stands beside; none: it holds for all of them. */
export interface Limit {
  key: string;
  beside: readonly string[];
  text: string;
}

/** Shares of intervals that hold the truth, as measured by simulation. */
const FOUR = { careful: '74 to 76', biased: '60 to 63' };
const THREE = { careful: '94', biased: '60 to 68' };
/** Half a mark's error on every ring moved Θ by 3.5 of its scatter. */
const COMMON_BIAS = 0.5;
const SHORT_ARC = 180;
const NOISY = 0.07;

/** What the error bars of this fit do not cover, said where it applies. */
export function limitsOf(fit: DoneFit): Limit[] {
  const limits: Limit[] = [];
  const { sigmaUsedDeg, arcDeg, bootstrap } = extraOf(fit);
  const channels = channelsOf(fit);
  const theta = fit.parameters.theta?.value;
  if (channels === 4)
    limits.push({
      key: 'four-channels',
      beside: [],
      text:
        'Four channels leave one spare ring. Such 68 % intervals held the truth in ' +
        `${FOUR.careful} % of simulated cases with careful marks, and in ${FOUR.biased} % where rings differed by a mark’s error.`,
    });
  if (channels <= 3)
    limits.push({
      key: 'three-channels',
      beside: [],
      text:
        'Three channels leave no spare ring, so rings are assumed to differ by a mark’s error. Such 68 % intervals held ' +
        `the truth in ${THREE.careful} % of simulated cases with careful marks, and in ${THREE.biased} % where rings differed by that much.`,
    });
  if (fit.traceId) {
    limits.push({
      key: 'traced',
      beside: ['theta'],
      text:
        'The rim is traced from the brightness: a share of a beam on Θ, 3 % on v_exp and 0.3 km/s on v_sys are added ' +
        'in quadrature, as simulated cubes need them.',
    });
  } else if (sigmaUsedDeg !== undefined) {
    limits.push({
      key: 'common-bias',
      beside: ['theta'],
      text:
        `A bias common to all rings cannot be seen here: marks all ${plainNumber(COMMON_BIAS)} of their error too far ` +
        `out make Θ ${writtenValue('theta', Number((COMMON_BIAS * sigmaUsedDeg).toPrecision(2)))} too large. ` +
        'Only a second reading or the traced rim shows it.',
    });
  }
  if (
    fit.errorBars === 'covariance' &&
    arcDeg !== undefined &&
    arcDeg < SHORT_ARC &&
    sigmaUsedDeg !== undefined &&
    theta &&
    sigmaUsedDeg / theta > NOISY
  )
    limits.push({
      key: 'short-noisy-arc',
      beside: [],
      text:
        'On short arcs with marks this uncertain the covariance gives intervals that are too small: 55 % in place of ' +
        '68 %. Run the fit with the bootstrap.',
    });
  const vExp = fit.parameters.vExp;
  if (vExp && vExp.constraint?.fixed === undefined && vExp.hi === null && vExp.lo !== null) {
    const share =
      bootstrap && bootstrap.draws > 0
        ? ` ${bootstrap.vExpUnbounded} of ${bootstrap.draws} draws ran without end.`
        : '';
    limits.push({
      key: 'no-upper-bound',
      beside: ['vExp'],
      text:
        `The marks do not bound it from above.${share} Report the limit: v_exp > ` +
        `${writtenValue('vExp', Number(vExp.lo.toPrecision(3)))} (84 %).`,
    });
  }
  return limits;
}
