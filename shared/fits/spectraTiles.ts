import { wordsOf } from './cubeOrder';

/** Pixels a side of a tile. */
export const TILE = 8;

/**
 * A copy of a cube in which spectra lie together. The sky is cut into tiles of 8 by 8 pixels, row by row of tiles; a
 * tile holds slabs of `slab` channels one after the other; in a slab the channels of one position are neighbours, and
 * the positions follow row by row. Tiles at the edges keep their full size, the last slab does not. Pixels are as in
 * the file: same width, same byte order.
 */
export interface SpectraTiles {
  nx: number;
  ny: number;
  channels: number;
  slab: number;
  bitpix: number;
}

export const tilesAcross = ({ nx }: SpectraTiles): number => Math.ceil(nx / TILE);
export const tileCount = (t: SpectraTiles): number => tilesAcross(t) * Math.ceil(t.ny / TILE);
export const tileBytes = (t: SpectraTiles): number => (TILE * TILE * t.channels * Math.abs(t.bitpix)) / 8;
export const tileAt = (t: SpectraTiles, x: number, y: number): number =>
  Math.floor(y / TILE) * tilesAcross(t) + Math.floor(x / TILE);

/** Byte offset of a slab of a tile; `from` is the slab's first channel. */
export const slabOffset = (t: SpectraTiles, tile: number, from: number): number =>
  tile * tileBytes(t) + (TILE * TILE * from * Math.abs(t.bitpix)) / 8;

/**
 * Gather the spectrum of one position from the bytes of its tile, as it stands in the file.
 *
 * @param tile bytes of one whole tile, from a multiple of 8 on
 * @param out  bytes of one pixel in each channel, from a multiple of 8 on
 */
export function gatherSpectrum(
  t: SpectraTiles,
  tile: Uint8Array,
  x: number,
  y: number,
  out: Uint8Array,
): void {
  const from = wordsOf(tile, t.bitpix) as Uint32Array;
  const to = wordsOf(out, t.bitpix) as Uint32Array;
  const position = (y % TILE) * TILE + (x % TILE);
  for (let first = 0; first < t.channels; first += t.slab) {
    const depth = Math.min(t.slab, t.channels - first);
    const start = TILE * TILE * first + position * depth;
    for (let k = 0; k < depth; k++) to[first + k] = from[start + k]!;
  }
}

/**
 * Gather one slab of one tile from planes.
 *
 * @param planes  whole planes, one after the other, of `depth` channels
 * @param out     bytes of TILE · TILE · depth pixels, from a multiple of 8 on
 * @param strides of the planes, in pixels: x, y, and from plane to plane
 */
export function gatherTile(
  planes: Uint8Array,
  out: Uint8Array,
  t: SpectraTiles,
  tile: number,
  depth: number,
  strides: { x: number; y: number; plane: number },
): void {
  const from = wordsOf(planes, t.bitpix) as Uint32Array;
  const to = wordsOf(out, t.bitpix) as Uint32Array;
  const x0 = (tile % tilesAcross(t)) * TILE;
  const y0 = Math.floor(tile / tilesAcross(t)) * TILE;
  const width = Math.min(TILE, t.nx - x0);
  const height = Math.min(TILE, t.ny - y0);
  for (let k = 0; k < depth; k++)
    for (let y = 0; y < height; y++) {
      let source = k * strides.plane + (y0 + y) * strides.y + x0 * strides.x;
      let target = y * TILE * depth + k;
      for (let x = 0; x < width; x++, source += strides.x, target += depth) to[target] = from[source]!;
    }
}
