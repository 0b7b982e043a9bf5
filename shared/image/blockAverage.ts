/** A plane of numbers, row y = 0 first, NaN where there is none. */
export interface Plane {
  plane: Float32Array;
  nx: number;
  ny: number;
}

/**
 * Reduce a plane by averaging blocks of pixels: for thumbnails and for channel maps smaller than the cube.
 *
 * Pixel (i, j) of the result is the mean of the numbers among the pixels block·i … block·i + block − 1 by
 * block·j … block·j + block − 1. Blanks (NaN, ±Infinity) do not count; a block of nothing but blanks is NaN. Blocks
 * cut by the upper or right edge average what there is, so the result has ⌈nx/block⌉ by ⌈ny/block⌉ pixels.
 * Sums are taken in double precision: the mean of a block is right to one rounding to float32.
 *
 * @param plane numbers, row y = 0 first, length nx·ny
 * @param block pixels a side, a whole number of 1 or more; 1 gives back the same array, not a copy
 * @throws RangeError when the length or the block does not fit
 */
export function blockAverage(plane: Float32Array, nx: number, ny: number, block: number): Plane {
  if (plane.length !== nx * ny)
    throw new RangeError(`${plane.length} numbers cannot be ${nx} by ${ny} pixels`);
  if (!Number.isInteger(block) || block < 1) throw new RangeError(`${block} is not a block size`);
  if (block === 1) return { plane, nx, ny };
  const width = Math.ceil(nx / block);
  const height = Math.ceil(ny / block);
  const reduced = new Float32Array(width * height);
  const sum = new Float64Array(width);
  const count = new Int32Array(width);
  for (let j = 0; j < height; j++) {
    sum.fill(0);
    count.fill(0);
    const last = Math.min((j + 1) * block, ny);
    for (let y = j * block; y < last; y++) {
      const row = y * nx;
      for (let i = 0, x = 0; i < width; i++) {
        const end = Math.min(x + block, nx);
        let s = 0;
        let n = 0;
        for (; x < end; x++) {
          const value = plane[row + x]!;
          if (value - value === 0) {
            s += value;
            n++;
          }
        }
        sum[i]! += s;
        count[i]! += n;
      }
    }
    for (let i = 0; i < width; i++) reduced[j * width + i] = sum[i]! / count[i]!; // 0/0 is NaN: a blank
  }
  return { plane: reduced, nx: width, ny: height };
}

/** The smallest block that brings the longer side down to `size` pixels or fewer. */
export const blockFor = (nx: number, ny: number, size: number): number =>
  Math.max(1, Math.ceil(Math.max(nx, ny) / size));
