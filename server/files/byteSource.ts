import { open } from 'node:fs/promises';

/** Bytes that can be read in slices, wherever they lie. */
export interface ByteSource {
  readonly size: number;
  /** Bytes offset … offset + length, fewer only at the end of the source. */
  read(offset: number, length: number): Promise<Uint8Array>;
  /** Fill `target` from `offset` on; true when there were bytes enough. For large reads into memory that is used again. */
  readInto?(target: Uint8Array, offset: number): Promise<boolean>;
  close(): Promise<void>;
}

/** A file on disk as a byte source. The caller closes it. */
export async function openDiskSource(path: string): Promise<ByteSource> {
  const handle = await open(path, 'r');
  const { size } = await handle.stat();
  async function fill(target: Uint8Array, offset: number): Promise<number> {
    let filled = 0;
    while (filled < target.length) {
      const { bytesRead } = await handle.read(target, filled, target.length - filled, offset + filled);
      if (bytesRead === 0) break; // the file ends here
      filled += bytesRead;
    }
    return filled;
  }
  return {
    size,
    async read(offset, length) {
      const wanted = Math.max(0, Math.min(length, size - offset));
      const bytes = new Uint8Array(wanted);
      const filled = await fill(bytes, offset);
      return filled === wanted ? bytes : bytes.subarray(0, filled);
    },
    readInto: async (target, offset) => (await fill(target, offset)) === target.length,
    close: () => handle.close(),
  };
}
