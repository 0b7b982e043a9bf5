import type { Trace } from '@/shared/contract/traces';
import type { DoneFit } from './fitFacts';

/**
 * The fit of a person's marks and the newest fit of the rim traced around it, from either of the two. Null where one of
 * them is missing, or lacks the sphere's numbers.
 */
export function counterpart(
  fit: DoneFit,
  fits: readonly DoneFit[],
  traces: readonly Trace[],
): { marked: DoneFit; traced: DoneFit } | null {
  const sourceOf = (traced: DoneFit) => traces.find((t) => t.id === traced.traceId)?.fitId;
  const marked = fit.traceId === null ? fit : fits.find((f) => f.id === sourceOf(fit));
  const traced = fit.traceId === null ? fits.find((f) => f.traceId !== null && sourceOf(f) === fit.id) : fit;
  if (!marked || !traced) return null;
  const whole = (f: DoneFit) => ['l', 'b', 'theta', 'vSys', 'vExp'].every((name) => f.parameters[name]);
  return whole(marked) && whole(traced) ? { marked, traced } : null;
}
