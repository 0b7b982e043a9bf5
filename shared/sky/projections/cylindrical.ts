import { DEGREE } from '@/shared/sky/greatCircle';
import { WcsError } from '@/shared/sky/wcsSpec';
import type { ProjectionMaker } from './projection';

/**
 * CAR, plate carree: X = phi, Y = theta (5.2.3). X is not limited to half a turn: cubes whose reference lies far
 * outside the image exist, and the map goes on.
 */
export const car: ProjectionMaker = () => ({
  referenceLatitude: 0,
  forward: (phi, theta) => [phi, theta],
  inverse: (X, Y) => (Math.abs(Y) <= 90 ? [X, Y] : null),
});

/** CEA, cylindrical equal area: X = phi, Y = sin theta / lambda (5.2.2). */
export const cea: ProjectionMaker = (parameters) => {
  const lambda = parameters[1] ?? 1;
  if (!(lambda > 0 && lambda <= 1)) {
    throw new WcsError('PV2_1', `CEA needs a parameter above 0 and at most 1; the header says ${lambda}.`);
  }
  return {
    referenceLatitude: 0,
    forward: (phi, theta) => [phi, Math.sin(theta * DEGREE) / lambda / DEGREE],
    inverse(X, Y) {
      const s = Y * DEGREE * lambda;
      return Math.abs(s) <= 1 && Math.abs(X) <= 180 ? [X, Math.asin(s) / DEGREE] : null;
    },
  };
};

/** MER, Mercator: X = phi, Y = ln tan((90 + theta)/2), written as asinh tan theta (5.2.4). */
export const mer: ProjectionMaker = () => ({
  referenceLatitude: 0,
  forward: (phi, theta) =>
    Math.abs(theta) < 90 ? [phi, Math.asinh(Math.tan(theta * DEGREE)) / DEGREE] : null,
  inverse: (X, Y) => (Math.abs(X) <= 180 ? [X, Math.atan(Math.sinh(Y * DEGREE)) / DEGREE] : null),
});
