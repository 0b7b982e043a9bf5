import type { FileHandle } from 'node:fs/promises';
import { unzipSync } from 'node:zlib';
import { Problem } from '@/shared/contract/problem';
import { decodeTile } from '@/shared/fits/compressed/decodeTile';
import type { TiledImage } from '@/shared/fits/compressed/tiledImage';
import { tileRow } from '@/shared/fits/compressed/tileRow';
import { placeTile, tileBox, tileSlabs } from '@/shared/fits/compressed/tileSlabs';
import type { ReadBytes } from '@/shared/fits/findCube';

/** Read at once, and gathered before it is written. */
const WINDOW = 4 * 2 ** 20;
/** Compressed tiles that are so much larger than their pixels are none. */
const SPARE = 65_536;

/**
 * Expand a tile-compressed image and write its pixels at the end of a file, in order, tile by tile.
 *
 * @param read  bytes of the file, `tableOffset` those where the table begins
 * @throws Problem compressed-damaged, naming the tile; fits-truncated
 */
export async function untile(
  image: TiledImage,
  read: ReadBytes,
  tableOffset: number,
  out: FileHandle,
  { signal, onProgress }: { signal?: AbortSignal; onProgress?: (fraction: number) => void },
): Promise<void> {
  const rows = windowed(read);
  const heap = windowed(read);
  const heapStart = tableOffset + image.heapOffset;
  const size = Math.abs(image.bitpix) / 8;
  const decode = async (index: number): Promise<Uint8Array> => {
    const row = tileRow(image, await rows(tableOffset + index * image.rowBytes, image.rowBytes), index);
    const pixels = tileBox(image, index).length.reduce((product, n) => product * n, 1);
    if (row.slice.length > 2 * 8 * pixels + SPARE)
      throw new Problem('compressed-damaged', `Tile ${index + 1} has more bytes than its pixels can need.`);
    const bytes = await heap(heapStart + row.slice.offset, row.slice.length);
    return decodeTile(image, row, bytes, index, pixels, inflate);
  };
  const total = image.naxis.reduce((product, n) => product * n, 1);
  const gathered = gather(out);
  for (const slab of tileSlabs(image)) {
    signal?.throwIfAborted();
    const plain = new Uint8Array(slab.pixels * size);
    for (let i = 0; i < slab.tiles; i++)
      placeTile(image, slab.firstTile + i, await decode(slab.firstTile + i), slab, plain);
    await gathered.write(plain);
    onProgress?.((slab.start + slab.pixels) / total);
  }
  await gathered.flush();
}

const inflate = (bytes: Uint8Array, maxBytes: number): Uint8Array =>
  unzipSync(bytes, { maxOutputLength: maxBytes });

/** Reads through a window, since neighbouring tiles lie beside each other. */
function windowed(read: ReadBytes): ReadBytes {
  let start = 0;
  let held = new Uint8Array(0);
  return async (offset, length) => {
    if (offset < start || offset + length > start + held.length) {
      start = offset;
      held = new Uint8Array(await read(offset, Math.max(length, WINDOW)));
    }
    if (offset + length > start + held.length)
      throw new Problem('fits-truncated', 'The file ends inside the compressed image. Send the whole file.', {
        missingBytes: offset + length - start - held.length,
      });
    return held.subarray(offset - start, offset - start + length);
  };
}

/** Small pieces are written together. */
function gather(out: FileHandle) {
  let pieces: Uint8Array[] = [];
  let bytes = 0;
  const flush = async () => {
    if (bytes > 0) await out.write(pieces.length === 1 ? pieces[0]! : Buffer.concat(pieces));
    pieces = [];
    bytes = 0;
  };
  return {
    flush,
    async write(piece: Uint8Array) {
      pieces.push(piece);
      bytes += piece.length;
      if (bytes >= WINDOW) await flush();
    },
  };
}
