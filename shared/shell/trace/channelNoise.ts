import { medianOf } from '@/shared/fits/statistics';

/** Groups of neighbouring channels to look at, spread over the cube; and how many pixels make one worth counting. */
const GROUPS = 5;
const LEAST_PIXELS = 50;
const MAD_TO_SD = 1.4826;

/** First channels of groups of three, spread evenly: enough to know the noise of a cube. */
export function noiseGroups(channels: number): number[] {
  const last = channels - 3;
  if (last < 0) return [];
  const starts = Array.from({ length: GROUPS }, (_, i) => Math.round((last * (i + 0.5)) / GROUPS));
  return [...new Set(starts)];
}

/**
 * Noise of one channel from three neighbouring ones, a - 2 b + c: gas changes slowly along velocity and drops out of it,
 * while independent noise has six times its variance. (The scatter over the pixels of a channel, which serves where
 * channels are empty, takes structure of the gas for noise where none is: by factors of 3 to 5 in the reference cubes,
 * on which this is within 3 %.) Channels that were smoothed along velocity give too small a noise: 0.4 of it for
 * weights 1/4, 1/2, 1/4.
 *
 * @returns null where fewer than 50 pixels have a value on all three, or all have the same
 */
export function groupNoise(
  a: Float32Array | Float64Array,
  b: Float32Array | Float64Array,
  c: Float32Array | Float64Array,
): number | null {
  const found = new Float64Array(a.length);
  let n = 0;
  for (let i = 0; i < a.length; i++) {
    const second = a[i]! - 2 * b[i]! + c[i]!;
    if (Number.isFinite(second)) found[n++] = second;
  }
  if (n < LEAST_PIXELS) return null;
  const middle = medianOf(found, n);
  for (let i = 0; i < n; i++) found[i] = Math.abs(found[i]! - middle);
  const noise = (MAD_TO_SD * medianOf(found, n)) / Math.sqrt(6);
  return noise > 0 ? noise : null;
}

/** Noise of a cube from its groups: the smallest, since gas that is left only adds. Null where no group has any. */
export function leastNoise(groups: readonly (number | null)[]): number | null {
  const known = groups.filter((noise) => noise !== null);
  return known.length === 0 ? null : Math.min(...known);
}
