import { channelCurve } from '@/shared/shell/channelCurve';
import { evaluateElliptical } from '@/shared/shell/ellipticalResiduals';
import type { Evaluation, Frame } from '@/shared/shell/frame';
import type { MarkSet } from '@/shared/shell/markSet';
import {
  EXTRA_1,
  EXTRA_2,
  LN_W,
  THETA,
  V0,
  X,
  Y,
  parameterCount,
  type ModelName,
} from '@/shared/shell/shellModel';

/**
 * Fill `out` with residuals, analytic derivatives and variances of all marks at the parameters p.
 *
 * @param p parameters in the order of shellModel.ts; radians, km/s
 */
export function evaluate(
  model: ModelName,
  marks: MarkSet,
  frame: Frame,
  p: Float64Array,
  out: Evaluation,
): void {
  const w = Math.exp(p[LN_W]!);
  for (let k = 0; k < marks.channels; k++)
    channelCurve(marks.velocity[k]!, marks.width, p[THETA]!, p[V0]!, w, out.curve, k);
  if (model === 'elliptical') evaluateElliptical(marks, frame, p, out);
  else evaluateRound(parameterCount(model), marks, frame, p, out);
}

/** Ring centres closer to a mark than this have no direction; the derivative is then held finite. */
const SMALLEST_SINE = 1e-9;

/**
 * Round rings: sphere, cap, and the drifting sphere, whose centre moves in proportion to the velocity.
 *
 * With q = (a, e, n) a mark's components and c = (1, x, y)/L the centre's, the angle is atan2(|q x c|, q.c), which
 * keeps its digits at any size, and d theta/dx = -(q . dc/dx)/sin theta.
 */
function evaluateRound(size: number, marks: MarkSet, frame: Frame, p: Float64Array, out: Evaluation): void {
  const { jacobian: J, residual, variance } = out;
  const { radius, variance: spread, dTheta, dV0, dLnW } = out.curve;
  const { along, eastward, northward } = frame;
  const { channel, velocity, sigma2 } = marks;
  const drifting = size > EXTRA_1;
  const driftX = drifting ? p[EXTRA_1]! : 0;
  const driftY = drifting ? p[EXTRA_2]! : 0;
  const v0 = p[V0]!;
  const centreX = p[X]!;
  const centreY = p[Y]!;
  for (let i = 0, at = 0; i < residual.length; i++) {
    const k = channel[i]!;
    const a = along[i]!;
    const e = eastward[i]!;
    const n = northward[i]!;
    const fromV0 = velocity[k]! - v0;
    const x = centreX + driftX * fromV0;
    const y = centreY + driftY * fromV0;
    const perLength = 1 / Math.sqrt(1 + x * x + y * y);
    const cosine = (a + x * e + y * n) * perLength;
    const c1 = e * y - n * x;
    const c2 = n - a * y;
    const c3 = a * x - e;
    const sine = Math.sqrt(c1 * c1 + c2 * c2 + c3 * c3) * perLength;
    const slope = -perLength / (sine > SMALLEST_SINE ? sine : SMALLEST_SINE);
    const dX = slope * (e - cosine * x * perLength);
    const dY = slope * (n - cosine * y * perLength);
    residual[i] = Math.atan2(sine, cosine) - radius[k]!;
    variance[i] = sigma2[i]! + spread[k]!;
    J[at++] = dX; // in the order of shellModel.ts
    J[at++] = dY;
    J[at++] = -dTheta[k]!;
    J[at++] = -dV0[k]! - driftX * dX - driftY * dY;
    J[at++] = -dLnW[k]!;
    if (drifting) {
      J[at++] = dX * fromV0;
      J[at++] = dY * fromV0;
    }
  }
}
