import { DEGREE } from '@/shared/sky/greatCircle';
import { WcsError } from '@/shared/sky/wcsSpec';
import type { Projection, ProjectionMaker } from './projection';

/**
 * SIN, orthographic, with the slant parameters xi, eta of interferometers (5.1.5):
 *
 *     X = cos theta sin phi + xi (1 - sin theta),  Y = -cos theta cos phi + eta (1 - sin theta)
 *
 * in radians. The side facing the observer is shown: sin theta is the larger root.
 */
function slant(xi: number, eta: number): Projection {
  return {
    referenceLatitude: 90,
    forward(phi, theta) {
      const p = phi * DEGREE;
      const t = theta * DEGREE;
      const toPole = 2 * Math.sin((90 - theta) * (DEGREE / 2)) ** 2; // 1 - sin theta, without cancellation
      if (theta * DEGREE < -Math.atan(xi * Math.sin(p) - eta * Math.cos(p))) return null; // beyond the horizon
      return [
        (Math.cos(t) * Math.sin(p) + xi * toPole) / DEGREE,
        (-Math.cos(t) * Math.cos(p) + eta * toPole) / DEGREE,
      ];
    },
    inverse(X, Y) {
      const x = X * DEGREE;
      const y = Y * DEGREE;
      // With w = 1 - sin theta: (x - xi w)^2 + (y - eta w)^2 = 1 - (1 - w)^2, and the smaller w is the near side.
      const a = xi * xi + eta * eta + 1;
      const b = xi * x + eta * y + 1;
      const c = x * x + y * y;
      const discriminant = b * b - a * c;
      if (discriminant < 0) return null;
      const w = c / (b + Math.sqrt(discriminant)); // the smaller root, without cancellation
      if (!(w >= 0 && w <= 2)) return null;
      const u = x - xi * w;
      const v = y - eta * w;
      return [Math.atan2(u, -v) / DEGREE, Math.atan2(1 - w, Math.hypot(u, v)) / DEGREE];
    },
  };
}

export const sin: ProjectionMaker = (parameters) => slant(parameters[1] ?? 0, parameters[2] ?? 0);

/** NCP, the old projection of east-west arrays: SIN with xi = 0, eta = cot of the reference latitude (5.1.5). */
export const ncp: ProjectionMaker = (_parameters, latitude) => {
  if (Math.sin(latitude * DEGREE) === 0) throw new WcsError('CRVAL', 'NCP has no map about the equator.');
  return slant(0, 1 / Math.tan(latitude * DEGREE));
};
