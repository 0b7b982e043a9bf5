import { Matrix, SingularValueDecomposition } from 'ml-matrix';
import { DEGREE, eastNorth, lonLatOf, unitVector, type Vector } from '@/shared/sky/greatCircle';
import { normalised } from '@/shared/shell/markSet';
import { factorise, invert, substitute } from '@/shared/shell/normalEquations';

export interface RingMark {
  l: number;
  b: number;
  /** Positional error, deg. All marks carry one or none does; otherwise it is ignored. */
  sigma?: number;
}

/** A circle on the sky through the marks of one channel. Degrees. */
export interface Ring {
  marks: number;
  l: number;
  b: number;
  /** Angular radius. */
  theta: number;
  /**
   * Standard error of theta, and of the centre along and across the parallel. From the marks' sigma where they carry
   * one, else from their scatter about the circle; null for three marks without sigma, which leave no scatter.
   */
  se: number | null;
  seEast: number | null;
  seNorth: number | null;
  /** Root mean square distance of the marks from the circle. */
  rms: number;
}

export type RingResult = { ring: Ring } | { ring: null; reason: 'too-few' | 'same-point' | 'straight-line' };

/** A circle this wide is a straight line as far as rim marks go: shells do not surround the observer's horizon. */
const WIDEST_RING = 80 * DEGREE;
/** Marks closer together than this, rad (0.2 milliarcseconds), are one point. */
const ONE_POINT = 1e-9;
const ROUNDS = 60;

/**
 * The circle through at least three marks of one channel: the plane n.m = cos theta through their unit vectors, then
 * the circle at the least sum of squared angular distances, by Gauss-Newton in three parameters.
 *
 * Accuracy: centre and radius to 1e-7 of the radius against 40-digit solutions, for radii of 0.05 to 30 deg.
 */
export function fitRing(marks: readonly RingMark[]): RingResult {
  if (marks.length < 3) return { ring: null, reason: 'too-few' };
  const q = marks.map(({ l, b }) => unitVector({ lon: l, lat: b }));
  const stated = marks.every((m) => m.sigma !== undefined && m.sigma > 0);
  const weight = marks.map((m) => (stated ? 1 / (m.sigma! * DEGREE) ** 2 : 1));
  const plane = planeThrough(q, weight);
  if (plane === null) return { ring: null, reason: 'same-point' };
  const circle = refine(q, weight, plane);
  if (circle === null || circle.theta > WIDEST_RING) return { ring: null, reason: 'straight-line' };

  const { lon, lat } = lonLatOf(circle.centre);
  const dof = marks.length - 3;
  const scale = stated ? 1 : dof > 0 ? Math.sqrt(circle.sum / dof) : null;
  const error = (a: number) =>
    scale === null || circle.inverse === null ? null : (scale * Math.sqrt(circle.inverse[a * 4]!)) / DEGREE;
  return {
    ring: {
      marks: marks.length,
      l: lon,
      b: lat,
      theta: circle.theta / DEGREE,
      se: error(2),
      seEast: error(0),
      seNorth: error(1),
      rms: Math.sqrt(circle.squares / marks.length) / DEGREE,
    },
  };
}

/** The algebraic circle alone: the plane n.m = cos theta nearest to the marks, all alike; null where they coincide. */
export function algebraicRing(marks: readonly RingMark[]): { l: number; b: number; theta: number } | null {
  if (marks.length < 3) return null;
  const q = marks.map(({ l, b }) => unitVector({ lon: l, lat: b }));
  const plane = planeThrough(
    q,
    marks.map(() => 1),
  );
  if (plane === null) return null;
  const { lon, lat } = lonLatOf(plane.centre);
  return { l: lon, b: lat, theta: plane.planeTheta / DEGREE };
}

/**
 * Plain model radius in degrees at one velocity, sin theta = sin Theta sqrt(1 - u^2), for a curve without channels;
 * null beyond the caps. `modelRadius` in channelCurve.ts averages over a channel, as the fit does.
 */
export function ringRadius(
  velocity: number,
  shell: { theta: number; vSys: number; vExp: number },
): number | null {
  const u = (velocity - shell.vSys) / shell.vExp;
  if (!(Math.abs(u) <= 1)) return null;
  return Math.asin(Math.sin(shell.theta * DEGREE) * Math.sqrt(1 - u * u)) / DEGREE;
}

interface Circle {
  centre: Vector;
  theta: number;
}

