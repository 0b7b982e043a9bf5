import type { FitWarning } from '@/shared/shell/fitResult';

/** What the warnings are judged by. Velocities in units of v_exp from v_sys; angles in degrees. */
export interface Findings {
  settled: boolean;
  /** Some start led to a settled robust fit. */
  startSettled: boolean;
  /** No step lowered chi2 any more though one should have. */
  stuck: boolean;
  /** Bounds at which parameters ended, in words: "v_exp", "upper", "20 km/s". */
  atBounds: { what: string; side: 'lower' | 'upper'; bound: string }[];
  /** Parameters that follow their prior rather than the marks, in words. */
  ledByPrior: string[];
  /** v_sys is held or under a prior. */
  vSysKnown: boolean;
  /** Width of a channel over v_exp. */
  channelInVExp: number;
  unconstrained: boolean;
  channels: number;
  marks: number;
  /** Marks that drawn circles made. */
  drawn: number;
  setAside: number;
  seLnVExp: number;
  /** Lowest and highest (v - v_sys)/v_exp among the marks in the fit. */
  reach: { low: number; high: number };
  arcDeg: number;
  riseSigma: number;
  chi2PerDof: number;
}

/** Wider channels than this share of v_exp: whether a cap cuts an edge is a matter of two answers. */
const COARSE = 0.5;
const FEW_CHANNELS = 4;
/** se(ln v_exp) above which 1/v_exp^2 lies within two standard errors of zero. */
const UNCONSTRAINED = 0.25;
const ONE_SIDED = 0.15;
const RISE_SHORT = 3;
const RISE_NONE = 1;
const POOR_CHI2 = 4;
const MANY_SET_ASIDE = 0.2;

/** Sentences that say what the answer does not tell, and what would make it tell. */
export function warningsOf(f: Findings): FitWarning[] {
  const out: FitWarning[] = [];
  const warn = (code: FitWarning['code'], message: string) => out.push({ code, message });
  if (!f.settled && !f.unconstrained && f.startSettled)
    warn(
      'not-converged',
      'The fit used up its steps before it settled, so its numbers are only where it stopped. ' +
        'Look at the marks with the largest residuals, or mark more channels.',
    );
  else if (f.stuck)
    warn(
      'not-converged',
      'The fit stopped where no step brings it closer to the marks, though one should, so its numbers may be off by ' +
        'more than a tenth of their errors. Move or add a mark and fit again.',
    );
  if (!f.settled && !f.unconstrained && !f.startSettled)
    warn(
      'start-failed',
      'The fit did not settle from any of its start values, so its numbers are only where it stopped. ' +
        'Look at the marks with the largest residuals, or mark more channels.',
    );
  if (f.drawn > 0)
    warn(
      'drawn-circles',
      `${f.drawn} of ${f.marks} marks were made by drawing circles. Marks of one circle cannot scatter about it, so the ` +
        'error bars rest on the position error that is stated for them. Marks by hand, or a traced rim, would show it.',
    );
  if (f.channels <= FEW_CHANNELS)
    warn(
      'few-channels',
      `Only ${f.channels} channels carry marks, which leaves ${spareRings(f.channels)} to judge how well rings agree, ` +
        'so the error bars are themselves uncertain. Mark the rim on two or more further channels.',
    );
  if (f.seLnVExp > UNCONSTRAINED || f.unconstrained)
    warn(
      'vexp-unconstrained',
      'The marks do not bound the expansion velocity from above' +
        (f.seLnVExp > 0 && Number.isFinite(f.seLnVExp)
          ? `: 1/v_exp\u00b2 lies ${(1 / (2 * f.seLnVExp)).toFixed(1)} standard errors from zero. `
          : '. ') +
        'Report the lower end of its interval as a limit, or mark channels further from v_sys.',
    );
  const longer = Math.max(Math.abs(f.reach.low), Math.abs(f.reach.high));
  const shorter = Math.max(Math.min(f.reach.high, -f.reach.low), 0);
  if (shorter / longer < ONE_SIDED && !f.vSysKnown)
    warn(
      'one-sided',
      `On one side of v_sys the marks reach only ${((100 * shorter) / longer).toFixed(0)} % as far as on the other, so ` +
        'v_sys and v_exp trade off against each other. Mark channels on the other side, or give v_sys and fit one cap.',
    );
  if (f.riseSigma < RISE_SHORT)
    warn(
      'arc-too-short',
      `The marked arcs rise only ${Math.max(f.riseSigma, 0).toFixed(1)} times their error above a straight line` +
        ` (they cover ${f.arcDeg.toFixed(0)} degrees of the rim), so ` +
        (f.riseSigma < RISE_NONE
          ? 'the radius is not measured: do not adopt this fit. '
          : 'the radius is weakly measured and its error bar too small. ') +
        'Mark more of the rim.',
    );
  if (f.setAside > 0)
    warn(
      'outliers',
      `${f.setAside} of ${f.marks} marks ${f.setAside === 1 ? 'lies' : 'lie'} far off the ring of the other marks in ` +
        'the same channel and took no part in the fit. Check them: move, delete or leave them as they are.',
    );
  if (f.chi2PerDof > POOR_CHI2 || f.setAside > MANY_SET_ASIDE * f.marks)
    warn(
      'poor-fit',
      `The marks scatter ${Math.sqrt(f.chi2PerDof).toFixed(1)} times as far from the model as their stated error. ` +
        'Try a drifting or an elliptical shell, or see whether the marks follow more than one rim.',
    );
  for (const { what, side, bound } of f.atBounds)
    warn(
      'at-bound',
      `The fit ended with ${what} at its ${side} bound, ${bound}: the marks pull it further, and errors near a bound ` +
        'are not to be trusted. Widen the bound, or say why the value cannot lie beyond it.',
    );
  if (f.ledByPrior.length > 0)
    warn(
      'prior-dominated',
      `What the fit says of ${listed(f.ledByPrior)} is what its prior says: the marks add less than a fifth of the ` +
        'knowledge. Do not quote it as measured here, or mark more of the shell and leave the prior out.',
    );
  if (f.channelInVExp > COARSE)
    warn(
      'coarse-channels',
      `A channel is ${f.channelInVExp.toFixed(1)} times as wide as v_exp, so the rings are blurred over much of the ` +
        'shell, and two values of v_exp can fit equally well. Use a cube with narrower channels, or hold v_exp.',
    );
  return out;
}

const listed = (words: string[]) =>
  words.length < 2 ? words.join() : `${words.slice(0, -1).join(', ')} and ${words.at(-1)}`;

function spareRings(channels: number): string {
  const spare = Math.max(channels - 3, 0);
  return spare === 0 ? 'no spare ring' : spare === 1 ? 'one spare ring' : `${spare} spare rings`;
}
