import { Matrix, SingularValueDecomposition } from 'ml-matrix';
import { blockProducts, type ChannelDirections } from '@/shared/shell/channelDirections';
import type { MarkSet } from '@/shared/shell/markSet';
import { transformed } from '@/shared/shell/naturalParameters';
import { median } from '@/shared/shell/robust';

/**
 * Scales of the four sources of scatter. `mark` and `spread` multiply the stated sigma^2 and the variance within the
 * channel; `ring` and `shift` are variances in rad^2 of the radius and the centre that a channel's marks (or a block's) share, and
 * may come out negative, as any estimate of a small variance may.
 */
export interface Scales {
  mark: number;
  spread: number;
  ring: number;
  shift: number;
}

/** Below this mean share of the spread (or above 1 less it) it cannot be told from the marks' own error: one scale. */
const TIE = 0.1;
/** Fewer spare rings than this: the ring scatter is invisible and assumed to equal one mark's error. */
const SPARE_RINGS = 0.5;
const LEAST_MARK_SCALE = 0.02;
/** Marks of one drawn circle lie on it exactly: their stated error is then the least that is believed. */
const LEAST_DRAWN_SCALE = 1;

/**
 * Estimate the scales by equating four quadratic forms of the residuals to their expectations (Henderson 1953;
 * Rao 1971). With M = 1 - X A^-1 X' the matrix that makes residuals of errors, the form with matrix P_j expects
 * sum_i c_i tr(P_j M G_i M): a 4 x 4 linear system.
 *
 * @param inverse A^-1, within what held parameters leave free
 * @param fromPriors what one standard error of each prior adds to z
 */
export function estimateScales(
  marks: MarkSet,
  d: ChannelDirections,
  inverse: Float64Array,
  size: number,
  fromPriors: readonly Float64Array[],
): Scales {
  const { E, total } = expectations(marks, d, inverse, size);
  const Q = [0, 0, 0, 0];
  let totalQ = 0;
  let ownShare = 0;
  let spreadShare = 0;
  for (let i = 0; i < marks.count; i++) {
    let square = d.z[i]! ** 2;
    for (const prior of fromPriors) square -= prior[i]! ** 2;
    Q[0]! += d.own[i]! * square;
    Q[1]! += d.spread[i]! * square;
    totalQ += square;
    ownShare += d.own[i]!;
    spreadShare += d.spread[i]!;
  }
  const excess = (q: Float64Array) => {
    const squares = (v: Float64Array) =>
      blockProducts(marks, q, v).reduce((sum, value) => sum + value * value, 0);
    return fromPriors.reduce((sum, prior) => sum - squares(prior), squares(d.z));
  };
  Q[2] = excess(d.unitU);
  Q[3] = excess(d.unitA) + excess(d.unitB);

  const share = spreadShare / (ownShare + spreadShare);
  const tied = share < TIE || share > 1 - TIE;
  const blind = E[2]![0]! + E[2]![1]! < SPARE_RINGS;
  if (tied) {
    E[0] = total;
    Q[0] = totalQ;
    E[1] = [1, -1, 0, 0];
    Q[1] = 0;
  }
  if (blind) {
    E[2] = [-median(marks.sigma2), 0, 1, 0];
    Q[2] = 0;
  }
  const [mark, spread, ring, shift] = solveScaled(E, Q) as [number, number, number, number];
  const least = marks.drawn > 0 ? LEAST_DRAWN_SCALE : LEAST_MARK_SCALE;
  return { mark: Math.max(mark, least), spread: Math.max(spread, 0), ring, shift };
}

/**
 * The matrix of expectations tr(P_j M G_i M), and the row for the plain sum of squares. M = 1 - B X' with B = X A^-1
 * is the unit matrix less one of low rank, so every sum over its elements, squared or along a direction, falls into
 * sums over the marks of small matrices: the cost grows with the number of marks, not with its square.
 */
