import { mkdir, open, rm, type FileHandle } from 'node:fs/promises';
import { dirname } from 'node:path';
import { Problem } from '@/shared/contract/problem';
import { plainImageHeader } from '@/shared/fits/compressed/imageHeader';
import { tiledImage } from '@/shared/fits/compressed/tiledImage';
import type { CubeHead } from '@/shared/fits/cubeHead';
import { locateCube, restAfter, type FoundCube, type ReadBytes } from '@/shared/fits/findCube';
import { Header } from '@/shared/fits/header';
import { BLOCK } from '@/shared/fits/headerScan';
import { pixelBytes } from '@/shared/fits/imageData';
import { openDiskSource, type ByteSource } from './byteSource';
import { MAX_EXPANDED_BYTES, requireRoom } from './cubeHead';
import { freeBytes } from './diskSpace';
import { ExpandedBytes, isGzip } from './gunzip';
import { expandRest } from './gzipRest';
import { untile } from './untile';

export interface PlainCopyOptions {
  /** Which HDU, from 0; default the first that is a cube. */
  hdu?: number;
  /** Most bytes to expand to; default 64 GiB. */
  maxBytes?: number;
  signal?: AbortSignal;
  /** 0 … 1. */
  onProgress?: (fraction: number) => void;
}

const PIECE = 2 ** 20;

/** True when the pixels cannot be read from the file as it is: a gzip file, or a tile-compressed image. */
export const needsPlainCopy = (head: Pick<CubeHead, 'container'>): boolean =>
  (head.container ?? 'plain') !== 'plain';

/**
 * Write the cube of a gzip or tile-compressed file as a plain FITS file with that cube alone. Memory stays below 256 MB
 * whatever the file claims. When this throws, the caller removes what lies at `path`.
 *
 * @throws Problem as `readCubeHead`, compressed-damaged, too-large, disk-full; the signal's reason when it fires
 */
export async function writePlainFile(
  source: ByteSource,
  path: string,
  options: PlainCopyOptions = {},
): Promise<void> {
  await mkdir(dirname(path), { recursive: true });
  const out = await open(path, 'w');
  try {
    if (isGzip(await source.read(0, 2))) await fromGzip(source, out, path, options);
    else {
      const read: ReadBytes = (offset, length) => source.read(offset, length);
      const found = await locateCube(read, source.size, { hdu: options.hdu });
      await writeCube({ found, read, dataOffset: found.head.dataOffset }, out, path, options);
    }
  } finally {
    await out.close();
  }
}

async function fromGzip(
  source: ByteSource,
  out: FileHandle,
  path: string,
  options: PlainCopyOptions,
): Promise<void> {
  const limit = options.maxBytes ?? MAX_EXPANDED_BYTES;
  const expanded = new ExpandedBytes(source, limit);
  try {
    const found = await locateCube(expanded.read, expanded.size, { hdu: options.hdu });
    const { head } = found;
    requireRoom(head, source.size, limit);
    if (head.container === 'tiled') await untileExpanded(expanded, found, out, path, options);
    else {
      await writeCube({ found, read: expanded.read, dataOffset: head.dataOffset }, out, path, options);
      await expandRest(expanded, found.head, restAfter(found), options);
    }
  } finally {
    await expanded.close();
  }
}

/** Tiles are read in any order, so the table of a gzip file is laid down on disk first. */
async function untileExpanded(
  expanded: ExpandedBytes,
  found: FoundCube,
  out: FileHandle,
  path: string,
  options: PlainCopyOptions,
): Promise<void> {
  const tablePath = `${path}.table`;
  try {
    const table = await open(tablePath, 'w');
    try {
      await requireFree(path, found.head.dataBytes);
      await copyBytes(expanded.read, found.head.dataOffset, found.head.dataBytes, table, {
        signal: options.signal,
      });
    } finally {
      await table.close();
    }
    await expandRest(expanded, found.head, restAfter(found), options);
    const source = await openDiskSource(tablePath);
    const read: ReadBytes = (offset, length) => source.read(offset, length);
    await writeCube({ found, read, dataOffset: 0 }, out, path, options).finally(() => source.close());
  } finally {
    await rm(tablePath, { force: true });
  }
}

/** Header and pixels; `dataOffset` is where the data of the HDU lie for `read`. */
async function writeCube(
  { found, read, dataOffset }: { found: FoundCube; read: ReadBytes; dataOffset: number },
  out: FileHandle,
  path: string,
  options: PlainCopyOptions,
): Promise<void> {
  const { head, hdu } = found;
  const tiles = head.container === 'tiled' ? tiledImage(new Header(hdu.header)) : null;
  const bytes = pixelBytes(head.layout.naxis, head.bitpix);
  if (bytes > (options.maxBytes ?? MAX_EXPANDED_BYTES))
    throw new Problem(
      'too-large',
      `The cube has ${bytes} bytes when expanded; this installation expands up to ${options.maxBytes ?? MAX_EXPANDED_BYTES}.`,
    );
  await requireFree(path, bytes);
  const header = plainImageHeader(hdu.header);
  await out.write(header);
  if (tiles) await untile(tiles, read, dataOffset, out, options);
  else await copyBytes(read, dataOffset, bytes, out, options);
  await out.truncate(header.length + Math.ceil(bytes / BLOCK) * BLOCK);
}

async function copyBytes(
  read: ReadBytes,
  from: number,
  length: number,
  out: FileHandle,
  { signal, onProgress }: Pick<PlainCopyOptions, 'signal' | 'onProgress'>,
): Promise<void> {
  for (let done = 0; done < length;) {
    signal?.throwIfAborted();
    const bytes = await read(from + done, Math.min(PIECE, length - done));
    if (bytes.length === 0)
      throw new Problem(
        'fits-truncated',
        `The header declares ${length} bytes of data after byte ${from}; the file ends ${length - done} bytes too early. Send the whole file.`,
        { missingBytes: length - done },
      );
    await out.write(bytes);
    done += bytes.length;
    onProgress?.(done / length);
  }
}

async function requireFree(path: string, bytes: number): Promise<void> {
  const free = await freeBytes(dirname(path));
  if (bytes > free)
    throw new Problem(
      'disk-full',
      `The expanded cube has ${bytes} bytes, and the server has ${free} left. Ask whoever runs it for room.`,
    );
}
