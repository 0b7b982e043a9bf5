import { randomUUID } from 'node:crypto';
import { copyFile, mkdir, open, rename, rm, stat, unlink, writeFile } from 'node:fs/promises';
import { dirname, join } from 'node:path';
import { openDiskSource } from './byteSource';
import { checkKey } from './cubeKey';
import type { CubeStore } from './cubeStore';
import { missingFile } from './missingFile';

/** Cubes as files below `directory`. A file appears under its key only when it is whole. */
export function diskCubeStore(directory: string): CubeStore {
  const place = (key: string) => join(directory, checkKey(key));
  return {
    async put(key, path) {
      const to = place(key);
      await mkdir(dirname(to), { recursive: true });
      if (!(await isFile(path)) && (await isFile(to))) return;
      await flush(path);
      try {
        await rename(path, to);
      } catch (error) {
        if (code(error) !== 'EXDEV') throw error; // else: the upload folder is on another file system
        const beside = unfinished(to);
        await copyFile(path, beside).catch((e) => discard(beside, e));
        await flush(beside);
        await rename(beside, to);
        await unlink(path);
      }
    },

    async open(key) {
      try {
        return await openDiskSource(place(key));
      } catch (error) {
        throw code(error) === 'ENOENT' ? missingFile(key) : error;
      }
    },

    remove: (key) => rm(place(key), { force: true }),
    exists: (key) => isFile(place(key)),

    async writeBytes(key, bytes) {
      const to = place(key);
      await mkdir(dirname(to), { recursive: true });
      const beside = unfinished(to);
      await writeFile(beside, bytes, { flush: true }).catch((e) => discard(beside, e));
      await rename(beside, to);
    },

    close: async () => {},
  };
}

const unfinished = (path: string) => `${path}.${randomUUID()}.unfinished`;
const code = (error: unknown) => (error as NodeJS.ErrnoException).code;

async function isFile(path: string): Promise<boolean> {
  try {
    return (await stat(path)).isFile();
  } catch (error) {
    if (code(error) === 'ENOENT') return false;
    throw error;
  }
}

/** A renamed file whose bytes were still on their way to the disk would be empty after a power cut. */
async function flush(path: string): Promise<void> {
  const handle = await open(path, 'r+');
  try {
    await handle.datasync();
  } finally {
    await handle.close();
  }
}

async function discard(path: string, cause: unknown): Promise<never> {
  await rm(path, { force: true });
  throw cause;
}
