import { Problem } from '@/shared/contract/problem';
import type { TiledImage } from './tiledImage';

type Grid = Pick<TiledImage, 'naxis' | 'tile' | 'bitpix'>;

/** Pixels of the plain image that follow each other, and the tiles that hold them. */
export interface TileSlab {
  /** Pixels before it in the plain image, and in it. */
  start: number;
  pixels: number;
  firstTile: number;
  tiles: number;
}

/** Most bytes of a slab: it is put together in memory. */
const MAX_SLAB_BYTES = 64 * 2 ** 20;

/**
 * Cut an image into slabs, each one run of the plain image, in order. Tiles are put together slab by slab, so that the
 * plain file is written from front to back; where tiles are deeper than a slab may be, they are asked for again.
 *
 * @throws Problem fits-shape when one plane of the image is too large for tiles that deep
 */
export function* tileSlabs(image: Grid, maxBytes = MAX_SLAB_BYTES): Generator<TileSlab> {
  const { naxis, tile, bitpix } = image;
  const deep = Math.max(
    0,
    tile.findLastIndex((t) => t > 1),
  ); // beyond this axis tiles are one pixel thick
  const across = product(naxis.slice(0, deep));
  const tiles = product(naxis.slice(0, deep).map((n, i) => Math.ceil(n / tile[i]!)));
  const unit = (across * Math.abs(bitpix)) / 8;
  if (unit > 2 * maxBytes)
    throw new Problem(
      'fits-shape',
      'The tiles of the compressed image are too deep for planes as large as these: expand it first (for example with funpack).',
      { card: `ZTILE${deep + 1}` },
    );
  const depth = Math.max(1, Math.floor(maxBytes / unit));
  const length = naxis[deep]!;
  const outer = product(naxis.slice(deep + 1));
  const rows = Math.ceil(length / tile[deep]!);
  for (let k = 0; k < outer; k++) {
    for (let row = 0; row < rows; row++) {
      const end = Math.min((row + 1) * tile[deep]!, length);
      for (let from = row * tile[deep]!; from < end; from += depth) {
        const to = Math.min(from + depth, end);
        yield {
          start: (k * length + from) * across,
          pixels: (to - from) * across,
          firstTile: (k * rows + row) * tiles,
          tiles,
        };
      }
    }
  }
}

/** First pixel of a tile along each axis, and its lengths, shorter at the far edges. */
export function tileBox({ naxis, tile }: Grid, index: number): { start: number[]; length: number[] } {
  const start: number[] = [];
  const length: number[] = [];
  let rest = index;
  naxis.forEach((n, i) => {
    const count = Math.ceil(n / tile[i]!);
    const at = (rest % count) * tile[i]!;
    rest = Math.floor(rest / count);
    start.push(at);
    length.push(Math.min(tile[i]!, n - at));
  });
  return { start, length };
}

/** Copy the part of a tile that lies in a slab to its place there. `bytes` and `out` hold whole pixels. */
export function placeTile(
  image: Grid,
  index: number,
  bytes: Uint8Array,
  slab: TileSlab,
  out: Uint8Array,
): void {
  const size = Math.abs(image.bitpix) / 8;
  const { start, length } = tileBox(image, index);
  const run = length[0]!;
  const runs = product(length.slice(1));
  for (let r = 0; r < runs; r++) {
    let rest = r;
    let stride = image.naxis[0]!;
    let pixel = start[0]!;
    for (let i = 1; i < length.length; i++) {
      pixel += (start[i]! + (rest % length[i]!)) * stride;
      rest = Math.floor(rest / length[i]!);
      stride *= image.naxis[i]!;
    }
    const from = Math.max(0, slab.start - pixel);
    const to = Math.min(run, slab.start + slab.pixels - pixel);
    if (from >= to) continue;
    out.set(
      bytes.subarray((r * run + from) * size, (r * run + to) * size),
      (pixel + from - slab.start) * size,
    );
  }
}

const product = (numbers: number[]) => numbers.reduce((p, n) => p * n, 1);
