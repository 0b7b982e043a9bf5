import type { CubeHead } from '@/shared/fits/cubeHead';
import { decodePixels } from '@/shared/fits/decode';
import { gatherSpectrum, slabOffset, tileAt, tileBytes, type SpectraTiles } from '@/shared/fits/spectraTiles';
import type { ByteSource } from './byteSource';
import { fillFrom } from './pixelFile';
import { readPlanes } from './planes';

/** Reads under way at a time, and the most bytes in one: neighbouring tiles come together. */
const AT_ONCE = 4;
const MOST_BYTES = 2 ** 20;

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
  const most = Math.max(...runs.map((run) => run.count));
  const readers = Array.from({ length: Math.min(AT_ONCE, runs.length) }, async () => {
    const spectrum = new Float64Array(t.channels);
    const gathered = new Uint8Array((t.channels * Math.abs(t.bitpix)) / 8);
    const room = new Uint8Array(most * tileBytes(t));
    for (let run = runs.shift(); run; run = runs.shift()) {
      await fillFrom(source, room.subarray(0, run.count * tileBytes(t)), slabOffset(t, run.first, 0));
      for (let i = 0; i < run.count; i++) {
        const tile = room.subarray(i * tileBytes(t), (i + 1) * tileBytes(t));
        for (const pixel of wanted.get(run.first + i)!) {
          gatherSpectrum(t, tile, pixel % t.nx, Math.floor(pixel / t.nx), gathered);
          decodePixels(gathered, head, spectrum);
          visit(pixel, spectrum);
        }
      }
    }
  });
  await Promise.all(readers);
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
