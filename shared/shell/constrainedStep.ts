import { factorise, substitute } from '@/shared/shell/normalEquations';

/**
 * Steps that keep linear conditions C s = target: s = offset + T f, with f as many numbers as stay free. Row-major.
 */
export interface Reduction {
  /** Which parameters serve as f. */
  free: number[];
  /** size x free.length. */
  T: Float64Array;
  offset: Float64Array;
}

/** A condition smaller than this beside what it was, once the others are met, says nothing new. */
const DEPENDENT = 1e-9;

/**
 * Solve the conditions for one parameter each (Gauss-Jordan), that on which they bear most.
 *
 * @param scale what a step of each parameter is measured in, as its error
 */
export function reduction(
  size: number,
  conditions: readonly { row: Float64Array; target: number }[],
  scale: Float64Array,
): Reduction {
  const pivots: number[] = [];
  const rows: { row: Float64Array; target: number }[] = [];
  for (const condition of conditions) {
    const row = Float64Array.from(condition.row);
    let { target } = condition;
    const largest = Math.max(...row.map((c, a) => Math.abs(c) * scale[a]!));
    rows.forEach((r, i) => {
      const factor = row[pivots[i]!]!;
      for (let a = 0; a < size; a++) row[a] = row[a]! - factor * r.row[a]!;
      target -= factor * r.target;
    });
    let pivot = -1;
    for (let a = 0; a < size; a++)
      if (!pivots.includes(a) && (pivot < 0 || weight(row, scale, a) > weight(row, scale, pivot))) pivot = a;
    if (pivot < 0 || !(weight(row, scale, pivot) > DEPENDENT * largest)) continue;
    const by = row[pivot]!;
    for (let a = 0; a < size; a++) row[a] = a === pivot ? 1 : row[a]! / by;
    target /= by;
    rows.forEach((r) => {
      const factor = r.row[pivot]!;
      for (let a = 0; a < size; a++) r.row[a] = a === pivot ? 0 : r.row[a]! - factor * row[a]!;
      r.target -= factor * target;
    });
    pivots.push(pivot);
    rows.push({ row, target });
  }
  const free = Array.from({ length: size }, (_, a) => a).filter((a) => !pivots.includes(a));
  const T = new Float64Array(size * free.length);
  const offset = new Float64Array(size);
  free.forEach((a, f) => (T[a * free.length + f] = 1));
  rows.forEach(({ row, target }, i) => {
    offset[pivots[i]!] = target;
    free.forEach((a, f) => (T[pivots[i]! * free.length + f] = row[a] === 0 ? 0 : -row[a]!));
  });
  return { free, T, offset };
}

const weight = (row: Float64Array, scale: Float64Array, a: number) => Math.abs(row[a]!) * scale[a]!;

/** T'A T, the normal matrix of the free numbers. */
export function reducedMatrix(size: number, { T, free }: Reduction, A: Float64Array): Float64Array {
  const n = free.length;
  const AT = new Float64Array(size * n);
  for (let a = 0; a < size; a++)
    for (let b = 0; b < size; b++)
      for (let f = 0; f < n; f++) AT[a * n + f] = AT[a * n + f]! + A[a * size + b]! * T[b * n + f]!;
  const out = new Float64Array(n * n);
  for (let f = 0; f < n; f++)
    for (let g = 0; g < n; g++)
      for (let a = 0; a < size; a++) out[f * n + g] = out[f * n + g]! + T[a * n + f]! * AT[a * n + g]!;
  return out;
}

/** T C T', a covariance of the free numbers as one of all parameters. */
export function expandedMatrix(size: number, { T, free }: Reduction, C: Float64Array): Float64Array {
  const n = free.length;
  const TC = new Float64Array(size * n);
  const out = new Float64Array(size * size);
  for (let a = 0; a < size; a++)
    for (let f = 0; f < n; f++)
      for (let g = 0; g < n; g++) TC[a * n + g] = TC[a * n + g]! + T[a * n + f]! * C[f * n + g]!;
  for (let a = 0; a < size; a++)
    for (let b = 0; b < size; b++)
      for (let f = 0; f < n; f++) out[a * size + b] = out[a * size + b]! + TC[a * n + f]! * T[b * n + f]!;
  return out;
}

/**
 * The damped step that keeps the conditions of a reduction: least of g's + s'As/2, each free number damped in units of
 * its own curvature. Fills `step`; false when even damped the equations are singular.
 */
export function reducedStep(
  size: number,
  reduced: Reduction,
  A: Float64Array,
  g: Float64Array,
  damping: number,
  step: Float64Array,
): boolean {
  const { T, free, offset } = reduced;
  const n = free.length;
  const slope = Float64Array.from(g);
  for (let a = 0; a < size; a++)
    for (let b = 0; b < size; b++) slope[a] = slope[a]! + A[a * size + b]! * offset[b]!;
  const M = reducedMatrix(size, reduced, A);
  const unit = Float64Array.from({ length: n }, (_, f) => 1 / Math.sqrt(M[f * n + f]! + 1e-300));
  const f = new Float64Array(n);
  for (let a = 0; a < n; a++) {
    for (let b = 0; b < n; b++) M[a * n + b] = M[a * n + b]! * unit[a]! * unit[b]!;
    M[a * n + a] = M[a * n + a]! + damping + 1e-13;
    for (let b = 0; b < size; b++) f[a] = f[a]! - T[b * n + a]! * slope[b]! * unit[a]!;
  }
  if (!factorise(n, M)) return false;
  substitute(n, M, f);
  for (let a = 0; a < size; a++) {
    step[a] = offset[a]!;
    for (let b = 0; b < n; b++) step[a] = step[a]! + T[a * n + b]! * f[b]! * unit[b]!;
  }
  return true;
}
