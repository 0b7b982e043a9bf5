import { isProblem } from '@/shared/contract/problem';
import type { CubeHead } from '@/shared/fits/cubeHead';
import { locateCube, MoreBytesNeeded } from '@/shared/fits/findCube';
import { requireRoom } from './cubeHead';
import { ExpandedBytes } from './gunzip';

/** Expanded so far in search of the cube's header; a cube further on is judged when the file is complete. */
const MOST_EXPANDED = 64 * 2 ** 20;

/**
 * Judge a gzip file by its first bytes, while the rest is still on its way: only as much is expanded as the header
 * needs, and no more than its last pieces are held in memory.
 *
 * @returns the cube's head, or null while more bytes are needed to tell
 * @throws Problem as soon as the file cannot be read as a cube
 */
export async function checkGzipBeginning(
  bytes: Uint8Array,
  fileSize: number,
  maxExpandedBytes: number,
): Promise<CubeHead | null> {
  const source = {
    size: bytes.length,
    read: async (offset: number, length: number) => bytes.subarray(offset, offset + length),
  };
  const expanded = new ExpandedBytes(source, MOST_EXPANDED, bytes.length < fileSize);
  const found = await locateCube(expanded.read, expanded.size)
    .catch((error: unknown) => {
      const isOpen = error instanceof MoreBytesNeeded || (isProblem(error) && error.type === 'too-large');
      if (isOpen) return null;
      throw error;
    })
    .finally(() => expanded.close());
  if (!found) return null;
  requireRoom(found.head, fileSize, maxExpandedBytes);
  return found.head;
}
