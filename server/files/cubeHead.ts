import type { ByteSource } from './byteSource';
import type { CubeHead } from '@/shared/fits/cubeHead';

/** Read the header of the first cube in a file (or of the named HDU, from 0), a few kilobytes at a time. */
export async function readCubeHead(source: ByteSource, hdu?: number): Promise<CubeHead> {
  throw new Error(`not yet: ${source.size} ${hdu}`);
}
