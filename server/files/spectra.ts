import type { CubeHead } from '@/shared/fits/cubeHead';
import { decodePixels } from '@/shared/fits/decode';
import {
  placeInTile,
  slabOffset,
  TILE,
  tileAt,
  tileBytes,
  type SpectraTiles,
} from '@/shared/fits/spectraTiles';
import type { ByteSource } from './byteSource';
import { fillFrom } from './pixelFile';
import { readPlanes } from './planes';

/** Reads under way at a time, and the most bytes in one: neighbouring tiles come together. */
const AT_ONCE = 8;
const MOST_BYTES = 4 * 2 ** 20;

/** Called with each wanted pixel and its spectrum, in any order; the array is used again for the next. */
export type SpectrumVisitor = (pixel: number, spectrum: Float64Array) => void;

/**
 * Read the spectra of some pixels from a copy in tiles: a tile is one read, whatever the number of channels.
 *
 * @param pixels indices y · nx + x, each once
 */
export async function readSpectra(
  source: ByteSource,
  head: CubeHead,
  slab: number,
  pixels: Iterable<number>,
  visit: SpectrumVisitor,
): Promise<void> {
  const t: SpectraTiles = { ...head.shape, slab, bitpix: head.bitpix };
  const wanted = new Map<number, number[]>();
  for (const pixel of pixels) {
    const tile = tileAt(t, pixel % t.nx, Math.floor(pixel / t.nx));
    const there = wanted.get(tile);
    if (there) there.push(pixel);
    else wanted.set(tile, [pixel]);
  }
  const runs = runsOf(
    [...wanted.keys()].sort((a, b) => a - b),
    Math.max(1, Math.floor(MOST_BYTES / tileBytes(t))),
  );
  const readers = Array.from({ length: Math.min(AT_ONCE, runs.length) }, async () => {
    const spectrum = new Float64Array(t.channels);
    const values = new (isFloat32(head) ? Float32Array : Float64Array)(TILE * TILE * t.channels);
    for (let run = runs.shift(); run; run = runs.shift()) {
      const bytes = new Uint8Array(run.count * tileBytes(t));
      await fillFrom(source, bytes, slabOffset(t, run.first, 0));
      for (let i = 0; i < run.count; i++) {
        decodePixels(bytes.subarray(i * tileBytes(t), (i + 1) * tileBytes(t)), head, values);
        for (const pixel of wanted.get(run.first + i)!) {
          spectrumOf(t, values, pixel, spectrum);
          visit(pixel, spectrum);
        }
      }
    }
  });
  await Promise.all(readers);
}

/** Pixels that are float32 as they stand lose nothing in a float32 array, and are decoded in a third of the time. */
const isFloat32 = ({ bitpix, bscale, bzero }: CubeHead) => bitpix === -32 && bscale === 1 && bzero === 0;

function spectrumOf(t: SpectraTiles, values: Float32Array | Float64Array, pixel: number, out: Float64Array) {
  const [x, y] = [pixel % t.nx, Math.floor(pixel / t.nx)];
  for (let channel = 0; channel < t.channels; channel += t.slab) {
    const at = placeInTile(t, x, y, channel);
    out.set(values.subarray(at, at + Math.min(t.slab, t.channels - channel)), channel);
  }
}

/** Neighbouring tiles as runs. */
function runsOf(tiles: readonly number[], most: number): { first: number; count: number }[] {
  const runs: { first: number; count: number }[] = [];
  for (const tile of tiles) {
    const last = runs.at(-1);
    if (last && last.first + last.count === tile && last.count < most) last.count++;
    else runs.push({ first: tile, count: 1 });
  }
  return runs;
}

/** The same from planes, all of which are read: for cubes so small that they have no copy in tiles. */
export async function readSpectraFromPlanes(
  source: ByteSource,
  head: CubeHead,
  pixels: Iterable<number>,
  visit: SpectrumVisitor,
): Promise<void> {
  const list = [...pixels];
  const { channels } = head.shape;
  const spectra = new Float64Array(list.length * channels);
  for await (const { channel, values } of readPlanes(source, head, { precise: true }))
    list.forEach((pixel, i) => (spectra[i * channels + channel] = values[pixel]!));
  list.forEach((pixel, i) => visit(pixel, spectra.subarray(i * channels, (i + 1) * channels)));
}
