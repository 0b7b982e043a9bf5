import { ringRadius } from '@/shared/shell/ring';

interface Known {
  parameters: Record<string, { value: number; se: number | null }>;
  correlation: { names: readonly string[]; matrix: readonly (readonly (number | null)[])[] };
}

const NAMES = ['theta', 'vSys', 'vExp'] as const;

/**
 * The standard error of the model's ring radius at a velocity, degrees: the covariance of Θ, v_sys and v_exp carried
 * through the curve to first order, with central differences. Null where a needed number is not known; the curve has
 * an infinite slope at the caps, so there the error means nothing and is held at the radius itself.
 */
export function radiusErrorOf(fit: Known): ((velocity: number) => number) | null {
  const p = NAMES.map((name) => fit.parameters[name]);
  const index = NAMES.map((name) => fit.correlation.names.indexOf(name));
  if (p.some((q) => !q || q.se === null) || index.some((i) => i < 0)) return null;
  const value = p.map((q) => q!.value);
  const se = p.map((q) => q!.se!);
  const correlation = index.map((i) => index.map((j) => fit.correlation.matrix[i]?.[j] ?? null));
  if (correlation.some((row) => row.some((c) => c === null))) return null;

  const radius = (q: readonly number[], v: number) =>
    ringRadius(v, { theta: q[0]!, vSys: q[1]!, vExp: q[2]! }) ?? 0;
  return (velocity) => {
    const gradient = value.map((_, i) => {
      const step = Math.max(se[i]! * 1e-3, Math.abs(value[i]!) * 1e-7, 1e-9);
      const moved = (by: number) =>
        radius(
          value.map((x, k) => (k === i ? x + by : x)),
          velocity,
        );
      return (moved(step) - moved(-step)) / (2 * step);
    });
    let variance = 0;
    for (let i = 0; i < 3; i++)
      for (let j = 0; j < 3; j++)
        variance += gradient[i]! * gradient[j]! * se[i]! * se[j]! * correlation[i]![j]!;
    return Math.min(Math.sqrt(Math.max(variance, 0)), Math.max(radius(value, velocity), se[0]!));
  };
}
