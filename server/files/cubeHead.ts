import { Problem } from '@/shared/contract/problem';
import type { CubeHead } from '@/shared/fits/cubeHead';
import {
  findCube,
  locateCube,
  withWhatFollows,
  type CubeChoice,
  type ReadBytes,
} from '@/shared/fits/findCube';
import type { ByteSource } from './byteSource';
import { expandRest } from './gzipRest';
import { ExpandedBytes, isGzip, mostExpanded } from './gunzip';

export interface HeadOptions extends CubeChoice {
  /** A gzip file that holds a larger cube is refused. */
  maxExpandedBytes?: number;
}

/** Default of MAX_EXPANDED_BYTES: 64 GiB. */
export const MAX_EXPANDED_BYTES = 64 * 2 ** 30;
/** A gzip file of up to so many expanded bytes behind the cube's header is looked through at once, the rest later. */
const LOOKED_THROUGH = 32 * 2 ** 20;

/**
 * Read the header of the first cube in a file (or of the chosen HDU and plane), a few kilobytes at a time. Gzip files
 * are expanded as far as the header, small ones to the end, which finds damage at once.
 *
 * @throws Problem as `findCube` says; compressed-damaged and too-large for gzip files
 */
export async function readCubeHead(source: ByteSource, options: HeadOptions = {}): Promise<CubeHead> {
  const choice = { hdu: options.hdu, stokes: options.stokes };
  if (!isGzip(await source.read(0, 2))) {
    return findCube((offset, length) => source.read(offset, length), source.size, choice);
  }
  const limit = options.maxExpandedBytes ?? MAX_EXPANDED_BYTES;
  const expanded = new ExpandedBytes(source, limit);
  try {
    const found = await locateCube(expanded.read, expanded.size, choice);
    requireRoom(found.head, source.size, limit);
    const isSmall = found.head.dataBytes <= LOOKED_THROUGH;
    const upTo = isSmall ? found.hdu.end + LOOKED_THROUGH : 0;
    const near: ReadBytes = async (offset, length) =>
      offset > upTo ? new Uint8Array(0) : expanded.read(offset, length);
    const { head, rest } = await withWhatFollows(found, near, expanded.size, choice.hdu === undefined);
    await expandRest(expanded, found.head, rest, { upTo });
    return { ...head, container: 'gzip' };
  } finally {
    await expanded.close();
  }
}

/** Refuse a cube that the gzip file cannot hold, or that would be too much expanded. */
export function requireRoom(head: CubeHead, gzipBytes: number, maxExpandedBytes: number): void {
  const needed = head.dataOffset + head.dataBytes;
  if (needed > maxExpandedBytes)
    throw new Problem(
      'too-large',
      `The cube has ${needed} bytes when expanded; this installation expands up to ${maxExpandedBytes}.`,
    );
  if (needed > mostExpanded(gzipBytes))
    throw new Problem(
      'fits-truncated',
      `The header declares ${head.dataBytes} bytes of data; ${gzipBytes} bytes of gzip cannot hold as many.`,
      { missingBytes: needed - mostExpanded(gzipBytes) },
    );
}
