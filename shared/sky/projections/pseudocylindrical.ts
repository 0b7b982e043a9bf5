import { DEGREE } from '@/shared/sky/greatCircle';
import type { ProjectionMaker } from './projection';

/** How far beyond half a turn rounding may carry a native longitude at the rim of a map, degrees. */
const RIM = 1e-9;

/** SFL, Sanson-Flamsteed: X = phi cos theta, Y = theta (5.3.1). Old GLS is the same map, laid on the sky unturned. */
export const sfl: ProjectionMaker = () => ({
  referenceLatitude: 0,
  forward: (phi, theta) => [phi * Math.cos(theta * DEGREE), theta],
  inverse(X, Y) {
    if (Math.abs(Y) > 90) return null;
    if (X === 0) return [0, Y];
    const phi = X / Math.cos(Y * DEGREE);
    return Math.abs(phi) <= 180 + RIM ? [phi, Y] : null;
  },
});

/** AIT, Hammer-Aitoff (5.3.4). */
export const ait: ProjectionMaker = () => ({
  referenceLatitude: 0,
  forward(phi, theta) {
    const t = theta * DEGREE;
    const half = phi * (DEGREE / 2);
    const gamma = Math.sqrt(2 / (1 + Math.cos(t) * Math.cos(half))) / DEGREE;
    return [2 * gamma * Math.cos(t) * Math.sin(half), gamma * Math.sin(t)];
  },
  inverse(X, Y) {
    const x = X * DEGREE;
    const y = Y * DEGREE;
    const z2 = 1 - (x / 4) ** 2 - (y / 2) ** 2;
    if (z2 < 0.5 - 1e-13) return null;
    const z = Math.sqrt(z2);
    const across = (x * z) / 2; // cos theta sin(phi/2)
    const along = 2 * z2 - 1; // cos theta cos(phi/2)
    return [(2 * Math.atan2(across, along)) / DEGREE, Math.atan2(y * z, Math.hypot(across, along)) / DEGREE];
  },
});

/** MOL, Mollweide: X = (2 sqrt 2/180) phi cos g, Y = sqrt 2 sin g, with 2 g + sin 2g = pi sin theta (5.3.3). */
export const mol: ProjectionMaker = () => ({
  referenceLatitude: 0,
  forward(phi, theta) {
    const g = auxiliary(theta * DEGREE);
    return [((2 * Math.SQRT2) / Math.PI) * phi * Math.cos(g), (Math.SQRT2 * Math.sin(g)) / DEGREE];
  },
  inverse(X, Y) {
    const s = (Y * DEGREE) / Math.SQRT2;
    if (Math.abs(s) > 1) return null;
    const g = Math.asin(s);
    const phi = X === 0 ? 0 : (X * Math.PI) / (2 * Math.SQRT2 * Math.cos(g));
    if (!(Math.abs(phi) <= 180 + RIM)) return null;
    return [phi, latitude(g) / DEGREE];
  },
});

/** theta of the auxiliary angle g, from the distance to the pole, where the sine alone would lose half the digits. */
function latitude(g: number): number {
  const d = Math.PI / 2 - Math.abs(g);
  // pi (1 - sin theta) = 2 d - sin 2d; the series keeps its digits where the difference would not.
  const e = 2 * d;
  const rest = e < 0.1 ? (e ** 3 / 6) * (1 - ((e * e) / 20) * (1 - (e * e) / 42)) : e - Math.sin(e);
  const theta = Math.PI / 2 - 2 * Math.asin(Math.sqrt(Math.min(1, rest / (2 * Math.PI))));
  return Math.sign(g) * theta;
}

/** Solve 2 g + sin 2g = pi sin theta by bisected Newton steps in the distance from the pole. */
function auxiliary(theta: number): number {
  const target = Math.abs(theta);
  let low = 0;
  let high = Math.PI / 2;
  let g = target;
  for (let i = 0; i < 100; i++) {
    const miss = latitude(g) - target;
    if (miss === 0) break;
    if (miss > 0) high = g;
    else low = g;
    const slope = (2 * (1 + Math.cos(2 * g))) / (Math.PI * Math.cos(latitude(g)));
    const next = g - miss / slope;
    const step = next > low && next < high ? next : (low + high) / 2;
    if (Math.abs(step - g) < 1e-16) break;
    g = step;
  }
  return theta < 0 ? -g : g;
}
