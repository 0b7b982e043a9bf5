import type { Quantised } from '@/shared/image/quantise';

/**
 * Mean of several quantised planes of one size, pixel by pixel, over those that have a number there; NaN where none
 * has.
 *
 * @throws RangeError for no planes, or planes of different lengths
 */
export function meanOf(planes: readonly Quantised[]): Float32Array {
  const length = planes[0]?.values.length;
  if (length === undefined) throw new RangeError('There is nothing to average.');
  const sum = new Float64Array(length);
  const count = new Uint16Array(length);
  for (const { values, scale, offset, blank } of planes) {
    if (values.length !== length)
      throw new RangeError(`Planes of ${length} and of ${values.length} pixels cannot be averaged.`);
    for (let i = 0; i < length; i++) {
      const number = values[i]!;
      if (number === blank) continue;
      sum[i]! += offset + scale * number;
      count[i]!++;
    }
  }
  return Float32Array.from(sum, (total, i) => total / count[i]!); // 0/0 is NaN: a blank
}

/** a − b, pixel by pixel; NaN where either is. */
export function differenceOf(a: Float32Array, b: Float32Array): Float32Array {
  if (a.length !== b.length)
    throw new RangeError(`Planes of ${a.length} and of ${b.length} pixels have no difference.`);
  return a.map((value, i) => value - b[i]!);
}
