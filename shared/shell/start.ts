import { DEGREE, eastNorth, type Vector } from '@/shared/sky/greatCircle';
import type { RingParameters } from '@/shared/shell/channelCurve';
import { centroid, normalised, type MarkSet } from '@/shared/shell/markSet';
import { accumulate, factorise, substitute } from '@/shared/shell/normalEquations';
import { LN_W, THETA, V0 } from '@/shared/shell/shellModel';

export interface StartValues {
  /** Direction of the centre. */
  centre: Vector;
  /** The five common parameters about that centre. */
  p: Float64Array;
  /** The rings grow instead of shrinking away from v_sys; a plausible curvature was put in. */
  wrongCurvature: boolean;
}

const UNKNOWNS = 5;
const ROUNDS = 4;

/**
 * Start values from linear least squares, without any start of their own.
 *
 * About a trial centre the marks have the coordinates X, Y (sines of the angle), and sin^2 theta falls as a parabola
 * of the velocity. So X^2 + Y^2 = 2 X dx + 2 Y dy + a + b z + c z^2, with z the velocity in units of half its range,
 * is linear in the centre's shift and in the parabola. Four rounds, from the marks' centroid. Needs five marks in
 * all, not three in each channel. Noise biases theta low on short arcs, as in every algebraic circle fit (Kasa 1976):
 * harmless for a start.
 */
export function startValues(marks: MarkSet): StartValues {
  const { low, high } = range(marks.velocity);
  const half = Math.max((high - low) / 2, 1e-9);
  const mean = meanVelocity(marks);
  const rows = new Float64Array(marks.count * UNKNOWNS);
  const target = new Float64Array(marks.count);
  let centre = centroid(marks);
  let solution = new Float64Array(UNKNOWNS);
  for (let round = 0; round < ROUNDS; round++) {
    const { east, north } = eastNorth(centre);
    for (let i = 0; i < marks.count; i++) {
      const q = marks.direction.subarray(3 * i, 3 * i + 3);
      const x = q[0]! * east[0] + q[1]! * east[1] + q[2]! * east[2];
      const y = q[0]! * north[0] + q[1]! * north[1] + q[2]! * north[2];
      const z = (marks.velocity[marks.channel[i]!]! - mean) / half;
      rows.set([2 * x, 2 * y, 1, z, z * z], i * UNKNOWNS);
      target[i] = x * x + y * y;
    }
    solution = linearLeastSquares(rows, target);
    const dx = clip(solution[0]!, -0.5, 0.5);
    const dy = clip(solution[1]!, -0.5, 0.5);
    centre = normalised(
      centre[0] + dx * east[0] + dy * north[0],
      centre[1] + dx * east[1] + dy * north[1],
      centre[2] + dx * east[2] + dy * north[2],
    );
  }
  const a = solution[2]!;
  let [b, c] = [solution[3]!, solution[4]!];
  const size = Math.max(Math.abs(a), 1e-12);
  const wrongCurvature = c >= -1e-3 * size;
  if (wrongCurvature) [b, c] = [0, -0.1 * size];
  const z0 = clip(-b / (2 * c), -3, 3);
  const sine2 = clip(a - (b * b) / (4 * c), 1e-10, 0.98);
  const p = new Float64Array(UNKNOWNS);
  p[THETA] = Math.asin(Math.sqrt(sine2));
  p[V0] = mean + half * z0;
  p[LN_W] = Math.log(half * Math.sqrt(Math.max(-sine2 / c, 0.05)));
  return { centre, p, wrongCurvature };
}

/** The same centre with radius and velocities that were given: degrees, km/s. */
export function startedFrom(start: StartValues, given: RingParameters): StartValues {
  const p = Float64Array.from(start.p);
  p.set([given.theta * DEGREE, given.vSys, Math.log(given.vExp)], THETA);
  return { ...start, p, wrongCurvature: false };
}

/** Columns are scaled to unit mean square and a trace of ridge keeps degenerate sets solvable. */
function linearLeastSquares(rows: Float64Array, target: Float64Array): Float64Array<ArrayBuffer> {
  const count = target.length;
  const scale = new Float64Array(UNKNOWNS);
  for (let i = 0; i < rows.length; i++) scale[i % UNKNOWNS] = scale[i % UNKNOWNS]! + rows[i]! ** 2 / count;
  for (let a = 0; a < UNKNOWNS; a++) scale[a] = Math.sqrt(scale[a]!) + 1e-300;
  const scaled = rows.map((value, i) => value / scale[i % UNKNOWNS]!);
  const A = new Float64Array(UNKNOWNS * UNKNOWNS);
  const solution = new Float64Array(UNKNOWNS);
  accumulate(UNKNOWNS, target, scaled, new Float64Array(count).fill(1), A, solution);
  for (let a = 0; a < UNKNOWNS; a++) A[a * UNKNOWNS + a] = A[a * UNKNOWNS + a]! + 1e-10 * count;
  factorise(UNKNOWNS, A);
  substitute(UNKNOWNS, A, solution);
  return solution.map((value, a) => value / scale[a]!);
}

function meanVelocity(marks: MarkSet): number {
  let sum = 0;
  for (let i = 0; i < marks.count; i++) sum += marks.velocity[marks.channel[i]!]!;
  return sum / marks.count;
}

const range = (values: Float64Array) => ({ low: Math.min(...values), high: Math.max(...values) });
const clip = (value: number, low: number, high: number) => Math.min(Math.max(value, low), high);
