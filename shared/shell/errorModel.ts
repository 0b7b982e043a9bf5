import { EigenvalueDecomposition, Matrix } from 'ml-matrix';
import { channelDirections, type ChannelDirections } from '@/shared/shell/channelDirections';
import { evaluation, type Evaluation } from '@/shared/shell/frame';
import { evaluate } from '@/shared/shell/residuals';
import type { ShellProblem, ShellState } from '@/shared/shell/gaussNewton';
import { expandedMatrix, reducedMatrix, reduction } from '@/shared/shell/constrainedStep';
import { isFixed, isInformed, type Known } from '@/shared/shell/known';
import { naturalJacobian, naturalValues } from '@/shared/shell/naturalParameters';
import { accumulate, factorise, invert } from '@/shared/shell/normalEquations';
import { LN_W, THETA, V0, X, Y } from '@/shared/shell/shellModel';
import { addPriors, axisOf, fixedConditions, gradient } from '@/shared/shell/stepWithin';
import { addUnseen } from '@/shared/shell/trace/tracedErrors';
import { estimateScales, type Scales } from '@/shared/shell/varianceComponents';

/** Covariance of the internal parameters (row-major) with what it was made of. */
export interface ErrorModel {
  evaluation: Evaluation;
  /** (J'WJ)^-1 with the stated errors taken at their word. */
  plain: Float64Array;
  /** With the four sources of scatter. */
  covariance: Float64Array;
  /** Degrees of freedom of Student's t for each parameter's interval. */
  tDof: Float64Array;
  scales: Scales;
  directions: ChannelDirections;
}

/** No variance, in any direction of parameter space, falls below this share of what unshared errors alone give. */
export const FLOOR = 0.5;
const MANY = 10000;

/**
 * Error model of a recentred solution. A mark's residual has four sources: its own positional error, the spread of
 * radii within its channel, a radius offset shared by the channel, and a shift of the ring's centre shared by the
 * channel. Their scales come from the residuals; propagated through the linearised fit they give the covariance,
 * raised where needed to half of what the unshared sources give (generalised eigenvalues), and degrees of freedom by
 * Satterthwaite (1946). The stated sigma sets relative weights only.
 *
 * @returns null when the normal matrix is singular: the marks do not determine the parameters
 */
export function errorModel(problem: ShellProblem, { frame, p }: ShellState): ErrorModel | null {
  const { model, marks, known } = problem;
  const size = p.length;
  const at = evaluation(marks, size);
  evaluate(model, marks, frame, p, at);
  const A = new Float64Array(size * size);
  const g = new Float64Array(size);
  accumulate(
    size,
    at.residual,
    at.jacobian,
    at.variance.map((v) => 1 / v),
    A,
    g,
  );
  const state = { frame, p };
  const natural = { values: naturalValues(model, state), G: naturalJacobian(model, state, axisOf(known)) };
  addPriors(known, natural, A, g);
  const scale = g.map((_, a) => 1 / Math.sqrt(A[a * size + a]! + 1e-300));
  const left = reduction(size, fixedConditions(known, natural), scale);
  const inverse = invert(left.free.length, reducedMatrix(size, left, A));
  if (inverse === null) return null;
  const plain = expandedMatrix(size, left, inverse);

  const directions = channelDirections(marks, at, size);
  // How an error of each prior's mean moves the parameters, and through them z.
  const ofPriors = known
    .filter((k) => k.prior !== null)
    .map((k) => product(size, plain, gradient(natural, k.index)).map((v) => v / k.prior!.sd));
  const fromPriors = ofPriors.map((column) => product(size, directions.scaled, column));
  const scales = estimateScales(marks, directions, plain, size, fromPriors);
  const parts = propagate(problem, directions, plain, size, scales, ofPriors);
  const raised = floored(size, left.free, parts.base, parts.shared);
  if (raised === null) return null;
  const covariance = expandedMatrix(size, left, raised);

  const dof = channelDof(marks.blocks, known);
  const tDof = new Float64Array(size).fill(MANY);
  const free = Array.from({ length: size }, (_, a) => a).filter((a) => !isFixed(known, a));
  for (const a of free) {
    const rest = Math.max(parts.base[a * size + a]! - parts.ownRing[a]! - parts.ownShift[a]!, 0);
    const ring = atLeastOwn(parts.ownRing[a]!, parts.ring[a]!);
    const shift = atLeastOwn(parts.ownShift[a]!, parts.shift[a]!);
    const spareMarks = Math.max(marks.count - marks.blocks, 1);
    const variance = ring ** 2 / dof.ring + shift ** 2 / dof.shift + rest ** 2 / spareMarks;
    const nu = (rest + ring + shift) ** 2 / Math.max(variance, 1e-300);
    tDof[a] = Math.min(Math.max(nu, 1), MANY);
  }
  addUnseen(marks, covariance, tDof, free);
  return { evaluation: at, plain, covariance, tDof, scales, directions };
}