function expectations(
  marks: MarkSet,
  d: ChannelDirections,
  inverse: Float64Array,
  size: number,
): { E: number[][]; total: number[] } {
  const { count: n, blocks: K, block } = marks;
  const X = d.scaled;
  const B = new Float64Array(n * size);
  for (let i = 0; i < n; i++)
    for (let a = 0; a < size; a++)
      for (let b = 0; b < size; b++)
        B[i * size + a] = B[i * size + a]! + X[i * size + b]! * inverse[b * size + a]!;
  const leverage = new Float64Array(n);
  for (let i = 0; i < n; i++)
    for (let a = 0; a < size; a++) leverage[i] = leverage[i]! + B[i * size + a]! * X[i * size + a]!;

  const diagonals = [d.own, d.spread, new Float64Array(n).fill(1)].map((weight) => ({
    weight,
    B: outerSum(size, B, weight),
    X: outerSum(size, X, weight),
  }));
  type Diagonal = (typeof diagonals)[number];
  const [own, spread, ones] = diagonals as [Diagonal, Diagonal, Diagonal];
  /** Directions of all channels with their projections X'u_k, one row a channel. */
  const along = (u: Float64Array) => {
    const rows = new Float64Array(K * size);
    for (let i = 0; i < n; i++)
      for (let a = 0; a < size; a++) {
        const at = block[i]! * size + a;
        rows[at] = rows[at]! + X[i * size + a]! * u[i]!;
      }
    return { u, rows, sum: outerSum(size, rows) };
  };
  type Direction = ReturnType<typeof along>;
  const rings = [along(d.u)];
  const shifts = [along(d.a), along(d.b)];
  const unitRings = [along(d.unitU)];
  const unitShifts = [along(d.unitA), along(d.unitB)];

  /** Sum over i, j of p_i M_ij^2 q_j. */
  const both = (p: Diagonal, q: Diagonal) => {
    let sum = inner(p.B, q.X);
    for (let i = 0; i < n; i++) sum += p.weight[i]! * q.weight[i]! * (1 - 2 * leverage[i]!);
    return sum;
  };
  /** Sum over marks i and channels k of p_i (M u_k)_i^2. */
  const one = (p: Diagonal, directions: Direction[]) =>
    directions.reduce((total, { u, rows, sum }) => {
      total += inner(p.B, sum);
      for (let i = 0; i < n; i++) {
        let projected = 0;
        for (let a = 0; a < size; a++) projected += B[i * size + a]! * rows[block[i]! * size + a]!;
        total += p.weight[i]! * u[i]! * (u[i]! - 2 * projected);
      }
      return total;
    }, 0);
  /** Sum over channels k, l of (q_k' M u_l)^2. */
  const none = (units: Direction[], directions: Direction[]) => {
    let total = 0;
    for (const q of units)
      for (const v of directions) {
        total += inner(transformed(size, inverse, q.sum), v.sum);
        const product = blockProducts(marks, q.u, v.u);
        for (let k = 0; k < K; k++)
          total += product[k]! * (product[k]! - 2 * bilinear(size, inverse, q.rows, v.rows, k * size));
      }
    return total;
  };
  const row = (p: Diagonal) => [both(p, own), both(p, spread), one(p, rings), one(p, shifts)];
  const shared = (units: Direction[]) => [
    one(own, units),
    one(spread, units),
    none(units, rings),
    none(units, shifts),
  ];
  return { E: [row(own), row(spread), shared(unitRings), shared(unitShifts)], total: row(ones) };
}

/** Sum of w r r' over the rows r of a table. */
function outerSum(size: number, rows: Float64Array, weight?: Float64Array): Float64Array {
  const out = new Float64Array(size * size);
  for (let i = 0; i * size < rows.length; i++)
    for (let a = 0; a < size; a++) {
      const left = (weight ? weight[i]! : 1) * rows[i * size + a]!;
      for (let b = 0; b < size; b++) out[a * size + b] = out[a * size + b]! + left * rows[i * size + b]!;
    }
  return out;
}

/** Sum of the products of two matrices' elements. */
const inner = (P: Float64Array, Q: Float64Array) => P.reduce((sum, value, at) => sum + value * Q[at]!, 0);

/** p' C q for the rows of two tables that start at `from`. */
function bilinear(size: number, C: Float64Array, p: Float64Array, q: Float64Array, from: number): number {
  let sum = 0;
  for (let a = 0; a < size; a++)
    for (let b = 0; b < size; b++) sum += p[from + a]! * C[a * size + b]! * q[from + b]!;
  return sum;
}

/** Least-norm solution, columns scaled first; singular values under 1e-10 of the largest are dropped. */
function solveScaled(E: number[][], Q: number[]): number[] {
  const scale = Q.map((_, j) => Math.max(...E.map((row) => Math.abs(row[j]!))) + 1e-300);
  const scaled = new Matrix(E.map((row) => row.map((value, j) => value / scale[j]!)));
  const svd = new SingularValueDecomposition(scaled, { autoTranspose: true });
  const [U, V, s] = [svd.leftSingularVectors, svd.rightSingularVectors, svd.diagonal];
  const largest = Math.max(...s);
  return Q.map((_, row) => {
    let value = 0;
    for (let c = 0; c < s.length; c++) {
      if (s[c]! <= 1e-10 * largest) continue;
      let projected = 0;
      for (let j = 0; j < Q.length; j++) projected += U.get(j, c) * Q[j]!;
      value += (V.get(row, c) * projected) / s[c]!;
    }
    return value / scale[row]!;
  });
}
