import { reducedStep, reduction } from '@/shared/shell/constrainedStep';
import { difference, unwrapped, type Known } from '@/shared/shell/known';
import { EXTRA_2 } from '@/shared/shell/shellModel';

/** Values of the natural parameters and their derivatives with respect to the internal ones, row-major. */
export interface Natural {
  values: Float64Array;
  G: Float64Array;
}

/** Add the priors to the normal equations; returns what they add to chi2. */
export function addPriors(
  known: readonly Known[],
  natural: Natural,
  A: Float64Array,
  g: Float64Array,
): number {
  const size = g.length;
  let cost = 0;
  for (const k of known) {
    if (k.prior === null) continue;
    const row = gradient(natural, k.index);
    const r = difference(k, natural.values[k.index]!, k.prior.mean) / k.prior.sd;
    cost += r * r;
    for (let a = 0; a < size; a++) {
      const scaled = row[a]! / k.prior.sd;
      g[a] = g[a]! + scaled * r;
      for (let b = 0; b < size; b++) A[a * size + b] = A[a * size + b]! + (scaled * row[b]!) / k.prior.sd;
    }
  }
  return cost;
}

/**
 * The damped step within what is known: held parameters stay, and a step that would pass a bound ends on it, the other
 * parameters' steps taken anew. Bounds join one at a time, the furthest passed first, and every step starts without
 * them, so that a parameter leaves its bound when the marks pull it back.
 */
export function stepWithin(
  known: readonly Known[],
  natural: Natural,
  A: Float64Array,
  g: Float64Array,
  damping: number,
  step: Float64Array,
): boolean {
  const size = g.length;
  const scale = Float64Array.from({ length: size }, (_, a) => 1 / Math.sqrt(A[a * size + a]! + 1e-300));
  const conditions = fixedConditions(known, natural);
  const open = known.filter((k) => k.fixed === null && (Number.isFinite(k.low) || Number.isFinite(k.high)));
  for (;;) {
    if (!reducedStep(size, reduction(size, conditions, scale), A, g, damping, step)) return false;
    let worst = { by: 1e-12, at: -1, target: 0 };
    open.forEach((k, at) => {
      const row = gradient(natural, k.index);
      const value = unwrapped(k, natural.values[k.index]!);
      let [change, unit] = [0, 0];
      for (let a = 0; a < size; a++) {
        change += row[a]! * step[a]!;
        unit += Math.abs(row[a]!) * scale[a]!;
      }
      const bound = value + change > k.high ? k.high : value + change < k.low ? k.low : null;
      if (bound === null) return;
      const by = Math.abs(value + change - bound) / (unit + 1e-300);
      if (by > worst.by) worst = { by, at, target: bound - value };
    });
    if (worst.at < 0) return true;
    const [k] = open.splice(worst.at, 1);
    conditions.push({ row: gradient(natural, k!.index), target: worst.target });
  }
}

/** The conditions that held parameters put on a step. */
export function fixedConditions(known: readonly Known[], natural: Natural) {
  return known
    .filter((k) => k.fixed !== null)
    .map((k) => ({
      row: gradient(natural, k.index),
      target: difference(k, k.fixed!, natural.values[k.index]!),
    }));
}

/** Derivatives of one natural parameter. */
export const gradient = ({ values, G }: Natural, index: number): Float64Array =>
  G.subarray(index * values.length, (index + 1) * values.length);

/** The direction in which an ellipse is taken to lie while it is round: what is known of its axis. */
export function axisOf(known: readonly Known[]): number | undefined {
  const k = known.find((one) => one.index === EXTRA_2 && one.period !== null);
  if (k === undefined) return undefined;
  return k.fixed ?? k.prior?.mean ?? 0.5 * (k.low + k.high);
}
