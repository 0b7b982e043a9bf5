import { loadConfig } from '@/server/config';
import { readCubeHead } from '@/server/files/cubeHead';
import { openDiskSource } from '@/server/files/byteSource';
import { makeParts } from '@/server/services/parts';
import { rearranged, reduceAll, type Pixels } from '@/server/services/passes';
import { WorkingFiles } from '@/server/services/workingFiles';
import { buildWcs } from '@/shared/sky/wcs';
import { makePool } from '@/workers/pool';
import { cubeThreads } from '@/workers/threads';

/**
 * Seconds that two threads need for the numbers of a cube: everything that ingest takes from its pixels, without the
 * copies that ingest also writes for quick looking, pictures, database and store. A cube whose channels are scattered
 * over the file is rewritten first, and that counts. The threads are warm, as those of a worker that has read a cube.
 */
export async function numericPass(path: string, dataDir: string): Promise<number> {
  const parts = makeParts(
    loadConfig({ NODE_ENV: 'test', DATABASE_URL: 'postgres://nobody@127.0.0.1:1/none', DATA_DIR: dataDir }),
    'worker',
  );
  const pool = makePool(2);
  const files = new WorkingFiles(parts, 'numeric', 'pass');
  try {
    const threads = cubeThreads(pool);
    const source = await openDiskSource(path);
    const head = await readCubeHead(source).finally(() => source.close());
    const { velocityOf } = buildWcs(head.wcs);
    const signal = new AbortController().signal;
    const original: Pixels = { place: { path }, head };
    await Promise.all([threads.sample(original, signal), threads.sample(original, signal)]);
    const began = performance.now();
    const copy = await rearranged(parts, files, original, threads, () => undefined, signal);
    const noise = (await threads.sample(copy ?? original, signal)) ?? 0;
    await reduceAll(
      parts,
      files,
      copy ?? original,
      {
        velocities: Array.from({ length: head.shape.channels }, (_, k) => velocityOf(k)),
        threshold: 3 * noise,
        sampledNoise: noise,
        thumbnail: 96,
        copies: false,
      },
      threads,
      () => undefined,
      signal,
    );
    return (performance.now() - began) / 1000;
  } finally {
    await files.discard();
    await pool.destroy();
    await parts.db.destroy();
  }
}
