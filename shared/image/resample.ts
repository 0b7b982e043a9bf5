import { between } from '@/shared/image/smoothing';

/** Places to read an image at, two numbers each (x, y in its pixels), row by row; NaN where there is nothing to read. */
export interface Sampling {
  nx: number;
  ny: number;
  places: Float32Array;
}

/** For each pixel of a new image, the place in the old one that shows the same sky. */
export function samplingOf(
  nx: number,
  ny: number,
  placeOf: (x: number, y: number) => { x: number; y: number } | null,
): Sampling {
  const places = new Float32Array(2 * nx * ny).fill(NaN);
  for (let y = 0, at = 0; y < ny; y++)
    for (let x = 0; x < nx; x++, at += 2) {
      const place = placeOf(x, y);
      if (!place) continue;
      places[at] = place.x;
      places[at + 1] = place.y;
    }
  return { nx, ny, places };
}

/**
 * Read a plane at the places of a sampling, by bilinear interpolation; NaN outside the image (beyond half a pixel from
 * its outermost centres) and where what counts is blank.
 *
 * @param block image pixels along a side of one of the plane's: a reduced plane is read as if it were whole
 */
export function resampled(
  plane: Float32Array,
  width: number,
  height: number,
  block: number,
  { nx, ny, places }: Sampling,
): Float32Array {
  const out = new Float32Array(nx * ny);
  for (let i = 0; i < out.length; i++) {
    const x = (places[2 * i]! + 0.5) / block - 0.5;
    const y = (places[2 * i + 1]! + 0.5) / block - 0.5;
    const inside = x >= -0.5 && y >= -0.5 && x <= width - 0.5 && y <= height - 0.5;
    out[i] = inside ? between(plane, width, height, x, y) : NaN;
  }
  return out;
}
