import { EXTRA_1, EXTRA_2, type ModelName } from '@/shared/shell/shellModel';
import type { Constraint } from '@/shared/shell/fitResult';
import type { Frame } from '@/shared/shell/frame';
import { internalValues, naturalValues } from '@/shared/shell/naturalParameters';

/** What is known of one parameter before the fit, in natural units (degrees, km/s). */
export interface Known {
  /** Place in PARAMETER_NAMES of the model. */
  index: number;
  fixed: number | null;
  prior: { mean: number; sd: number } | null;
  /** Infinite where there is no bound. */
  low: number;
  high: number;
  /** 360 for a longitude, 180 for the direction of an axis: values a period apart are the same. */
  period: number | null;
  /** As it was said. */
  given: Constraint;
}

export const isFixed = (known: readonly Known[], index: number): boolean =>
  known.some((k) => k.index === index && k.fixed !== null);

/** Whether anything at all is known of a parameter's value: it is held or under a prior. */
export const isInformed = (known: readonly Known[], index: number): boolean =>
  known.some((k) => k.index === index && (k.fixed !== null || k.prior !== null));

/** value - about, the short way round where the parameter has a period. */
export function difference({ period }: Pick<Known, 'period'>, value: number, about: number): number {
  const plain = value - about;
  return period === null ? plain : plain - period * Math.round(plain / period);
}

/** The value that a parameter must take: its own where that is allowed, else the nearest that is. */
export function allowed(k: Known, value: number): number {
  if (k.fixed !== null) return k.fixed;
  const seen = unwrapped(k, value);
  return seen < k.low ? k.low : seen > k.high ? k.high : value;
}

/** A value of a parameter with a period, turned to the side on which its bounds lie. */
export function unwrapped(k: Known, value: number): number {
  if (k.period === null || !Number.isFinite(k.low) || !Number.isFinite(k.high)) return value;
  const middle = 0.5 * (k.low + k.high);
  return middle + difference(k, value, middle);
}

/** Sum over the priors of ((value - mean)/sd)^2: each counts as one datum. */
export function priorChi2(known: readonly Known[], values: Float64Array): number {
  let sum = 0;
  for (const { index, prior, period } of known)
    if (prior !== null) sum += (difference({ period }, values[index]!, prior.mean) / prior.sd) ** 2;
  return sum;
}

/**
 * Move p to the nearest parameters that the constraints allow; the frame stays.
 *
 * @param known in falling order of index: an axis is turned, which shortens the flattening, before its ratio is set
 */
export function intoKnown(model: ModelName, known: readonly Known[], frame: Frame, p: Float64Array): void {
  if (known.length === 0) return;
  const values = naturalValues(model, { frame, p });
  let moved = false;
  for (const k of known) {
    const value = allowed(k, values[k.index]!);
    if (value === values[k.index]) continue;
    moved = true;
    if (model === 'elliptical' && k.index === EXTRA_2)
      values[EXTRA_1] = projectedRatio(values[EXTRA_1]!, difference(k, value, values[EXTRA_2]!));
    values[k.index] = value;
  }
  if (moved) p.set(internalValues(model, frame, values, p));
}

/** Axis ratio that is left of an ellipse when its axis is turned by some degrees: the part of e along the new axis. */
function projectedRatio(ratio: number, turn: number): number {
  const e = (1 - ratio * ratio) / (1 + ratio * ratio);
  const left = Math.max(e * Math.cos((2 * turn * Math.PI) / 180), 0);
  return Math.sqrt((1 - left) / (1 + left));
}

/** Bounds reached by a fit, by parameter: a value within rounding of a bound that was set. */
export function reached(
  known: readonly Known[],
  values: Float64Array,
): { known: Known; side: 'low' | 'high' }[] {
  const out: { known: Known; side: 'low' | 'high' }[] = [];
  for (const k of known) {
    if (k.fixed !== null) continue;
    const value = unwrapped(k, values[k.index]!);
    const close = (bound: number) =>
      Number.isFinite(bound) && Math.abs(value - bound) <= 1e-9 * Math.max(1, Math.abs(bound));
    if (close(k.low)) out.push({ known: k, side: 'low' });
    else if (close(k.high)) out.push({ known: k, side: 'high' });
  }
  return out;
}
