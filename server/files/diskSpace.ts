import { statfs } from 'node:fs/promises';
import { dirname } from 'node:path';

/** Bytes that may still be written below a folder, which need not exist yet. */
export async function freeBytes(directory: string): Promise<number> {
  try {
    const { bavail, bsize } = await statfs(directory);
    return bavail * bsize;
  } catch (error) {
    const above = dirname(directory);
    if ((error as NodeJS.ErrnoException).code !== 'ENOENT' || above === directory) throw error;
    return freeBytes(above);
  }
}