/**
 * Degrees of freedom of the ring-radius and ring-centre scatter among K channels. One more than the plain count for
 * the radius, since the floor removes the lower tail of the estimate; knowing v_sys frees another, and so does each
 * parameter of the rings that is held. Three channels leave no spare ring: the scatter is then assumed, not estimated,
 * and carries no t factor.
 */
export function channelDof(channels: number, known: readonly Known[]): { ring: number; shift: number } {
  const held = [THETA, LN_W].filter((a) => isFixed(known, a)).length + (isInformed(known, V0) ? 1 : 0);
  const spare = Math.min(channels - 2 + held, channels);
  const centre = [X, Y].filter((a) => isFixed(known, a)).length;
  return { ring: spare > 1 ? spare : MANY, shift: Math.max(2 * channels - 2 + centre, 1) };
}

/** Noise variance of each scaled residual from the two unshared sources. */
export function unsharedNoise(d: ChannelDirections, scales: Scales): Float64Array {
  return d.own.map((own, i) => scales.mark * own + scales.spread * d.spread[i]!);
}

interface Propagated {
  base: Float64Array;
  shared: Float64Array;
  /** Diagonals: unshared noise along the channels' directions, and what the shared sources add. */
  ownRing: Float64Array;
  ownShift: Float64Array;
  ring: Float64Array;
  shift: Float64Array;
}

/** Variances of the parameters: a residual moves them by -H z with H = A^-1 X'. */
function propagate(
  { marks }: ShellProblem,
  d: ChannelDirections,
  inverse: Float64Array,
  size: number,
  scales: Scales,
  ofPriors: readonly Float64Array[],
): Propagated {
  const K = marks.blocks;
  const noise = unsharedNoise(d, scales).map((v) => v + 1e-9);
  const square = () => new Float64Array(size * size);
  const out: Propagated = {
    base: square(),
    shared: square(),
    ownRing: new Float64Array(size),
    ownShift: new Float64Array(size),
    ring: new Float64Array(size),
    shift: new Float64Array(size),
  };
  const table = () => new Float64Array(size * K);
  const [hU, hA, hB, hUnitU, hUnitA, hUnitB] = [table(), table(), table(), table(), table(), table()];
  const h = new Float64Array(size);
  for (let i = 0; i < marks.count; i++) {
    h.fill(0);
    for (let a = 0; a < size; a++)
      for (let b = 0; b < size; b++) h[a] = h[a]! + inverse[a * size + b]! * d.scaled[i * size + b]!;
    const root = Math.sqrt(noise[i]!);
    for (let a = 0; a < size; a++) {
      for (let b = 0; b < size; b++)
        out.base[a * size + b] = out.base[a * size + b]! + h[a]! * noise[i]! * h[b]!;
      const at = a * K + marks.block[i]!;
      hU[at] = hU[at]! + h[a]! * d.u[i]!;
      hA[at] = hA[at]! + h[a]! * d.a[i]!;
      hB[at] = hB[at]! + h[a]! * d.b[i]!;
      hUnitU[at] = hUnitU[at]! + h[a]! * d.unitU[i]! * root;
      hUnitA[at] = hUnitA[at]! + h[a]! * d.unitA[i]! * root;
      hUnitB[at] = hUnitB[at]! + h[a]! * d.unitB[i]! * root;
    }
  }
  for (let a = 0; a < size; a++) {
    for (let b = 0; b < size; b++) {
      let [ring, shift] = [0, 0];
      for (let k = 0; k < K; k++) {
        ring += hU[a * K + k]! * hU[b * K + k]!;
        shift += hA[a * K + k]! * hA[b * K + k]! + hB[a * K + k]! * hB[b * K + k]!;
      }
      out.shared[a * size + b] = scales.ring * ring + scales.shift * shift;
      if (a === b) [out.ring[a], out.shift[a]] = [scales.ring * ring, scales.shift * shift];
      for (const column of ofPriors)
        out.base[a * size + b] = out.base[a * size + b]! + column[a]! * column[b]!;
    }
    for (let at = a * K; at < (a + 1) * K; at++) {
      out.ownRing[a] = out.ownRing[a]! + hUnitU[at]! ** 2;
      out.ownShift[a] = out.ownShift[a]! + hUnitA[at]! ** 2 + hUnitB[at]! ** 2;
    }
  }
  return out;
}

