import { Problem } from '@/shared/contract/problem';
import type { CubeHead } from '@/shared/fits/cubeHead';
import { decodePixels, type PixelFormat } from '@/shared/fits/decode';
import {
  isChannelContiguous,
  pixelOffset,
  placeSlice,
  planeSlices,
  type CubeLayout,
} from '@/shared/fits/planeRange';
import type { ByteSource } from './byteSource';

/** Memory that planes read together may take when channels do not lie in one piece, bytes. */
const TOGETHER = 256 * 1024 * 1024;

export interface ChannelPlane {
  channel: number;
  /** Brightness, row by row from y = 0, x fastest; blank is NaN. Overwritten by the next plane. */
  values: Float32Array | Float64Array;
  /** How many of the blanks were infinities in the file. */
  infinite: number;
}

/**
 * Read channels one after the other. Where the file keeps a channel in one piece, each is read when asked for; where
 * it does not, as many as fit 256 MB are read in one pass over the file.
 *
 * @param precise true: float64, for exact figures; false: float32
 * @throws Problem fits-truncated when the file ends early
 */
export async function* readPlanes(
  source: ByteSource,
  head: CubeHead,
  { from = 0, to = head.shape.channels, precise = false } = {},
): AsyncGenerator<ChannelPlane> {
  const { nx, ny } = head.shape;
  const pixels = nx * ny;
  const planeBytes = pixels * (precise ? 8 : 4);
  const together = isChannelContiguous(head) ? 1 : Math.max(1, Math.floor(TOGETHER / planeBytes));
  const size = Math.min(together, to - from) * pixels;
  const block = precise ? new Float64Array(size) : new Float32Array(size);
  for (let start = from; start < to; start += together) {
    const end = Math.min(start + together, to);
    const infinite = await readBlock(source, head, start, end, block);
    for (let channel = start; channel < end; channel++) {
      const at = (channel - start) * pixels;
      yield { channel, values: block.subarray(at, at + pixels), infinite: channel === start ? infinite : 0 };
    }
  }
}

/** Read one channel into an array of nx · ny values. @returns how many were infinite */
export function readPlane(
  source: ByteSource,
  head: CubeLayout & PixelFormat,
  channel: number,
  out: Float32Array | Float64Array,
): Promise<number> {
  return readBlock(source, head, channel, channel + 1, out);
}

/** Brightness at one pixel (whole numbers, inside the cube); null when it is blank. */
export async function readPixel(
  source: ByteSource,
  head: CubeHead,
  x: number,
  y: number,
  channel: number,
): Promise<number | null> {
  const out = new Float64Array(1);
  decodePixels(await whole(source, pixelOffset(head, x, y, channel), Math.abs(head.bitpix) / 8), head, out);
  return Number.isNaN(out[0]!) ? null : out[0]!;
}

async function readBlock(
  source: ByteSource,
  head: CubeLayout & PixelFormat,
  from: number,
  to: number,
  out: Float32Array | Float64Array,
): Promise<number> {
  const straight = isStraight(head);
  let infinite = 0;
  let filled = 0;
  let scratch = new (out instanceof Float32Array ? Float32Array : Float64Array)(0);
  for (const slice of planeSlices(head, from, to)) {
    const bytes = await whole(source, slice.offset, slice.length);
    const count = slice.length / (Math.abs(head.bitpix) / 8);
    if (straight) {
      infinite += decodePixels(bytes, head, out, filled);
      filled += count;
      continue;
    }
    if (scratch.length < count)
      scratch = new (out instanceof Float32Array ? Float32Array : Float64Array)(count);
    const values = scratch.subarray(0, count);
    infinite += decodePixels(bytes, head, values);
    placeSlice(head, slice, values, from, to, out);
  }
  return infinite;
}

/** True when the file's order within a channel is the plane's own, so that pixels need no placing. */
function isStraight(head: CubeLayout): boolean {
  const { naxis, longitude, latitude } = head.layout;
  const between = naxis.slice(longitude + 1, latitude).concat(naxis.slice(0, longitude));
  return isChannelContiguous(head) && longitude < latitude && between.every((n) => n === 1);
}

async function whole(source: ByteSource, offset: number, length: number): Promise<Uint8Array> {
  const bytes = await source.read(offset, length);
  if (bytes.length < length) {
    throw new Problem('fits-truncated', `The file ends ${length - bytes.length} bytes too early.`, {
      missingBytes: length - bytes.length,
    });
  }
  return bytes;
}
