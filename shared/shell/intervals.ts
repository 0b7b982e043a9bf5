import type { ErrorModel } from '@/shared/shell/errorModel';
import type { Known } from '@/shared/shell/known';
import type { ShellState } from '@/shared/shell/gaussNewton';
import type { Parameter } from '@/shared/shell/fitResult';
import { naturalJacobian, naturalValues, transformed } from '@/shared/shell/naturalParameters';
import { LN_W, PARAMETER_NAMES, PARAMETER_UNITS, type ModelName } from '@/shared/shell/shellModel';
import { tHalfWidth } from '@/shared/shell/studentT';

export interface Reported {
  names: readonly string[];
  parameters: Record<string, Parameter>;
  /** Covariances in natural units: of the four-source error model, and of independent marks. */
  covariance: Float64Array;
  plain: Float64Array;
  correlation: number[][];
}

/**
 * Values, standard errors and central 68 % intervals. An interval is value +- t se, with Student's t; the expansion
 * velocity's is symmetric in 1/v_exp^2, the quantity that rings measure nearly linearly, and open above where zero
 * lies inside it. A held parameter has no error; an interval ends at a bound it would pass.
 */
export function report(
  model: ModelName,
  state: ShellState,
  errors: ErrorModel,
  known: readonly Known[] = [],
): Reported {
  const size = state.p.length;
  const names = PARAMETER_NAMES[model];
  const values = naturalValues(model, state);
  const G = naturalJacobian(model, state);
  const covariance = transformed(size, G, errors.covariance);
  const plain = transformed(size, G, errors.plain);
  const se = Float64Array.from({ length: size }, (_, a) => Math.sqrt(covariance[a * size + a]!));
  const parameters: Record<string, Parameter> = {};
  names.forEach((name, a) => {
    const value = values[a]!;
    const unit = PARAMETER_UNITS[name] ?? '';
    const given = known.find((k) => k.index === a);
    if (given && given.fixed !== null) {
      parameters[name] = { value: given.fixed, se: 0, lo: given.fixed, hi: given.fixed, unit };
      return;
    }
    const half = tHalfWidth(errors.tDof[a]!) * se[a]!;
    let { lo, hi } = intervalOf(a, value, half);
    if (given && given.period === null) {
      lo = Math.max(lo, given.low);
      hi = hi === null || hi > given.high ? finite(given.high) : hi;
    }
    parameters[name] = { value, se: finite(se[a]!), lo: finite(lo), hi: finite(hi), unit };
  });
  const correlation = names.map((_, a) =>
    names.map((_, b) => {
      if (a === b) return 1;
      const product = se[a]! * se[b]!;
      return product > 0 ? covariance[a * size + b]! / product : 0;
    }),
  );
  return { names, parameters, covariance, plain, correlation };
}

/** The interval of parameter `a` whose half-width, were it symmetric, is `half`; hi is null where there is no upper end. */
export function intervalOf(a: number, value: number, half: number): { lo: number; hi: number | null } {
  if (a !== LN_W) return { lo: value - half, hi: value + half };
  const inverseSquare = (2 * half) / value; // half-width of 1/v_exp^2 in units of itself
  return {
    lo: value / Math.sqrt(1 + inverseSquare),
    hi: inverseSquare < 1 ? value / Math.sqrt(1 - inverseSquare) : null,
  };
}

/** The number where JSON can carry it, else null. */
export const finite = (value: number | null): number | null =>
  value !== null && Number.isFinite(value) ? value : null;
