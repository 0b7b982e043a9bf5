/** A number with its one-sigma error; se null: the error is not known and counts as nought. */
export interface Measured {
  value: number;
  se: number | null;
}

/**
 * Radius of a sphere that shows the angular radius Θ at a distance: R = D sin Θ.
 *
 * @param distance pc, > 0
 * @param theta    degrees, 0 ≤ Θ < 90
 * @returns pc, with the first-order error √((R δD/D)² + (D cos Θ δΘ)²)
 */
export function linearRadius(distance: Measured, theta: Measured): { value: number; se: number } {
  const angle = (theta.value * Math.PI) / 180;
  const value = distance.value * Math.sin(angle);
  const alongDistance = (distance.se ?? 0) * Math.sin(angle);
  const alongAngle = ((theta.se ?? 0) * Math.PI * distance.value * Math.cos(angle)) / 180;
  return { value, se: Math.hypot(alongDistance, alongAngle) };
}
