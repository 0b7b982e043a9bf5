import { PARAMETER_WORDS } from '@/shared/shell/constraints';
import type { FitExtra, Parameter } from '@/shared/shell/fitResult';
import type { Outcome } from '@/shared/shell/gaussNewton';
import type { Known, reached } from '@/shared/shell/known';
import { PARAMETER_NAMES, PARAMETER_UNITS, type ModelName } from '@/shared/shell/shellModel';
import type { Findings } from '@/shared/shell/warnings';

type Reached = ReturnType<typeof reached>;

/** Why the fit stopped, with a sentence. */
export function convergenceOf(outcome: Outcome, atBound: boolean): NonNullable<FitExtra['convergence']> {
  if (outcome.reason === 'iterations')
    return { reason: 'iterations', sentence: 'The fit used up its steps before it settled.' };
  if (outcome.reason === 'no-progress')
    return {
      reason: 'no-progress',
      sentence: 'No step brought the fit closer to the marks, though one should have.',
    };
  if (atBound || outcome.atBound !== null)
    return { reason: 'at-bound', sentence: 'The fit settled with a parameter at its bound.' };
  return { reason: 'settled', sentence: 'The fit settled: its last step was under a millionth of an error.' };
}

/** Bounds at which a fit ended, in words: those set by a person, and the lower one that the marks' span sets to v_exp. */
export function boundsInWords(model: ModelName, outcome: Outcome, atBounds: Reached): Findings['atBounds'] {
  const set = atBounds.map(({ known, side }) => {
    const name = PARAMETER_NAMES[model][known.index]!;
    const unit = PARAMETER_UNITS[name] ? ` ${PARAMETER_UNITS[name]}` : '';
    const bound = known.given[side] ?? known[side];
    return {
      what: PARAMETER_WORDS[name]!,
      side: side === 'low' ? ('lower' as const) : ('upper' as const),
      bound: `${bound}${unit}`,
    };
  });
  if (outcome.atBound !== 'low' || set.some((s) => s.what === PARAMETER_WORDS.vExp)) return set;
  return [
    ...set,
    { what: PARAMETER_WORDS.vExp!, side: 'lower', bound: "0.3 of half the marks' velocity span" },
  ];
}

/** Above this share of a parameter's knowledge its prior leads: its error is over 0.9 of the prior's. */
export const PRIOR_LEADS = 0.81;

/**
 * How much of what the fit knows of a parameter comes from its prior, 0 to 1: the leverage of the prior as a datum, or
 * by how much the value moves when the prior's mean is moved by one.
 *
 * @param plain least-squares covariance in natural units
 */
export function priorShare({ prior, index }: Known, plain: Float64Array, size: number): number {
  return prior === null ? 0 : plain[index * size + index]! / prior.sd ** 2;
}

/** Parameters with what was said of them, and with the bound at which they ended. */
export function withConstraints(
  parameters: Record<string, Parameter>,
  names: readonly string[],
  known: readonly Known[],
  atBounds: Reached,
): Record<string, Parameter> {
  const out = { ...parameters };
  for (const k of known) {
    const name = names[k.index]!;
    const side = atBounds.find((r) => r.known === k)?.side;
    out[name] = {
      ...out[name]!,
      ...(Object.keys(k.given).length > 0 ? { constraint: k.given } : {}),
      ...(side ? { value: k.given[side] ?? k[side], atBound: side } : {}),
    };
  }
  return out;
}
