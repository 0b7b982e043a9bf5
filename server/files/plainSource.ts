import { randomUUID } from 'node:crypto';
import { rm } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import type { CubeHead } from '@/shared/fits/cubeHead';
import { openDiskSource, type ByteSource } from './byteSource';
import { readCubeHead, type HeadOptions } from './cubeHead';
import { needsPlainCopy, writePlainFile } from './plainCopy';

/** A cube ready to read pixels from. */
export interface PlainSource {
  /** The cube as the original file has it. */
  head: CubeHead;
  /** Where its pixels are, for readPlanes and the like: the file itself, or an expanded copy. */
  pixels: { source: ByteSource; head: CubeHead };
  /** Removes the copy; the original source stays open. */
  close(): Promise<void>;
}

/** Open a cube of any container for one look: a gzip or tile-compressed file is expanded into a temporary file. */
export async function openPlain(source: ByteSource, options: HeadOptions = {}): Promise<PlainSource> {
  const head = await readCubeHead(source, options);
  if (!needsPlainCopy(head)) return { head, pixels: { source, head }, close: async () => undefined };
  const path = join(tmpdir(), `${randomUUID()}.plain`);
  const drop = () => rm(path, { force: true });
  try {
    await writePlainFile(source, path, { hdu: options.hdu, maxBytes: options.maxExpandedBytes });
    const plain = await openDiskSource(path);
    const pixels = { source: plain, head: await readCubeHead(plain, { stokes: options.stokes }) };
    return { head, pixels, close: () => plain.close().finally(drop) };
  } catch (error) {
    await drop();
    throw error;
  }
}
