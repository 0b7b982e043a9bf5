/** Channels whose noise is at most this many times that of the quietest ones count as free of signal. */
const QUIET = 1.1;

/**
 * Noise of a cube from the robust noise of its channels.
 *
 * Structure on the sky makes a channel's noise larger, never smaller. So the quietest quarter of the channels says
 * what noise alone looks like: its median is the level, every channel up to 1.1 times that level counts as free of
 * signal, and the noise of the cube is the median over those. Channels of one value (padding) and channels without
 * pixels do not count.
 *
 * @param noises noise of each channel; null where there are no pixels
 * @returns null when no channel has pixels; 0 when all channels have one value each
 */
export function cubeNoise(noises: readonly (number | null)[]): number | null {
  const known = noises.filter((v): v is number => v !== null);
  if (known.length === 0) return null;
  const sorted = known.filter((v) => v > 0).sort((a, b) => a - b);
  if (sorted.length === 0) return 0;
  const level = middle(sorted.slice(0, Math.ceil(sorted.length / 4)));
  return middle(sorted.filter((v) => v <= QUIET * level));
}

function middle(sorted: readonly number[]): number {
  const half = sorted.length >> 1;
  return sorted.length % 2 === 1 ? sorted[half]! : (sorted[half - 1]! + sorted[half]!) / 2;
}
