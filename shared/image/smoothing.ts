import { blockAverage, type Plane } from '@/shared/image/blockAverage';

/** Second moments of a Gaussian in pixels squared: along x, between x and y, along y. */
export interface Covariance {
  xx: number;
  xy: number;
  yy: number;
}

/** Full width at half maximum of a Gaussian over its standard deviation. */
export const FWHM = Math.sqrt(8 * Math.LN2);

/** A round Gaussian of a full width at half maximum in pixels. */
export const roundKernel = (fwhm: number): Covariance => {
  const variance = (fwhm / FWHM) ** 2;
  return { xx: variance, xy: 0, yy: variance };
};

/** Beyond this many standard deviations a kernel is cut off: less than 5e-4 of it lies there. */
const REACH = 3.5;
/** Kernels wider than this (standard deviations in pixels) are applied to block averages. */
const WIDE = 12;
/** Standard deviation a kernel keeps, in blocks. */
const KEPT = 6;

/**
 * Smooth a plane with a Gaussian. Blanks (NaN) have no weight, and what lies outside the plane has none: the result is
 * the weighted mean of the numbers there are. A pixel that was blank stays blank.
 *
 * The Gaussian is applied along x and then along the line on which its conditional mean lies, with numbers between
 * pixels taken by linear interpolation. Kernels wider than 12 pixels are applied to block averages, a sixth of their
 * width a side, and brought back by bilinear interpolation: a point may then seem moved by half a block, so that its
 * picture is within 5 per cent of its peak of the direct sum; what is wider than a block is nearer.
 *
 * @param plane length nx·ny, row y = 0 first
 * @throws RangeError when the length does not fit, or the covariance is of no Gaussian
 */
export function smoothed(plane: Float32Array, nx: number, ny: number, kernel: Covariance): Float32Array {
  if (plane.length !== nx * ny)
    throw new RangeError(`${plane.length} numbers cannot be ${nx} by ${ny} pixels`);
  const { xx, xy, yy } = kernel;
  if (!(xx >= 0 && yy >= 0 && xx * yy - xy * xy >= -1e-9 * xx * yy))
    throw new RangeError(`${xx}, ${xy}, ${yy} are the moments of no Gaussian`);
  const narrowest = Math.sqrt(Math.max((xx + yy) / 2 - Math.hypot((xx - yy) / 2, xy), 0));
  const block = narrowest > WIDE ? Math.floor(narrowest / KEPT) : 1;
  if (block === 1) return direct(plane, nx, ny, kernel);
  const small = blockAverage(plane, nx, ny, block);
  const less = (variance: number) => (variance - (block * block) / 12) / block ** 2; // a block is a smoothing itself
  const out = direct(
    small.plane,
    small.nx,
    small.ny,
    { xx: less(xx), xy: xy / block ** 2, yy: less(yy) },
    true,
  );
  return spread(out, small, block, plane, nx);
}

/** `all`: give blanks the mean of what is around them, instead of leaving them. */
function direct(plane: Float32Array, nx: number, ny: number, kernel: Covariance, all = false): Float32Array {
  const slope = kernel.yy > 0 ? kernel.xy / kernel.yy : 0;
  const along = halfKernel(Math.sqrt(Math.max(kernel.xx - slope * kernel.xy, 0)));
  const across = halfKernel(Math.sqrt(kernel.yy));
  const value = new Float32Array(plane.length);
  const weight = new Float32Array(plane.length);
  for (let i = 0; i < plane.length; i++)
    if (plane[i]! - plane[i]! === 0) {
      value[i] = plane[i]!;
      weight[i] = 1;
    }
  const sums = columns(rows(value, nx, ny, along), nx, ny, across, slope);
  const weights = columns(rows(weight, nx, ny, along), nx, ny, across, slope);
  for (let i = 0; i < sums.length; i++)
    sums[i] = weights[i]! > 1e-6 && (all || weight[i] === 1) ? sums[i]! / weights[i]! : NaN;
  return sums;
}

/** Weights of a Gaussian at 0, 1, 2 … pixels, which make 1 with their mirror images. */
function halfKernel(sigma: number): Float64Array {
  const reach = Math.ceil(sigma * REACH);
  const half = Float64Array.from({ length: reach + 1 }, (_, d) =>
    d === 0 ? 1 : Math.exp(-0.5 * (d / sigma) ** 2),
  );
  const sum = half.reduce((total, w) => total + 2 * w, -half[0]!);
  return half.map((w) => w / sum);
}

function rows(plane: Float32Array, nx: number, ny: number, half: Float64Array): Float32Array {
  const out = new Float32Array(plane.length);
  for (let y = 0; y < ny; y++) {
    const row = y * nx;
    for (let d = 1 - half.length; d < half.length; d++) {
      const w = half[Math.abs(d)]!;
      const last = Math.min(nx, nx - d);
      for (let x = Math.max(0, -d); x < last; x++) out[row + x]! += w * plane[row + x + d]!;
    }
  }
  return out;
}

/** Along the line that moves `slope` pixels in x for one in y. */
function columns(
  plane: Float32Array,
  nx: number,
  ny: number,
  half: Float64Array,
  slope: number,
): Float32Array {
  const out = new Float32Array(plane.length);
  for (let d = 1 - half.length; d < half.length; d++) {
    const w = half[Math.abs(d)]!;
    const shift = Math.floor(d * slope);
    const part = d * slope - shift;
    const taps =
      part === 0 ? [[shift, w] as const] : [[shift, w * (1 - part)] as const, [shift + 1, w * part] as const];
    for (const [dx, share] of taps)
      for (let y = Math.max(0, -d); y < Math.min(ny, ny - d); y++) {
        const [to, from] = [y * nx, (y + d) * nx + dx];
        const last = Math.min(nx, nx - dx);
        for (let x = Math.max(0, -dx); x < last; x++) out[to + x]! += share * plane[from + x]!;
      }
  }
  return out;
}

/** Block averages brought back to pixels by bilinear interpolation; blank where the plane was. */
function spread(
  blocks: Float32Array,
  small: Plane,
  block: number,
  plane: Float32Array,
  nx: number,
): Float32Array {
  const out = new Float32Array(plane.length);
  for (let i = 0; i < plane.length; i++) {
    if (plane[i]! - plane[i]! !== 0) {
      out[i] = NaN;
      continue;
    }
    const x = ((i % nx) + 0.5) / block - 0.5;
    const y = (Math.floor(i / nx) + 0.5) / block - 0.5;
    out[i] = between(blocks, small.nx, small.ny, x, y);
  }
  return out;
}

/**
 * The number between pixels by bilinear interpolation; beyond the outermost centres the nearest one's. Blanks leave
 * their weight to their neighbours; NaN where all that counts is blank.
 */
export function between(plane: Float32Array, nx: number, ny: number, x: number, y: number): number {
  const px = Math.min(Math.max(x, 0), nx - 1);
  const py = Math.min(Math.max(y, 0), ny - 1);
  const i = Math.min(Math.floor(px), Math.max(nx - 2, 0));
  const j = Math.min(Math.floor(py), Math.max(ny - 2, 0));
  const [fx, fy] = [px - i, py - j];
  let sum = 0;
  let weights = 0;
  for (let c = 0; c < 4; c++) {
    const w = (c & 1 ? fx : 1 - fx) * (c & 2 ? fy : 1 - fy);
    if (w === 0) continue;
    const value = plane[(j + (c >> 1)) * nx + i + (c & 1)]!;
    if (value - value !== 0) continue;
    sum += w * value;
    weights += w;
  }
  return weights > 0.25 ? sum / weights : NaN;
}
