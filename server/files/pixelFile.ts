import { Problem } from '@/shared/contract/problem';
import type { Config } from '../config';
import { openDiskSource, type ByteSource } from './byteSource';
import { makeCubeStore } from './cubeStore';

/** Where pixels lie, in words that can be sent to a thread: a file of the store, or one that is being made. */
export type PixelPlace = { files: Pick<Config, 'dataDir' | 'objectStore'>; key: string } | { path: string };

/** Open it, do the work, and close all again. */
export async function withPixels<T>(place: PixelPlace, work: (source: ByteSource) => Promise<T>): Promise<T> {
  if ('path' in place) {
    const source = await openDiskSource(place.path);
    return work(source).finally(() => source.close());
  }
  const store = makeCubeStore(place.files);
  try {
    const source = await store.open(place.key);
    return await work(source).finally(() => source.close());
  } finally {
    await store.close();
  }
}

/** Fill the target from the file. @throws Problem fits-truncated when the file ends early */
export async function fillFrom(source: ByteSource, target: Uint8Array, offset: number): Promise<void> {
  if (source.readInto) {
    if (await source.readInto(target, offset)) return;
  } else {
    const bytes = await source.read(offset, target.length);
    target.set(bytes);
    if (bytes.length === target.length) return;
  }
  const missing = Math.max(1, offset + target.length - source.size);
  throw new Problem('fits-truncated', `The file ends ${missing} bytes too early.`, { missingBytes: missing });
}
