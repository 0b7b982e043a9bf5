import { velocityReach, type MarkSet } from '@/shared/shell/markSet';
import { EXTRA_1, EXTRA_2, LN_W, THETA, V0, type ModelName } from '@/shared/shell/shellModel';

/** Bounds of ln w in units of the marks' velocity reach: at the upper one the expansion velocity is unconstrained. */
const WIDEST = 20;
const NARROWEST = 0.3;
/** Largest e of an elliptical ring: an axis ratio of 0.16. */
const FLATTEST = 0.95;

/** The box in which a fit looks for its parameters; internal units. */
export interface Bounds {
  thetaLow: number;
  thetaHigh: number;
  lnWLow: number;
  lnWHigh: number;
  vLow: number;
  vHigh: number;
}

export function boundsOf(marks: MarkSet): Bounds {
  const { low, high, half } = velocityReach(marks);
  return {
    thetaLow: 1e-6,
    thetaHigh: 1.45,
    lnWLow: Math.log(half * NARROWEST),
    lnWHigh: Math.log(half * WIDEST),
    vLow: low - 40 * half,
    vHigh: high + 40 * half,
  };
}

export function intoBounds(model: ModelName, p: Float64Array, bounds: Bounds): void {
  p[THETA] = Math.min(Math.max(p[THETA]!, bounds.thetaLow), bounds.thetaHigh);
  p[V0] = Math.min(Math.max(p[V0]!, bounds.vLow), bounds.vHigh);
  p[LN_W] = Math.min(Math.max(p[LN_W]!, bounds.lnWLow), bounds.lnWHigh);
  if (model !== 'elliptical') return;
  const flattening = Math.hypot(p[EXTRA_1]!, p[EXTRA_2]!);
  if (flattening <= FLATTEST) return;
  p[EXTRA_1] = (p[EXTRA_1]! * FLATTEST) / flattening;
  p[EXTRA_2] = (p[EXTRA_2]! * FLATTEST) / flattening;
}
