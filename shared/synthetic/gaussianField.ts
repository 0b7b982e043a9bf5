import type { Random } from '@/shared/random';
import { inverseFourier, powerOfTwo } from './fourier';

export interface FieldRecipe {
  /** Elements along each axis, the first the fastest. */
  shape: readonly number[];
  /** Exponent of the power spectrum: power falls as k^slope, slope negative. */
  slope: number;
  /** Scale of each axis against the first: 2 makes structures twice as long in elements there. Default 1. */
  stretch?: readonly number[];
}

/**
 * Two independent Gaussian random fields with a power-law spectrum, each of mean 0 and variance 1: the real and the
 * imaginary part of one transform of complex normal numbers.
 *
 * They are made on the next powers of two and cut out, so a length that is one repeats itself at its edges.
 *
 * @param random drawn from twice for each element of the padded shape; the same state gives the same fields
 */
export function gaussianFields(recipe: FieldRecipe, random: Random): [Float32Array, Float32Array] {
  const { shape, slope } = recipe;
  const padded = shape.map(powerOfTwo);
  const total = padded.reduce((product, n) => product * n, 1);
  const re = new Float64Array(total);
  const im = new Float64Array(total);
  const [nx, ny = 1, nz = 1] = padded as [number, number?, number?];
  const [kx, ky, kz] = [nx, ny, nz].map((n, axis) => squaredWaves(n, recipe.stretch?.[axis] ?? 1));
  let at = 0;
  for (let k = 0; k < nz; k++)
    for (let j = 0; j < ny; j++)
      for (let i = 0; i < nx; i++, at++) {
        const amplitude = at === 0 ? 0 : (kx![i]! + ky![j]! + kz![k]!) ** (slope / 4);
        re[at] = amplitude * random.normal();
        im[at] = amplitude * random.normal();
      }
  inverseFourier({ shape: padded, re, im });
  return [cutOut(re, padded, shape), cutOut(im, padded, shape)];
}

/** (stretch x frequency)^2 for each element of an axis, frequencies in cycles per element. */
const squaredWaves = (n: number, stretch: number) =>
  Float64Array.from({ length: n }, (_, i) => ((stretch * (i <= n / 2 ? i : n - i)) / n) ** 2);

function cutOut(from: Float64Array, padded: readonly number[], shape: readonly number[]): Float32Array {
  const [nx, ny = 1, nz = 1] = shape as [number, number?, number?];
  const [px, py = 1] = padded as [number, number?];
  const out = new Float32Array(nx * ny * nz);
  let [sum, squares] = [0, 0];
  for (let k = 0; k < nz; k++)
    for (let j = 0; j < ny; j++)
      for (let i = 0; i < nx; i++) {
        const value = from[i + px * (j + py * k)]!;
        out[i + nx * (j + ny * k)] = value;
        sum += value;
        squares += value * value;
      }
  const mean = sum / out.length;
  const scale = 1 / Math.sqrt(Math.max(squares / out.length - mean * mean, 1e-300));
  for (let i = 0; i < out.length; i++) out[i] = (out[i]! - mean) * scale;
  return out;
}
