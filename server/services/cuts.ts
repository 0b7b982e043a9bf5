import { Problem } from '@/shared/contract/problem';
import { quantise } from '@/shared/image/quantise';
import { cutPath, type CutPath, type CutShape } from '@/shared/sky/cutPath';
import { buildWcs, type PixelPoint } from '@/shared/sky/wcs';
import type { Context } from './context';
import { visitSpectra } from './cubePixels';
import { readyCube } from './cubes';
import { withFloats } from '../files/scratch';
import type { PlaneAnswer } from './planes';

export const INTERPOLATION =
  'bilinear between the four nearest pixel centres, the nearest one beyond the outermost; blank where one of them is';

const MOST_PLACES = 8192;

export interface CutAnswer extends PlaneAnswer {
  /** Degrees between neighbouring samples. */
  step: number;
}

export interface CutAsked {
  l: number;
  b: number;
  toL?: number | undefined;
  toB?: number | undefined;
  radius?: number | undefined;
}

/** Brightness along a cut (across) in every channel (upward, channel 0 first), in the form of a plane. */
export async function cutOf(ctx: Context, cubeId: string, asked: CutAsked): Promise<CutAnswer> {
  const row = await readyCube(ctx, cubeId);
  const { nx, ny, channels } = row.head.shape;
  const wcs = buildWcs(row.head.wcs);
  const [a, b, c, d] = row.head.wcs.sky.matrix;
  const pixelDegrees = Math.min(Math.hypot(a, c), Math.hypot(b, d));
  const path = pathOf(() => cutPath(wcs, shapeOf(asked), pixelDegrees, MOST_PLACES));
  const uses = pixelUses(path, nx, ny);
  if (uses.size === 0)
    throw new Problem('invalid-input', 'No part of this cut lies on the cube.', { field: 'l' });
  const width = path.pixels.length;
  const plane = await withFloats(width * channels, async (alongSpectra) => {
    await readAlong(ctx, row, uses, alongSpectra);
    return turned(alongSpectra, width, channels);
  });
  return {
    ...quantise(plane),
    ...{ nx: width, ny: channels, block: 1, step: path.step, unit: row.head.unit ?? row.head.bunit },
  };
}

type Uses = ReturnType<typeof pixelUses>;

/** The spectra along a path, one after the other. */
async function readAlong(
  ctx: Context,
  row: Awaited<ReturnType<typeof readyCube>>,
  uses: Uses,
  alongSpectra: Float32Array,
): Promise<void> {
  const { channels } = row.head.shape;
  alongSpectra.fill(NaN);
  const onCube = new Set<number>();
  for (const parts of uses.values()) for (const { place } of parts) onCube.add(place);
  for (const place of onCube) alongSpectra.fill(0, place * channels, (place + 1) * channels);
  await visitSpectra(ctx, row, uses.keys(), (pixel, spectrum) => {
    for (const { place, weight } of uses.get(pixel)!) {
      const at = place * channels;
      for (let k = 0; k < channels; k++) alongSpectra[at + k]! += weight * spectrum[k]!; // a blank stays a blank
    }
  });
}

/** Places and channels of a side that are turned together, so that both stay in the processor's cache. */
const PATCH = 32;

/** Channel by channel what was place by place. */
function turned(alongSpectra: Float32Array, width: number, channels: number): Float32Array {
  const plane = new Float32Array(width * channels);
  for (let from = 0; from < width; from += PATCH)
    for (let first = 0; first < channels; first += PATCH)
      for (let place = from; place < Math.min(from + PATCH, width); place++)
        for (let k = first; k < Math.min(first + PATCH, channels); k++)
          plane[k * width + place] = alongSpectra[place * channels + k]!;
  return plane;
}

function shapeOf({ l, b, toL, toB, radius }: CutAsked): CutShape {
  if (Math.abs(b) > 90 || (toB !== undefined && Math.abs(toB) > 90))
    throw new Problem('invalid-input', 'A latitude lies between −90 and 90 degrees.', {
      field: Math.abs(b) > 90 ? 'b' : 'toB',
    });
  const segment = toL !== undefined || toB !== undefined;
  if (segment === (radius !== undefined))
    throw new Problem(
      'invalid-input',
      'Give the other end of a segment (toL, toB), or the radius of a ring.',
      {
        field: segment ? 'radius' : 'toL',
      },
    );
  if (radius !== undefined) return { l, b, radius };
  if (toL === undefined || toB === undefined)
    throw new Problem('invalid-input', 'Give toL and toB both.', {
      field: toL === undefined ? 'toL' : 'toB',
    });
  return { l, b, toL, toB };
}

function pathOf(make: () => CutPath): CutPath {
  try {
    return make();
  } catch (error) {
    if (error instanceof RangeError) throw new Problem('invalid-input', error.message, { field: 'toL' });
    throw error;
  }
}

/** Which places each pixel counts for, and how much. */
function pixelUses(
  { pixels }: CutPath,
  nx: number,
  ny: number,
): Map<number, { place: number; weight: number }[]> {
  const uses = new Map<number, { place: number; weight: number }[]>();
  const add = (pixel: number, place: number, weight: number) => {
    if (weight === 0) return;
    const there = uses.get(pixel);
    if (there) there.push({ place, weight });
    else uses.set(pixel, [{ place, weight }]);
  };
  pixels.forEach((point, place) => {
    if (!point || !isInside(point, nx, ny)) return;
    const x = Math.min(Math.max(point.x, 0), nx - 1);
    const y = Math.min(Math.max(point.y, 0), ny - 1);
    const [i, j] = [
      Math.min(Math.floor(x), Math.max(nx - 2, 0)),
      Math.min(Math.floor(y), Math.max(ny - 2, 0)),
    ];
    const [u, v] = [x - i, y - j];
    add(j * nx + i, place, (1 - u) * (1 - v));
    add(j * nx + i + 1, place, u * (1 - v));
    add((j + 1) * nx + i, place, (1 - u) * v);
    add((j + 1) * nx + i + 1, place, u * v);
  });
  return uses;
}

const isInside = ({ x, y }: PixelPoint, nx: number, ny: number) =>
  x >= -0.5 && x <= nx - 0.5 && y >= -0.5 && y <= ny - 0.5;
