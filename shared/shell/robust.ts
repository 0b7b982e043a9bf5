/** Robust statistics of scaled residuals: the median deviation and the weights made from it. */

/** A normal deviate's standard deviation over its median absolute deviation. */
export const MAD_TO_SD = 1.4826;
/** Where Tukey's biweight reaches zero; 95 % efficient on normal residuals. */
const TUKEY_LIMIT = 4.685;
/** A mark beyond the limit keeps this weight, so that the normal equations stay regular. */
const LEAST_WEIGHT = 1e-6;

/** Median, the mean of the middle two for an even count; `values` is sorted in place. */
export function medianInPlace(values: Float64Array): number {
  const n = values.length;
  if (n === 0) return NaN;
  values.sort();
  const middle = n >> 1;
  return n % 2 === 1 ? values[middle]! : 0.5 * (values[middle - 1]! + values[middle]!);
}

export const median = (values: Iterable<number>): number => medianInPlace(Float64Array.from(values));

/**
 * Weights from residuals over their errors, first by the soft-L1 curve, then by the biweight of Beaton & Tukey (1974).
 *
 * @param scratch as long as the residuals; overwritten
 */
export function robustWeights(
  residual: Float64Array,
  variance: Float64Array,
  biweight: boolean,
  scratch: Float64Array,
  out: Float64Array,
): void {
  for (let i = 0; i < residual.length; i++) scratch[i] = Math.abs(residual[i]!) / Math.sqrt(variance[i]!);
  const scale = MAD_TO_SD * medianInPlace(scratch) + 1e-12;
  for (let i = 0; i < residual.length; i++) {
    const z = residual[i]! / Math.sqrt(variance[i]!) / scale;
    if (!biweight) out[i] = 1 / Math.sqrt(1 + z * z);
    else if (Math.abs(z) < TUKEY_LIMIT) out[i] = (1 - (z / TUKEY_LIMIT) ** 2) ** 2;
    else out[i] = LEAST_WEIGHT;
  }
}
