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
