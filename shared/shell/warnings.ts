import type { FitWarning } from '@/shared/shell/fitResult';
import type { ModelName } from '@/shared/shell/shellModel';

/** What the warnings are judged by. Velocities in units of v_exp from v_sys; angles in degrees. */
export interface Findings {
  model: ModelName;
  settled: boolean;
  unconstrained: boolean;
  channels: number;
  marks: number;
  setAside: number;
  seLnVExp: number;
  /** Lowest and highest (v - v_sys)/v_exp among the marks in the fit. */
  reach: { low: number; high: number };
  arcDeg: number;
  riseSigma: number;
  chi2PerDof: number;
}

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
  if (!f.settled && !f.unconstrained)
    warn(
      'start-failed',
      'The fit did not settle from any of its start values, so its numbers are only where it stopped. ' +
        'Look at the marks with the largest residuals, or mark more channels.',
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
  if (shorter / longer < ONE_SIDED && f.model !== 'cap')
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
  return out;
}

function spareRings(channels: number): string {
  const spare = Math.max(channels - 3, 0);
  return spare === 0 ? 'no spare ring' : spare === 1 ? 'one spare ring' : `${spare} spare rings`;
}
