import { Problem } from '@/shared/contract/problem';
import { unquantise } from './dither';
import { riceDecode } from './rice';
import type { TiledImage } from './tiledImage';
import type { TileRow } from './tileRow';

/** Expands gzip (or zlib) bytes to at most so many; throws when there are more, or the bytes are damaged. */
export type Inflate = (bytes: Uint8Array, maxBytes: number) => Uint8Array;

/**
 * The pixels of one tile as a plain FITS file holds them: big-endian, of the image's BITPIX.
 *
 * @param bytes  the tile's bytes from the heap
 * @param index  which tile, from 0
 * @param pixels how many pixels the tile has
 * @throws Problem compressed-damaged, naming the tile
 */
export function decodeTile(
  image: TiledImage,
  row: TileRow,
  bytes: Uint8Array,
  index: number,
  pixels: number,
  inflate: Inflate,
): Uint8Array {
  try {
    const quantised = image.bitpix < 0 && row.from === 'COMPRESSED_DATA' && row.scale !== null;
    if (image.algorithm === 'RICE_1' && row.from === 'COMPRESSED_DATA') {
      if (image.bitpix < 0 && !quantised) throw new Error('floating-point pixels cannot be Rice-compressed');
      const integers = new Int32Array(pixels);
      riceDecode(bytes, pixels, image.rice, integers);
      return quantised ? floats(image, row, integers, index) : widened(integers, image.bitpix);
    }
    const stored = storedBytes(image, row, bytes, pixels, inflate);
    const width = stored.length / pixels;
    if (quantised) return floats(image, row, integersOf(stored, width, pixels), index);
    if (width === Math.abs(image.bitpix) / 8) return stored;
    if (image.bitpix < 0) throw new Error(`it has ${stored.length} bytes for ${pixels} pixels`);
    return widened(integersOf(stored, width, pixels), image.bitpix);
  } catch (error) {
    throw new Problem(
      'compressed-damaged',
      `Tile ${index + 1} of the compressed image cannot be expanded: ${(error as Error).message}`,
    );
  }
}

/** The tile's bytes, expanded, each pixel's together and the highest first. */
function storedBytes(
  image: TiledImage,
  row: TileRow,
  bytes: Uint8Array,
  pixels: number,
  inflate: Inflate,
): Uint8Array {
  const isPlain =
    row.from === 'UNCOMPRESSED_DATA' || (image.algorithm === 'NOCOMPRESS' && row.from === 'COMPRESSED_DATA');
  if (isPlain) return bytes;
  const expanded = inflate(bytes, 8 * pixels);
  return image.algorithm === 'GZIP_2' && row.from === 'COMPRESSED_DATA'
    ? unshuffled(expanded, pixels)
    : expanded;
}

/** GZIP_2 keeps all first bytes together, then all second ones … (FITS Standard 4.0, section 10.4.2). */
function unshuffled(bytes: Uint8Array, pixels: number): Uint8Array {
  const width = Math.floor(bytes.length / pixels);
  const out = new Uint8Array(bytes.length);
  for (let b = 0; b < width; b++) {
    const plane = b * pixels;
    for (let i = 0, to = b; i < pixels; i++, to += width) out[to] = bytes[plane + i]!;
  }
  return out;
}

function integersOf(bytes: Uint8Array, width: number, pixels: number): Int32Array {
  const view = new DataView(bytes.buffer, bytes.byteOffset, bytes.byteLength);
  const out = new Int32Array(pixels);
  if (width === 1) out.set(bytes);
  else if (width === 2) for (let i = 0; i < pixels; i++) out[i] = view.getInt16(2 * i);
  else if (width === 4) for (let i = 0; i < pixels; i++) out[i] = view.getInt32(4 * i);
  else throw new Error(`it has ${bytes.length} bytes for ${pixels} pixels`);
  return out;
}

/** Integers in the width of the image. */
function widened(integers: Int32Array, bitpix: TiledImage['bitpix']): Uint8Array {
  const n = integers.length;
  const out = new Uint8Array((n * Math.abs(bitpix)) / 8);
  const view = new DataView(out.buffer);
  if (bitpix === 8) out.set(integers);
  else if (bitpix === 16) for (let i = 0; i < n; i++) view.setInt16(2 * i, integers[i]!);
  else if (bitpix === 32) for (let i = 0; i < n; i++) view.setInt32(4 * i, integers[i]!);
  else for (let i = 0; i < n; i++) view.setBigInt64(8 * i, BigInt(integers[i]!));
  return out;
}

function floats(image: TiledImage, row: TileRow, integers: Int32Array, index: number): Uint8Array {
  const n = integers.length;
  const wide = image.bitpix === -64;
  const out = new Uint8Array(n * (wide ? 8 : 4));
  const view = new DataView(out.buffer);
  const put = wide
    ? (i: number, value: number) => view.setFloat64(8 * i, value)
    : (i: number, value: number) => view.setFloat32(4 * i, value);
  unquantise(integers, n, image, index, { scale: row.scale!, zero: row.zero, blank: row.blank }, put);
  return out;
}
