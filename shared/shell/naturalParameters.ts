import { DEGREE, lonLatOf, unitVector, type Vector } from '@/shared/sky/greatCircle';
import { centreAt, type Frame } from '@/shared/shell/frame';
import type { ShellState } from '@/shared/shell/gaussNewton';
import { EXTRA_1, EXTRA_2, LN_W, THETA, V0, X, Y, type ModelName } from '@/shared/shell/shellModel';

/**
 * The parameters as a person reads them, in the order of PARAMETER_NAMES: degrees, km/s. The elliptical theta is the
 * larger semi-axis; the position angle, of that axis, is between 0 and 180.
 */
export function naturalValues(model: ModelName, { frame, p }: ShellState): Float64Array {
  const { lon, lat } = lonLatOf(p[X] === 0 && p[Y] === 0 ? frame.origin : centreAt(frame, p[X]!, p[Y]!));
  const values = Float64Array.from(p);
  values[X] = lon;
  values[Y] = lat;
  values[THETA] = p[THETA]! / DEGREE;
  values[LN_W] = Math.exp(p[LN_W]!);
  if (model === 'drifting') {
    values[EXTRA_1] = p[EXTRA_1]! / DEGREE;
    values[EXTRA_2] = p[EXTRA_2]! / DEGREE;
  }
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
 * The internal parameters that stand for natural ones, the centre's offsets on the frame's plane. The centre must lie
 * within 90 degrees of the frame's origin. `before` lends the values that nothing changed, to the last bit.
 */
export function internalValues(
  model: ModelName,
  frame: Frame,
  values: Float64Array,
  before: Float64Array,
): Float64Array {
  const old = naturalValues(model, { frame, p: before });
  const changed = (...indices: number[]) => indices.some((a) => old[a] !== values[a]);
  const p = Float64Array.from(before);
  if (changed(X, Y)) {
    const c = unitVector({ lon: values[X]!, lat: values[Y]! });
    const along = dot(c, frame.origin);
    p[X] = dot(c, frame.east) / along;
    p[Y] = dot(c, frame.north) / along;
  }
  p[V0] = values[V0]!;
  if (changed(LN_W)) p[LN_W] = Math.log(values[LN_W]!);
  if (model !== 'elliptical') {
    if (changed(THETA)) p[THETA] = values[THETA]! * DEGREE;
    for (const a of model === 'drifting' ? [EXTRA_1, EXTRA_2] : [])
      if (changed(a)) p[a] = values[a]! * DEGREE;
  } else if (changed(THETA, EXTRA_1, EXTRA_2)) {
    const square = values[EXTRA_1]! ** 2;
    const e = (1 - square) / (1 + square);
    const twice = 2 * values[EXTRA_2]! * DEGREE;
    p[THETA] = Math.asin(Math.min(Math.sin(values[THETA]! * DEGREE) * Math.sqrt(1 - e), 1));
    p[EXTRA_1] = e * Math.cos(twice);
    p[EXTRA_2] = e * Math.sin(twice);
  }
  return p;
}

const dot = (a: Vector, b: Vector): number => a[0] * b[0] + a[1] * b[1] + a[2] * b[2];

/**
 * Derivatives of the natural parameters with respect to the internal ones, row-major. The longitude's is in degrees of
 * the coordinate: a sky angle over cos b, infinite at a pole.
 *
 * @param axis direction in degrees in which an ellipse is taken to lie where it is round and has none of its own
 */
export function naturalJacobian(model: ModelName, { frame, p }: ShellState, axis?: number): Float64Array {
  const size = p.length;
  const G = new Float64Array(size * size);
  const set = (row: number, column: number, value: number) => (G[row * size + column] = value);
  const [x, y] = [p[X]!, p[Y]!];
  const { origin, east, north } = frame;
  if (x === 0 && y === 0) {
    set(X, X, 1 / DEGREE / Math.hypot(origin[0], origin[1]));
    set(Y, Y, 1 / DEGREE);
  } else {
    const c = [0, 1, 2].map((a) => origin[a]! + x * east[a]! + y * north[a]!) as [number, number, number];
    const square = Math.max(c[0] * c[0] + c[1] * c[1], 1e-24);
    const root = Math.sqrt(square);
    for (const [column, d] of [
      [X, east],
      [Y, north],
    ] as const) {
      set(X, column, (c[0] * d[1] - c[1] * d[0]) / square / DEGREE);
      const outward = (c[0] * d[0] + c[1] * d[1]) / root;
      set(Y, column, (root * d[2] - c[2] * outward) / (square + c[2] * c[2]) / DEGREE);
    }
  }
  set(THETA, THETA, 1 / DEGREE);
  set(V0, V0, 1);
  set(LN_W, LN_W, Math.exp(p[LN_W]!));
  if (model === 'drifting') {
    set(EXTRA_1, EXTRA_1, 1 / DEGREE);
    set(EXTRA_2, EXTRA_2, 1 / DEGREE);
  }
  if (model === 'elliptical') {
    const [e1, e2] = [p[EXTRA_1]!, p[EXTRA_2]!];
    const round = axis !== undefined && Math.hypot(e1, e2) < 1e-9;
    const e = Math.max(Math.hypot(e1, e2), 1e-12);
    const unit = round ? [Math.cos(2 * axis * DEGREE), Math.sin(2 * axis * DEGREE)] : [e1 / e, e2 / e];
    const sine = Math.sin(p[THETA]!) / Math.sqrt(1 - e);
    const perCosine = 1 / Math.sqrt(Math.max(1 - sine * sine, 1e-12)) / DEGREE;
    set(THETA, THETA, (perCosine * Math.cos(p[THETA]!)) / Math.sqrt(1 - e));
    const byFlattening = (perCosine * sine * 0.5) / (1 - e);
    const ratioSlope = -1 / (1 + e) ** 2 / Math.sqrt((1 - e) / (1 + e));
    unit.forEach((component, i) => {
      set(THETA, EXTRA_1 + i, byFlattening * component);
      set(EXTRA_1, EXTRA_1 + i, ratioSlope * component);
    });
    const perE = round ? 1 : 1 / e; // a round ring has no direction to turn: any finite rate holds it still
    set(EXTRA_2, EXTRA_1, -unit[1]! * perE * (0.5 / DEGREE));
    set(EXTRA_2, EXTRA_2, unit[0]! * perE * (0.5 / DEGREE));
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
