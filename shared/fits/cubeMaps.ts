/** Values below this many times the noise are left out of velocity and dispersion. */
export const MASK_NOISES = 3;

/**
 * Sums over channels from which the maps are made; one accumulator for each thread, merged at the end. The arrays are
 * shared memory, so that they pass between threads without a copy.
 */
export interface MapSums {
  sum: Float64Array;
  count: Uint32Array;
  peak: Float32Array;
  /** Sums over what reaches the mask: weight, weight · velocity, weight · velocity². */
  weight: Float64Array;
  first: Float64Array;
  second: Float64Array;
}

/** Bytes of these sums for each pixel of the sky. */
export const MAP_BYTES = 40;

export function newMapSums(pixels: number): MapSums {
  const doubles = () => new Float64Array(new SharedArrayBuffer(8 * pixels));
  return {
    sum: doubles(),
    count: new Uint32Array(new SharedArrayBuffer(4 * pixels)),
    peak: new Float32Array(new SharedArrayBuffer(4 * pixels)).fill(-Infinity),
    weight: doubles(),
    first: doubles(),
    second: doubles(),
  };
}

/**
 * Add one plane.
 *
 * @param plane     brightness, blanks NaN; none is infinite
 * @param velocity  km/s, counted from any fixed velocity near the cube's own: far off, digits are lost
 * @param threshold brightness from which a pixel counts for velocity and dispersion; only positive ones ever do
 */
export function addPlane(
  { sum, count, peak, weight, first, second }: MapSums,
  plane: Float32Array,
  velocity: number,
  threshold: number,
): void {
  const least = Math.max(threshold, Number.MIN_VALUE);
  const square = velocity * velocity;
  for (let i = 0; i < plane.length; i++) {
    const v = plane[i]!;
    // a blank fails every comparison
    sum[i]! += v === v ? v : 0;
    count[i]! += Number(v === v);
    if (v > peak[i]!) peak[i] = v;
    if (v >= least) {
      weight[i]! += v;
      first[i]! += v * velocity;
      second[i]! += v * square;
    }
  }
}

/** Add the sums of `other` to those of `into`. */
export function mergeMaps(into: MapSums, other: MapSums): void {
  for (let i = 0; i < into.sum.length; i++) {
    if (other.peak[i]! > into.peak[i]!) into.peak[i] = other.peak[i]!;
    into.sum[i]! += other.sum[i]!;
    into.count[i]! += other.count[i]!;
    into.weight[i]! += other.weight[i]!;
    into.first[i]! += other.first[i]!;
    into.second[i]! += other.second[i]!;
  }
}

export type CubeMap = 'total' | 'velocity' | 'dispersion' | 'peak';

/**
 * One map from the sums. NaN where there is nothing to say: no unblanked channel, or none that reaches the mask.
 *
 * total: sum times the channel width; velocity: mean weighted by brightness, km/s; dispersion: root of the weighted
 * mean square deviation from it, km/s; peak: the largest brightness.
 *
 * @param origin what the velocities were counted from, km/s
 */
export function mapOf(sums: MapSums, kind: CubeMap, channelWidth: number, origin: number): Float32Array {
  const map = new Float32Array(sums.sum.length);
  for (let i = 0; i < map.length; i++) {
    const w = sums.weight[i]!;
    const mean = sums.first[i]! / w; // 0/0 is NaN: blank
    if (kind === 'velocity') map[i] = origin + mean;
    else if (kind === 'dispersion') map[i] = Math.sqrt(Math.max(0, sums.second[i]! / w - mean * mean));
    else if (sums.count[i] === 0) map[i] = NaN;
    else map[i] = kind === 'total' ? sums.sum[i]! * channelWidth : sums.peak[i]!;
  }
  return map;
}
