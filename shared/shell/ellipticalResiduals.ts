import { eastNorth, type Vector } from '@/shared/sky/greatCircle';
import { centreAt, type Evaluation, type Frame } from '@/shared/shell/frame';
import type { MarkSet } from '@/shared/shell/markSet';
import { EXTRA_1, EXTRA_2, LN_W, THETA, V0, X, Y } from '@/shared/shell/shellModel';

const SIZE = 7;
/** The flattening is bounded so that F stays above this even while a step overshoots. */
const SMALLEST_F = 0.02;
const SINE_LIMIT = 1 - 1e-9;

/**
 * Elliptical rings: sin^2 theta (1 - e1 cos 2psi - e2 sin 2psi) = sin^2 of the round ring, psi the position angle of
 * the mark about the centre, north through east. The form is smooth at the circle, e1 = e2 = 0.
 *
 * The positional error grows where the ring is slanted to the radius: by 1 + (d ln theta/d psi)^2. `out.curve` must
 * have been filled. Derivatives follow the marks' components X, Y along east and north at the centre as it moves,
 * the turning of those axes included.
 */
export function evaluateElliptical(marks: MarkSet, frame: Frame, p: Float64Array, out: Evaluation): void {
  const [x, y, e1, e2] = [p[X]!, p[Y]!, p[EXTRA_1]!, p[EXTRA_2]!];
  const c = centreAt(frame, x, y);
  const perLength = 1 / Math.sqrt(1 + x * x + y * y);
  const dX = tangent(c, frame.east, perLength);
  const dY = tangent(c, frame.north, perLength);
  const { east, north } = eastNorth(c);
  const turning = c[2] / Math.max(Math.hypot(c[0], c[1]), 1e-9); // tan b: how fast east turns along a parallel
  const dXEast = dot(dX, east);
  const dXNorth = dot(dX, north);
  const dYEast = dot(dY, east);
  const dYNorth = dot(dY, north);
  const { curve, jacobian: J } = out;
  const { direction: q } = marks;

  for (let i = 0; i < marks.count; i++) {
    const k = marks.channel[i]!;
    const [qx, qy, qz] = [q[3 * i]!, q[3 * i + 1]!, q[3 * i + 2]!];
    const E = qx * east[0] + qy * east[1] + qz * east[2];
    const N = qx * north[0] + qy * north[1] + qz * north[2];
    const cosine = qx * c[0] + qy * c[1] + qz * c[2];
    const sine = Math.sqrt(E * E + N * N);
    const perSine = 1 / Math.max(sine, 1e-9);
    const perSquare = perSine * perSine;
    const cos2 = (N * N - E * E) * perSquare;
    const sin2 = 2 * E * N * perSquare;
    const F = Math.max(1 - e1 * cos2 - e2 * sin2, SMALLEST_F);
    const perRoot = 1 / Math.sqrt(F);
    const modelSine = Math.min(Math.sin(curve.radius[k]!) * perRoot, SINE_LIMIT);
    const perCosine = 1 / Math.sqrt(1 - modelSine * modelSine);
    const dRadius = perCosine * Math.cos(curve.radius[k]!) * perRoot;
    const dF = (-0.5 * perCosine * modelSine) / F;
    const slant = (e2 * cos2 - e1 * sin2) / F;

    out.residual[i] = Math.atan2(sine, cosine) - Math.asin(modelSine);
    out.variance[i] = marks.sigma2[i]! * (1 + slant * slant) + curve.variance[k]! * dRadius * dRadius;
    const row = i * SIZE;
    for (let axis = 0; axis < 2; axis++) {
      const d = axis === 0 ? dX : dY;
      const alongEast = axis === 0 ? dXEast : dYEast;
      const alongNorth = axis === 0 ? dXNorth : dYNorth;
      const dE = alongEast * (turning * N - cosine);
      const dN = -alongEast * turning * E - alongNorth * cosine;
      const dSquare = 2 * (E * dE + N * dN);
      const dCos2 = (2 * (N * dN - E * dE) - cos2 * dSquare) * perSquare;
      const dSin2 = (2 * (E * dN + N * dE) - sin2 * dSquare) * perSquare;
      const dTheta = -(qx * d[0] + qy * d[1] + qz * d[2]) * perSine;
      J[row + axis] = dTheta + dF * (e1 * dCos2 + e2 * dSin2);
    }
    J[row + THETA] = -dRadius * curve.dTheta[k]!;
    J[row + V0] = -dRadius * curve.dV0[k]!;
    J[row + LN_W] = -dRadius * curve.dLnW[k]!;
    J[row + EXTRA_1] = dF * cos2;
    J[row + EXTRA_2] = dF * sin2;
  }
}

const dot = (a: Vector, b: Vector): number => a[0] * b[0] + a[1] * b[1] + a[2] * b[2];

/** Derivative of the unit vector (n0 + x e + y m)/L along one of the plane's axes. */
function tangent(c: Vector, axis: Vector, perLength: number): Vector {
  const along = dot(c, axis);
  return [
    (axis[0] - along * c[0]) * perLength,
    (axis[1] - along * c[1]) * perLength,
    (axis[2] - along * c[2]) * perLength,
  ];
}