/** Matrix times vector; the matrix has as many columns as the vector is long. */
function product(size: number, M: Float64Array, v: Float64Array): Float64Array {
  const out = new Float64Array(M.length / size);
  for (let i = 0; i < out.length; i++)
    for (let a = 0; a < size; a++) out[i] = out[i]! + M[i * size + a]! * v[a]!;
  return out;
}

/** A shared source's share of a variance, never below the marks' own noise along the same directions. */
const atLeastOwn = (own: number, added: number): number => Math.max(own + added, FLOOR * own, own);

/**
 * base + shared of the free parameters, raised to FLOOR base in every direction, so that it stays positive definite;
 * null if base is not.
 */
function floored(
  size: number,
  free: number[],
  base: Float64Array,
  shared: Float64Array,
): Float64Array | null {
  const n = free.length;
  // Parameters carry different units: bring base to a unit diagonal before factorising it.
  const scale = free.map((a) => Math.sqrt(base[a * size + a]!));
  const pick = (m: Float64Array) =>
    Float64Array.from({ length: n * n }, (_, at) => {
      const [i, j] = [Math.floor(at / n), at % n];
      return m[free[i]! * size + free[j]!]! / scale[i]! / scale[j]!;
    });
  const L = pick(base);
  if (!L.every(Number.isFinite) || !factorise(n, L)) return null;
  // base = L L', shared = L S L': S has the same eigenvectors whatever is added to it times the unit matrix.
  const half = forward(n, L, pick(shared));
  const S = forward(n, L, transpose(n, half));
  const symmetric = new Matrix(n, n);
  for (let i = 0; i < n; i++)
    for (let j = 0; j < n; j++) symmetric.set(i, j, 0.5 * (S[i * n + j]! + S[j * n + i]!));
  const { realEigenvalues, eigenvectorMatrix } = new EigenvalueDecomposition(symmetric, {
    assumeSymmetric: true,
  });
  const out = new Float64Array(n * n);
  for (let c = 0; c < n; c++) {
    const direction = free.map((_, i) => {
      let sum = 0;
      for (let b = 0; b <= i; b++) sum += L[i * n + b]! * eigenvectorMatrix.get(b, c);
      return sum * scale[i]!;
    });
    const value = Math.max(1 + realEigenvalues[c]!, FLOOR);
    for (let i = 0; i < n; i++)
      for (let j = 0; j < n; j++) {
        const at = i * n + j;
        out[at] = out[at]! + value * direction[i]! * direction[j]!;
      }
  }
  return out;
}

/** L^-1 R by forward substitution. */
function forward(n: number, L: Float64Array, R: Float64Array): Float64Array {
  const out = Float64Array.from(R);
  for (let c = 0; c < n; c++)
    for (let a = 0; a < n; a++) {
      let sum = out[a * n + c]!;
      for (let b = 0; b < a; b++) sum -= L[a * n + b]! * out[b * n + c]!;
      out[a * n + c] = sum / L[a * n + a]!;
    }
  return out;
}

const transpose = (n: number, m: Float64Array) => m.map((_, at) => m[(at % n) * n + Math.floor(at / n)]!);
