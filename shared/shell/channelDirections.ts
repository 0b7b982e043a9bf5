import type { Evaluation } from '@/shared/shell/frame';
import type { MarkSet } from '@/shared/shell/markSet';
import { X, Y } from '@/shared/shell/shellModel';

/**
 * What a channel's marks share, as directions in the space of scaled residuals z = r/s: a common radius offset moves
 * them along u, a shift of the ring's centre along a and b. Every mark belongs to one channel, so a direction of
 * channel k is non-zero on k's marks only and one number a mark stores it. Where blocks of channels share errors (a
 * traced rim), a block stands for the channel here.
 */
export interface ChannelDirections {
  /** z, residuals over their errors. */
  z: Float64Array;
  /** Derivatives over the errors, row by row. */
  scaled: Float64Array;
  /** Shares of a mark's own error and of the spread within the channel in its variance. */
  own: Float64Array;
  spread: Float64Array;
  /** u, a, b, and the same orthonormalised within each block (b made perpendicular to a). */
  u: Float64Array;
  a: Float64Array;
  b: Float64Array;
  unitU: Float64Array;
  unitA: Float64Array;
  unitB: Float64Array;
}

export function channelDirections(
  marks: MarkSet,
  { residual, jacobian, variance }: Evaluation,
  size: number,
): ChannelDirections {
  const n = marks.count;
  const perMark = () => new Float64Array(n);
  const d: ChannelDirections = {
    z: perMark(),
    scaled: new Float64Array(n * size),
    own: perMark(),
    spread: perMark(),
    u: perMark(),
    a: perMark(),
    b: perMark(),
    unitU: perMark(),
    unitA: perMark(),
    unitB: perMark(),
  };
  for (let i = 0; i < n; i++) {
    const perError = 1 / Math.sqrt(variance[i]!);
    d.z[i] = residual[i]! * perError;
    for (let j = 0; j < size; j++) d.scaled[i * size + j] = jacobian[i * size + j]! * perError;
    d.own[i] = marks.sigma2[i]! * perError * perError;
    d.spread[i] = Math.max(variance[i]! - marks.sigma2[i]!, 0) * perError * perError;
    d.u[i] = perError;
    d.a[i] = jacobian[i * size + X]! * perError;
    d.b[i] = jacobian[i * size + Y]! * perError;
  }
  orthonormalise(marks, d);
  return d;
}

/** Sum over the marks of each block of the product of two directions. */
export function blockProducts(marks: MarkSet, p: Float64Array, q: Float64Array): Float64Array {
  const sums = new Float64Array(marks.blocks);
  for (let i = 0; i < marks.count; i++) sums[marks.block[i]!] = sums[marks.block[i]!]! + p[i]! * q[i]!;
  return sums;
}

function orthonormalise(marks: MarkSet, d: ChannelDirections): void {
  const { block } = marks;
  const perLength = (v: Float64Array) =>
    blockProducts(marks, v, v).map((square) => 1 / Math.sqrt(square + 1e-300));
  const lengthU = perLength(d.u);
  const lengthA = perLength(d.a);
  for (let i = 0; i < marks.count; i++) {
    d.unitU[i] = d.u[i]! * lengthU[block[i]!]!;
    d.unitA[i] = d.a[i]! * lengthA[block[i]!]!;
  }
  const along = blockProducts(marks, d.unitA, d.b);
  for (let i = 0; i < marks.count; i++) d.unitB[i] = d.b[i]! - along[block[i]!]! * d.unitA[i]!;
  const lengthB = perLength(d.unitB);
  for (let i = 0; i < marks.count; i++) d.unitB[i] = d.unitB[i]! * lengthB[block[i]!]!;
}
