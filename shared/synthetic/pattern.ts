import type { Random } from '@/shared/random';
import { gaussianFields } from './gaussianField';

/** A normal random number, of mean 0 and variance 1, for each place in a ball, changing smoothly from place to place. */
export type Pattern = (x: number, y: number, z: number) => number;

/** Coordinates from -REACH to REACH span the table; the pattern repeats beyond. */
const REACH = 1.15;

/**
 * Two independent patterns with a power-law spectrum on a ball of radius 1.
 *
 * @param slope of the power spectrum; the steeper, the smoother
 * @param steps of the table across the ball, a power of two: nothing is finer than two of them
 */
export function patterns(slope: number, steps: number, random: Random): [Pattern, Pattern] {
  const [a, b] = gaussianFields({ shape: [steps, steps, steps], slope }, random);
  return [sampled(a, steps), sampled(b, steps)];
}

/** Trilinear interpolation in a periodic table. */
function sampled(table: Float32Array, n: number): Pattern {
  const scale = n / (2 * REACH);
  const mask = n - 1;
  return (x, y, z) => {
    const fx = (x + REACH) * scale;
    const fy = (y + REACH) * scale;
    const fz = (z + REACH) * scale;
    const i = Math.floor(fx);
    const j = Math.floor(fy);
    const k = Math.floor(fz);
    const dx = fx - i;
    const x0 = i & mask;
    const x1 = (i + 1) & mask;
    const y0 = n * (j & mask);
    const y1 = n * ((j + 1) & mask);
    const z0 = n * n * (k & mask);
    const z1 = n * n * ((k + 1) & mask);
    const a = table[z0 + y0 + x0]! * (1 - dx) + table[z0 + y0 + x1]! * dx;
    const b = table[z0 + y1 + x0]! * (1 - dx) + table[z0 + y1 + x1]! * dx;
    const c = table[z1 + y0 + x0]! * (1 - dx) + table[z1 + y0 + x1]! * dx;
    const d = table[z1 + y1 + x0]! * (1 - dx) + table[z1 + y1 + x1]! * dx;
    const near = a + (b - a) * (fy - j);
    return near + (c + (d - c) * (fy - j) - near) * (fz - k);
  };
}
