import { MEGAYEAR_S, PARSEC_KM } from './constants';
import type { Measured } from './size';

/**
 * R/v of a pressure-driven bubble in a uniform medium, R ∝ t^0.6, has to be multiplied by 0.6 to be its age
 * (Weaver et al. 1977, ApJ 218, 377); free expansion would be 1, a momentum-conserving snowplough 0.25. Whoever
 * shows an age shows the factor with it.
 */
export const AGE_FACTOR = 0.6;

/**
 * Kinematic age: factor · R/v.
 *
 * @param radius      pc
 * @param velocity    km/s; null is returned for v ≤ 0, which has no age
 * @param correlation of radius and velocity, −1 … 1 (a larger Θ often goes with a smaller v_exp in a fit)
 * @returns Myr, with the first-order error
 */
export function kinematicAge(
  radius: Measured,
  velocity: Measured,
  { factor = AGE_FACTOR, correlation = 0 }: { factor?: number; correlation?: number } = {},
): { value: number; se: number } | null {
  if (!(velocity.value > 0)) return null;
  const value = ((factor * radius.value) / velocity.value) * (PARSEC_KM / MEGAYEAR_S);
  const a = radius.value === 0 ? 0 : (radius.se ?? 0) / radius.value;
  const b = (velocity.se ?? 0) / velocity.value;
  return { value, se: Math.abs(value) * Math.sqrt(Math.max(a * a + b * b - 2 * correlation * a * b, 0)) };
}
