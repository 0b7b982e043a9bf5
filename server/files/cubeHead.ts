import type { CubeHead } from '@/shared/fits/cubeHead';
import { findCube } from '@/shared/fits/findCube';
import type { ByteSource } from './byteSource';

/**
 * Read the header of the first cube in a file (or of the named HDU, from 0), a few kilobytes at a time.
 *
 * @throws Problem as `findCube` says
 */
export function readCubeHead(source: ByteSource, hdu?: number): Promise<CubeHead> {
  return findCube((offset, length) => source.read(offset, length), source.size, { hdu });
}
