import { mkdir, open, readdir, rm } from 'node:fs/promises';
import { join } from 'node:path';
import { Problem } from '@/shared/contract/problem';
import { freeBytes } from '../files/diskSpace';
import type { Parts } from './context';

/** What ingest makes beside the file that was uploaded. Each can be made again from it. */
export type CopyKind = 'plain' | 'planes' | 'spectra' | 'reduced';
const KINDS: CopyKind[] = ['plain', 'planes', 'spectra', 'reduced'];

/** Room that the copies must leave on the disk. */
const SPARE_BYTES = 128 * 2 ** 20;

/**
 * The files of one attempt at reading a cube. They are written below `working/` and go to the store under keys that
 * carry the attempt's own name, so that two attempts never write the same file, and what a killed worker left is known
 * by the name that the cube's row keeps.
 */
export class WorkingFiles {
  private readonly folder: string;

  constructor(
    private readonly parts: Parts,
    private readonly cubeId: string,
    readonly attempt: string,
  ) {
    this.folder = join(parts.config.dataDir, 'working');
  }

  path = (kind: CopyKind) => join(this.folder, `${this.cubeId}.${this.attempt}.${kind}`);
  key = (kind: CopyKind) => `cubes/${this.cubeId}.${this.attempt}.${kind}`;

  /** Make a file of that size for the threads to write into. */
  async prepare(kind: CopyKind, bytes: number): Promise<string> {
    await mkdir(this.folder, { recursive: true });
    const free = await freeBytes(this.folder);
    if (bytes + SPARE_BYTES > free)
      throw new Problem(
        'disk-full',
        `Reading this cube needs ${Math.ceil(bytes / 1e6)} MB for a copy, and the worker has ${Math.floor(free / 1e6)} MB left. Ask whoever runs it for room, then try again.`,
      );
    const file = await open(this.path(kind), 'w');
    await file.truncate(bytes).finally(() => file.close());
    return this.path(kind);
  }

  /** Move a finished file into the store. */
  async keep(kind: CopyKind): Promise<string> {
    await this.parts.cubeFiles.put(this.key(kind), this.path(kind));
    return this.key(kind);
  }

  /** Remove all of this attempt, in the store too, except the named keys. */
  async discard(except: readonly (string | null)[] = []): Promise<void> {
    for (const kind of KINDS) {
      await rm(this.path(kind), { force: true });
      if (!except.includes(this.key(kind))) await this.parts.cubeFiles.remove(this.key(kind));
    }
  }

  /** Remove what earlier attempts at this cube left unfinished on this machine. */
  async clean(): Promise<void> {
    const names = await readdir(this.folder).catch(() => []);
    for (const name of names)
      if (name.startsWith(`${this.cubeId}.`) && !name.startsWith(`${this.cubeId}.${this.attempt}.`))
        await rm(join(this.folder, name), { force: true });
  }
}
