import { createHash } from 'node:crypto';
import type { ByteSource } from './byteSource';

const SLICE_BYTES = 4 * 2 ** 20;

/** SHA-256 of a file, hexadecimal, read in slices. */
export async function checksumOf(source: ByteSource): Promise<string> {
  const hash = createHash('sha256');
  for (let offset = 0; offset < source.size; offset += SLICE_BYTES)
    hash.update(await source.read(offset, SLICE_BYTES));
  return hash.digest('hex');
}
