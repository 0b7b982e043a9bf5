import { DEGREE, lonLatOf } from '@/shared/sky/greatCircle';
import type { ShellState } from '@/shared/shell/gaussNewton';
import { EXTRA_1, EXTRA_2, LN_W, THETA, V0, X, Y, type ModelName } from '@/shared/shell/shellModel';

/**
 * The parameters as a person reads them, in the order of PARAMETER_NAMES: degrees, km/s. The state must be recentred.
 * The elliptical theta is the larger semi-axis; the position angle, of that axis, is between 0 and 180.
 */
export function naturalValues(model: ModelName, { frame, p }: ShellState): Float64Array {
  const { lon, lat } = lonLatOf(frame.origin);
  const values = Float64Array.from(p);
  values.set([lon, lat, p[THETA]! / DEGREE, p[V0]!, Math.exp(p[LN_W]!)]);
  if (model === 'drifting') values.set([p[EXTRA_1]! / DEGREE, p[EXTRA_2]! / DEGREE], EXTRA_1);
  if (model === 'elliptical') {
    const e = Math.hypot(p[EXTRA_1]!, p[EXTRA_2]!);
    const angle = (0.5 * Math.atan2(p[EXTRA_2]!, p[EXTRA_1]!)) / DEGREE;
    values[THETA] = Math.asin(Math.min(Math.sin(p[THETA]!) / Math.sqrt(1 - e), 1)) / DEGREE;
    values[EXTRA_1] = Math.sqrt((1 - e) / (1 + e));
    values[EXTRA_2] = angle < 0 ? angle + 180 : angle;
  }
  return values;
}

/**
 * Derivatives of the natural parameters with respect to the internal ones, row-major, at a recentred state. The
 * longitude's is in degrees of the coordinate: a sky angle over cos b, infinite at a pole.
 */
export function naturalJacobian(model: ModelName, { frame, p }: ShellState): Float64Array {
  const size = p.length;
  const G = new Float64Array(size * size);
  const set = (row: number, column: number, value: number) => (G[row * size + column] = value);
  const cosB = Math.hypot(frame.origin[0], frame.origin[1]);
  set(X, X, 1 / DEGREE / cosB);
  set(Y, Y, 1 / DEGREE);
  set(THETA, THETA, 1 / DEGREE);
  set(V0, V0, 1);
  set(LN_W, LN_W, Math.exp(p[LN_W]!));
  if (model === 'drifting') {
    set(EXTRA_1, EXTRA_1, 1 / DEGREE);
    set(EXTRA_2, EXTRA_2, 1 / DEGREE);
  }
  if (model === 'elliptical') {
    const [e1, e2] = [p[EXTRA_1]!, p[EXTRA_2]!];
    const e = Math.max(Math.hypot(e1, e2), 1e-12);
    const sine = Math.sin(p[THETA]!) / Math.sqrt(1 - e);
    const perCosine = 1 / Math.sqrt(Math.max(1 - sine * sine, 1e-12)) / DEGREE;
    set(THETA, THETA, (perCosine * Math.cos(p[THETA]!)) / Math.sqrt(1 - e));
    const byFlattening = (perCosine * sine * 0.5) / (1 - e);
    const ratioSlope = -1 / (1 + e) ** 2 / Math.sqrt((1 - e) / (1 + e));
    [e1, e2].forEach((component, i) => {
      set(THETA, EXTRA_1 + i, (byFlattening * component) / e);
      set(EXTRA_1, EXTRA_1 + i, (ratioSlope * component) / e);
    });
    set(EXTRA_2, EXTRA_1, (-e2 / e ** 2) * (0.5 / DEGREE));
    set(EXTRA_2, EXTRA_2, (e1 / e ** 2) * (0.5 / DEGREE));
  }
  return G;
}

/** G C G' for row-major square matrices. */
export function transformed(size: number, G: Float64Array, C: Float64Array): Float64Array {
  const multiply = (A: Float64Array, B: Float64Array, transposed: boolean) => {
    const out = new Float64Array(size * size);
    for (let i = 0; i < size; i++)
      for (let j = 0; j < size; j++) {
        let sum = 0;
        for (let k = 0; k < size; k++) {
          const left = A[i * size + k]!;
          if (left !== 0) sum += left * B[transposed ? j * size + k : k * size + j]!;
        }
        out[i * size + j] = sum;
      }
    return out;
  };
  return multiply(multiply(G, C, false), G, true);
}
