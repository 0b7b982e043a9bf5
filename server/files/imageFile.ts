import { open, rename, rm, type FileHandle } from 'node:fs/promises';
import { MAX_EXPANDED_IMAGE_BYTES, MAX_IMAGE_PIXELS } from '@/shared/contract/images';
import { Problem } from '@/shared/contract/problem';
import { plainImageHeader } from '@/shared/fits/compressed/imageHeader';
import { tiledImage } from '@/shared/fits/compressed/tiledImage';
import { decodePixels } from '@/shared/fits/decode';
import { findImage, type FoundImage } from '@/shared/fits/findImage';
import { Header } from '@/shared/fits/header';
import { BLOCK, scanHeader } from '@/shared/fits/headerScan';
import type { ImageHead } from '@/shared/fits/imageHead';
import { pixelBytes } from '@/shared/fits/imageData';
import { openDiskSource, type ByteSource } from './byteSource';
import { ExpandedBytes, isGzip } from './gunzip';
import { untile } from './untile';

const PIECE = 2 ** 20;

/**
 * Read the image of the sky in a file on disk. Of a compressed file (gzip, or tiles inside FITS) a plain copy is laid
 * down at `copyPath`; then the head says where the pixels lie in the copy, and `hdu` where the image was in the file.
 * Memory stays below some 70 MB whatever the file claims. When this throws, the caller removes both files.
 *
 * @throws Problem as `findImage`; compressed-damaged; too-large for what is too large when expanded; fits-image when
 *         the image has more pixels than are read, or every one of them is blank
 */
export async function readImageFile(
  path: string,
  copyPath: string,
  { maxExpandedBytes = MAX_EXPANDED_IMAGE_BYTES, maxPixels = MAX_IMAGE_PIXELS } = {},
): Promise<{ head: ImageHead; isCopied: boolean }> {
  const isPacked = await withFile(path, async (source) => {
    if (!isGzip(await source.read(0, 2))) return false;
    await expand(source, copyPath, maxExpandedBytes);
    return true;
  });
  const plainPath = isPacked ? copyPath : path;
  const found = await withFile(plainPath, find);
  requireFewPixels(found.head, maxPixels);
  const isTiled = found.head.container === 'tiled';
  if (isTiled) await untileInto(plainPath, copyPath, found, maxExpandedBytes);
  const head = isTiled ? await asStored(copyPath, found.head) : found.head;
  await withFile(isTiled ? copyPath : plainPath, (source) => requireNumbers(source, head));
  return { head, isCopied: isPacked || isTiled };
}

const find = (source: ByteSource) => findImage((offset, length) => source.read(offset, length), source.size);

async function withFile<T>(path: string, work: (source: ByteSource) => Promise<T>): Promise<T> {
  const source = await openDiskSource(path);
  return work(source).finally(() => source.close());
}

/** The whole of a gzip file, to its end, which compares the checksums. */
async function expand(source: ByteSource, path: string, maxBytes: number): Promise<void> {
  const expanded = new ExpandedBytes(source, maxBytes);
  const out = await open(path, 'w');
  try {
    scanHeader(await expanded.read(0, BLOCK), 'primary'); // what is no FITS is not expanded any further
    for (let at = 0; ; at += PIECE) {
      const bytes = await expanded.read(at, PIECE);
      if (bytes.length === 0) break;
      await out.write(bytes);
    }
  } finally {
    await out.close();
    await expanded.close();
  }
}

async function untileInto(from: string, to: string, found: FoundImage, maxBytes: number): Promise<void> {
  const { head, hdu } = found;
  const bytes = pixelBytes(head.layout.naxis, head.bitpix);
  if (bytes > maxBytes)
    throw new Problem(
      'too-large',
      `The image has ${bytes} bytes when expanded; at most ${maxBytes} are read. Average it to larger pixels first.`,
    );
  const beside = `${to}.image`; // the table may lie at `to` itself
  try {
    const out: FileHandle = await open(beside, 'w');
    try {
      const header = plainImageHeader(hdu.header);
      await out.write(header);
      await withFile(from, (source) =>
        untile(
          tiledImage(new Header(hdu.header)),
          (offset, length) => source.read(offset, length),
          head.dataOffset,
          out,
          {},
        ),
      );
      await out.truncate(header.length + Math.ceil(bytes / BLOCK) * BLOCK);
    } finally {
      await out.close();
    }
    await rename(beside, to);
  } finally {
    await rm(beside, { force: true });
  }
}

/** What was said of the file, with the place of the pixels in the copy. */
async function asStored(copyPath: string, { hdu, cautions, cards }: ImageHead): Promise<ImageHead> {
  const { head } = await withFile(copyPath, find);
  return { ...head, hdu, cautions, cards };
}

function requireFewPixels({ shape: { nx, ny } }: ImageHead, maxPixels: number): void {
  if (nx * ny <= maxPixels) return;
  throw new Problem(
    'too-large',
    `The image has ${nx} by ${ny} pixels; at most ${maxPixels} are read. Cut it to the sky of the region, or average it to larger pixels.`,
  );
}

async function requireNumbers(source: ByteSource, head: ImageHead): Promise<void> {
  const size = Math.abs(head.bitpix) / 8;
  const values = new Float64Array(PIECE / size);
  for (let at = 0; at < head.dataBytes; at += PIECE) {
    const bytes = await source.read(head.dataOffset + at, Math.min(PIECE, head.dataBytes - at));
    decodePixels(bytes, head, values);
    for (let i = 0; i < bytes.length / size; i++) if (!Number.isNaN(values[i]!)) return;
  }
  throw new Problem(
    'fits-image',
    'Every pixel of the image is blank: there is nothing to show. Send a file with numbers in it.',
  );
}
