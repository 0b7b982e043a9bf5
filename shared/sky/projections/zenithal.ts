import { DEGREE } from '@/shared/sky/greatCircle';
import type { Projection, ProjectionMaker } from './projection';

/**
 * The zenithal projections that depend on the distance from the native pole alone: R(c) with c = 90 - theta, and
 * X = R sin phi, Y = -R cos phi.
 */
interface Radial {
  /** Plane radius in degrees of the distance c from the pole in degrees; null where it has none. */
  radius(c: number): number | null;
  distance(R: number): number | null;
}

const zenithal = ({ radius, distance }: Radial): Projection => ({
  referenceLatitude: 90,
  forward(phi, theta) {
    const R = radius(90 - theta);
    return R === null ? null : [R * Math.sin(phi * DEGREE), -R * Math.cos(phi * DEGREE)];
  },
  inverse(X, Y) {
    const c = distance(Math.hypot(X, Y));
    return c === null ? null : [Math.atan2(X, -Y) / DEGREE, 90 - c];
  },
});

/** TAN, gnomonic: R = tan c (5.1.3). */
export const tan: ProjectionMaker = () =>
  zenithal({
    radius: (c) => (c < 90 ? Math.tan(c * DEGREE) / DEGREE : null),
    distance: (R) => Math.atan(R * DEGREE) / DEGREE,
  });

/** STG, stereographic: R = 2 tan(c/2) (5.1.4). */
export const stg: ProjectionMaker = () =>
  zenithal({
    radius: (c) => (c < 180 ? (2 * Math.tan((c * DEGREE) / 2)) / DEGREE : null),
    distance: (R) => (2 * Math.atan((R * DEGREE) / 2)) / DEGREE,
  });

/** ARC, zenithal equidistant: R = c (5.1.6). */
export const arc: ProjectionMaker = () =>
  zenithal({ radius: (c) => c, distance: (R) => (R <= 180 ? R : null) });

/** ZEA, zenithal equal area: R = 2 sin(c/2) (5.1.8). */
export const zea: ProjectionMaker = () =>
  zenithal({
    radius: (c) => (2 * Math.sin((c * DEGREE) / 2)) / DEGREE,
    distance: (R) => ((R * DEGREE) / 2 <= 1 ? (2 * Math.asin((R * DEGREE) / 2)) / DEGREE : null),
  });
