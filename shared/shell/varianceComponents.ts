import { Matrix, SingularValueDecomposition } from 'ml-matrix';
import { channelProducts, type ChannelDirections } from '@/shared/shell/channelDirections';
import type { MarkSet } from '@/shared/shell/markSet';
import { median } from '@/shared/shell/robust';

/**
 * Scales of the four sources of scatter. `mark` and `spread` multiply the stated sigma^2 and the variance within the
 * channel; `ring` and `shift` are variances in rad^2 of the radius and the centre that a channel's marks share, and
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
const SOURCES = 4;

/**
 * Estimate the scales by equating four quadratic forms of the residuals to their expectations (Henderson 1953;
 * Rao 1971). With M = 1 - X A^-1 X' the matrix that makes residuals of errors, the form with matrix P_j expects
 * sum_i c_i tr(P_j M G_i M): a 4 x 4 linear system.
 *
 * @param inverse A^-1, the held parameter's row and column zero
 * @param fromPrior what the error of a prior on v_sys adds to z; zeros without a prior
 */
export function estimateScales(
  marks: MarkSet,
  d: ChannelDirections,
  inverse: Float64Array,
  size: number,
  fromPrior: Float64Array,
): Scales {
  const { E, total } = expectations(marks, d, inverse, size);
  const Q = [0, 0, 0, 0];
  let totalQ = 0;
  let ownShare = 0;
  let spreadShare = 0;
  for (let i = 0; i < marks.count; i++) {
    const square = d.z[i]! ** 2 - fromPrior[i]! ** 2;
    Q[0]! += d.own[i]! * square;
    Q[1]! += d.spread[i]! * square;
    totalQ += square;
    ownShare += d.own[i]!;
    spreadShare += d.spread[i]!;
  }
  const excess = (q: Float64Array) => {
    const [z, prior] = [channelProducts(marks, q, d.z), channelProducts(marks, q, fromPrior)];
    return z.reduce((sum, value, k) => sum + value * value - prior[k]! ** 2, 0);
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
  return { mark: Math.max(mark, LEAST_MARK_SCALE), spread: Math.max(spread, 0), ring, shift };
}

/**
 * The matrix of expectations, and the row for the plain sum of squares. M is not stored: its elements are formed once
 * and added to what the sums need, first of all M times the channels' directions.
 */
function expectations(
  marks: MarkSet,
  d: ChannelDirections,
  inverse: Float64Array,
  size: number,
): { E: number[][]; total: number[] } {
  const { count: n, channels: K, channel } = marks;
  const H = new Float64Array(n * size); // X A^-1
  for (let i = 0; i < n; i++)
    for (let a = 0; a < size; a++) {
      let sum = 0;
      for (let b = 0; b < size; b++) sum += d.scaled[i * size + b]! * inverse[b * size + a]!;
      H[i * size + a] = sum;
    }
  const table = () => new Float64Array(n * K);
  const [mU, mA, mB, mUnitU, mUnitA, mUnitB] = [table(), table(), table(), table(), table(), table()];
  const E = [0, 1, 2, 3].map(() => new Array<number>(SOURCES).fill(0));
  const total = new Array<number>(SOURCES).fill(0);
  for (let i = 0; i < n; i++) {
    for (let j = 0; j < n; j++) {
      let m = i === j ? 1 : 0;
      for (let a = 0; a < size; a++) m -= H[i * size + a]! * d.scaled[j * size + a]!;
      const square = m * m;
      E[0]![0]! += d.own[i]! * square * d.own[j]!;
      E[0]![1]! += d.own[i]! * square * d.spread[j]!;
      E[1]![1]! += d.spread[i]! * square * d.spread[j]!;
      total[0]! += square * d.own[j]!;
      total[1]! += square * d.spread[j]!;
      const at = i * K + channel[j]!;
      mU[at] = mU[at]! + m * d.u[j]!;
      mA[at] = mA[at]! + m * d.a[j]!;
      mB[at] = mB[at]! + m * d.b[j]!;
      mUnitU[at] = mUnitU[at]! + m * d.unitU[j]!;
      mUnitA[at] = mUnitA[at]! + m * d.unitA[j]!;
      mUnitB[at] = mUnitB[at]! + m * d.unitB[j]!;
    }
  }
  E[1]![0] = E[0]![1]!;
  for (let i = 0; i < n; i++) {
    for (let at = i * K; at < (i + 1) * K; at++) {
      const ring = mU[at]! ** 2;
      const shift = mA[at]! ** 2 + mB[at]! ** 2;
      E[0]![2]! += d.own[i]! * ring;
      E[1]![2]! += d.spread[i]! * ring;
      E[0]![3]! += d.own[i]! * shift;
      E[1]![3]! += d.spread[i]! * shift;
      total[2]! += ring;
      total[3]! += shift;
      const ringUnit = mUnitU[at]! ** 2;
      const shiftUnit = mUnitA[at]! ** 2 + mUnitB[at]! ** 2;
      E[2]![0]! += d.own[i]! * ringUnit;
      E[2]![1]! += d.spread[i]! * ringUnit;
      E[3]![0]! += d.own[i]! * shiftUnit;
      E[3]![1]! += d.spread[i]! * shiftUnit;
    }
  }
  const products = (q: Float64Array, moved: Float64Array) => {
    const sums = new Float64Array(K * K);
    for (let i = 0; i < n; i++)
      for (let l = 0; l < K; l++) {
        const at = channel[i]! * K + l;
        sums[at] = sums[at]! + q[i]! * moved[i * K + l]!;
      }
    return sums.reduce((sum, value) => sum + value * value, 0);
  };
  E[2]![2] = products(d.unitU, mU);
  E[2]![3] = products(d.unitU, mA) + products(d.unitU, mB);
  E[3]![2] = products(d.unitA, mU) + products(d.unitB, mU);
  E[3]![3] = [d.unitA, d.unitB].reduce((sum, q) => sum + products(q, mA) + products(q, mB), 0);
  return { E, total };
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