/** Least-squares plane through the marks: the normal is the direction in which they vary least about their mean. */
function planeThrough(q: Vector[], weight: number[]): (Circle & { planeTheta: number }) | null {
  const total = weight.reduce((sum, w) => sum + w, 0);
  const mean = [0, 1, 2].map((a) => q.reduce((sum, v, i) => sum + weight[i]! * v[a]!, 0) / total);
  const off = q.map((v) => v.map((x, a) => x - mean[a]!));
  if (Math.max(...off.map((d) => Math.hypot(...d))) < ONE_POINT) return null;
  // Of the rows themselves, not of their 3 x 3 products, which would lose half the digits.
  const rows = off.map((d, i) => d.map((x) => x * Math.sqrt(weight[i]!)));
  const { rightSingularVectors: V, diagonal } = new SingularValueDecomposition(new Matrix(rows));
  const least = diagonal.indexOf(Math.min(...diagonal));
  const [x, y, z] = [0, 1, 2].map((a) => V.get(a, least)) as [number, number, number];
  const side = x * mean[0]! + y * mean[1]! + z * mean[2]! < 0 ? -1 : 1;
  const centre = normalised(side * x, side * y, side * z);
  const cosine = centre[0] * mean[0]! + centre[1] * mean[1]! + centre[2] * mean[2]!;
  return { centre, theta: meanAngle(q, weight, centre), planeTheta: Math.acos(Math.min(cosine, 1)) };
}

/** Mean angle of the marks from a centre: the best radius for it. */
function meanAngle(q: Vector[], weight: number[], centre: Vector): number {
  let [sum, total] = [0, 0];
  q.forEach((v, i) => {
    sum += weight[i]! * angle(v, centre).theta;
    total += weight[i]!;
  });
  return sum / total;
}

function angle(v: Vector, n: Vector): { theta: number; sine: number } {
  const sine = Math.hypot(v[1] * n[2] - v[2] * n[1], v[2] * n[0] - v[0] * n[2], v[0] * n[1] - v[1] * n[0]);
  return { theta: Math.atan2(sine, v[0] * n[0] + v[1] * n[1] + v[2] * n[2]), sine };
}

interface Refined extends Circle {
  /** Weighted and plain sums of squared distances, and the inverse normal matrix; null where it is singular. */
  sum: number;
  squares: number;
  inverse: Float64Array | null;
}

function refine(q: Vector[], weight: number[], start: Circle): Refined | null {
  let { centre, theta } = start;
  let now = normal(q, weight, centre, theta);
  let damping = 0;
  for (let round = 0; round < ROUNDS; round++) {
    const { A, g, east, north } = now;
    const step = g.map((x) => -x);
    const L = Float64Array.from(A);
    for (let a = 0; a < 3; a++) L[a * 4] = L[a * 4]! * (1 + damping);
    if (!factorise(3, L)) return null;
    substitute(3, L, step);
    const [dx, dy, dTheta] = step as unknown as [number, number, number];
    if (Math.hypot(dx, dy) > 1) return null;
    const next = normalised(
      centre[0] + dx * east[0] + dy * north[0],
      centre[1] + dx * east[1] + dy * north[1],
      centre[2] + dx * east[2] + dy * north[2],
    );
    const trial = normal(q, weight, next, theta + dTheta);
    if (trial.sum > now.sum * (1 + 1e-12) && Math.hypot(dx, dy) > 1e-14) {
      damping = Math.max(10 * damping, 1e-3);
      continue;
    }
    damping = damping > 1e-6 ? damping / 10 : 0;
    [centre, theta, now] = [next, theta + dTheta, trial];
    if (Math.hypot(dx, dy, dTheta) < 1e-12 * theta) break;
  }
  return { centre, theta, sum: now.sum, squares: now.squares, inverse: invert(3, now.A) };
}

/** Normal equations of the distances theta_i - theta at one circle; unknowns: centre east, centre north, radius. */
function normal(q: Vector[], weight: number[], centre: Vector, theta: number) {
  const { east, north } = eastNorth(centre);
  const A = new Float64Array(9);
  const g = new Float64Array(3);
  let [sum, squares] = [0, 0];
  q.forEach((v, i) => {
    const at = angle(v, centre);
    const perSine = 1 / Math.max(at.sine, 1e-12);
    const J = [
      -(v[0] * east[0] + v[1] * east[1] + v[2] * east[2]) * perSine,
      -(v[0] * north[0] + v[1] * north[1] + v[2] * north[2]) * perSine,
      -1,
    ];
    const d = at.theta - theta;
    sum += weight[i]! * d * d;
    squares += d * d;
    for (let a = 0; a < 3; a++) {
      g[a] = g[a]! + weight[i]! * J[a]! * d;
      for (let b = 0; b < 3; b++) A[a * 3 + b] = A[a * 3 + b]! + weight[i]! * J[a]! * J[b]!;
    }
  });
  return { A, g, east, north, sum, squares };
}
