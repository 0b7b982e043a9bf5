import { open } from 'node:fs/promises';

/** Bytes that can be read in slices, wherever they lie. */
export interface ByteSource {
  readonly size: number;
  /** Bytes offset … offset + length, fewer only at the end of the source. */
  read(offset: number, length: number): Promise<Uint8Array>;
  close(): Promise<void>;
}

/** A file on disk as a byte source. The caller closes it. */
export async function openDiskSource(path: string): Promise<ByteSource> {
  const handle = await open(path, 'r');
  const { size } = await handle.stat();
  return {
    size,
    async read(offset, length) {
      const wanted = Math.max(0, Math.min(length, size - offset));
      const bytes = new Uint8Array(wanted);
      let filled = 0;
      while (filled < wanted) {
        const { bytesRead } = await handle.read(bytes, filled, wanted - filled, offset + filled);
        if (bytesRead === 0) break; // the file shrank while it was read
        filled += bytesRead;
      }
      return filled === wanted ? bytes : bytes.subarray(0, filled);
    },
    close: () => handle.close(),
  };
}
