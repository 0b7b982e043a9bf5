/**
 * Small dense linear algebra for the normal equations (5 to 7 unknowns): row-major Float64Arrays, nothing allocated.
 */

/** A = J'WJ and g = J'Wr, accumulated over the marks. Returns r'Wr. */
export function accumulate(
  size: number,
  residual: Float64Array,
  jacobian: Float64Array,
  weight: Float64Array,
  A: Float64Array,
  g: Float64Array,
): number {
  if (size === 5) return accumulateFive(residual, jacobian, weight, A, g);
  A.fill(0);
  g.fill(0);
  let cost = 0;
  for (let i = 0; i < residual.length; i++) {
    const w = weight[i]!;
    const r = residual[i]!;
    const row = i * size;
    cost += w * r * r;
    for (let a = 0; a < size; a++) {
      const wJ = w * jacobian[row + a]!;
      g[a] = g[a]! + wJ * r;
      for (let b = 0; b <= a; b++) A[a * size + b] = A[a * size + b]! + wJ * jacobian[row + b]!;
    }
  }
  for (let a = 0; a < size; a++) for (let b = 0; b < a; b++) A[b * size + a] = A[a * size + b]!;
  return cost;
}

/** The same for the five parameters of the round shell, its sums in registers: most of a fit's time is spent here. */
function accumulateFive(
  residual: Float64Array,
  jacobian: Float64Array,
  weight: Float64Array,
  A: Float64Array,
  g: Float64Array,
): number {
  let [cost, g0, g1, g2, g3, g4] = [0, 0, 0, 0, 0, 0];
  let [s00, s10, s11, s20, s21, s22, s30] = [0, 0, 0, 0, 0, 0, 0];
  let [s31, s32, s33, s40, s41, s42, s43, s44] = [0, 0, 0, 0, 0, 0, 0, 0];
  for (let i = 0, row = 0; i < residual.length; i++, row += 5) {
    const w = weight[i]!;
    const r = residual[i]!;
    const j0 = jacobian[row]!;
    const j1 = jacobian[row + 1]!;
    const j2 = jacobian[row + 2]!;
    const j3 = jacobian[row + 3]!;
    const j4 = jacobian[row + 4]!;
    const w0 = w * j0;
    const w1 = w * j1;
    const w2 = w * j2;
    const w3 = w * j3;
    const w4 = w * j4;
    cost += w * r * r;
    g0 += w0 * r;
    g1 += w1 * r;
    g2 += w2 * r;
    g3 += w3 * r;
    g4 += w4 * r;
    s00 += w0 * j0;
    s10 += w1 * j0;
    s11 += w1 * j1;
    s20 += w2 * j0;
    s21 += w2 * j1;
    s22 += w2 * j2;
    s30 += w3 * j0;
    s31 += w3 * j1;
    s32 += w3 * j2;
    s33 += w3 * j3;
    s40 += w4 * j0;
    s41 += w4 * j1;
    s42 += w4 * j2;
    s43 += w4 * j3;
    s44 += w4 * j4;
  }
  g.set([g0, g1, g2, g3, g4]);
  A.set([s00, s10, s20, s30, s40]);
  A.set([s10, s11, s21, s31, s41], 5);
  A.set([s20, s21, s22, s32, s42], 10);
  A.set([s30, s31, s32, s33, s43], 15);
  A.set([s40, s41, s42, s43, s44], 20);
  return cost;
}

/** Take parameter h out of the equations: its step becomes zero. */
export function hold(size: number, h: number, A: Float64Array, g: Float64Array): void {
  for (let a = 0; a < size; a++) {
    A[h * size + a] = 0;
    A[a * size + h] = 0;
  }
  A[h * size + h] = 1;
  g[h] = 0;
}

/**
 * Replace the symmetric positive definite A by its lower Cholesky factor, in place.
 *
 * @returns false when A is not positive definite; A is then spoilt
 */
export function factorise(size: number, A: Float64Array): boolean {
  for (let a = 0; a < size; a++) {
    for (let b = 0; b <= a; b++) {
      let sum = A[a * size + b]!;
      for (let c = 0; c < b; c++) sum -= A[a * size + c]! * A[b * size + c]!;
      if (a !== b) A[a * size + b] = sum / A[b * size + b]!;
      else if (sum > 0) A[a * size + a] = Math.sqrt(sum);
      else return false;
    }
  }
  return true;
}

/** Solve L L' x = b for a factor made by `factorise`, in place in b. */
export function substitute(size: number, L: Float64Array, b: Float64Array): void {
  for (let a = 0; a < size; a++) {
    let sum = b[a]!;
    for (let c = 0; c < a; c++) sum -= L[a * size + c]! * b[c]!;
    b[a] = sum / L[a * size + a]!;
  }
  for (let a = size - 1; a >= 0; a--) {
    let sum = b[a]!;
    for (let c = a + 1; c < size; c++) sum -= L[c * size + a]! * b[c]!;
    b[a] = sum / L[a * size + a]!;
  }
}

/**
 * Inverse of a symmetric positive definite matrix, scaled to a unit diagonal first because its parameters carry
 * different units; null when it is singular to working precision.
 */
export function invert(size: number, A: Float64Array): Float64Array | null {
  const scale = Float64Array.from({ length: size }, (_, a) => 1 / Math.sqrt(A[a * size + a]!));
  const L = A.map((value, at) => value * scale[Math.floor(at / size)]! * scale[at % size]!);
  if (!factorise(size, L)) return null;
  const inverse = new Float64Array(size * size);
  const column = new Float64Array(size);
  for (let b = 0; b < size; b++) {
    column.fill(0);
    column[b] = 1;
    substitute(size, L, column);
    for (let a = 0; a < size; a++) inverse[a * size + b] = column[a]! * scale[a]! * scale[b]!;
  }
  return inverse.every(Number.isFinite) ? inverse : null;
}
