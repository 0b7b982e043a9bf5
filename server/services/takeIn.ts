import type { CubeHead } from '@/shared/fits/cubeHead';
import { MASK_NOISES } from '@/shared/fits/cubeMaps';
import { planeByPlane, type PixelSource } from '@/shared/fits/cubeOrder';
import { buildWcs } from '@/shared/sky/wcs';
import { readCubeHead } from '../files/cubeHead';
import type { CubeCopies, CubeRow } from '../store/cubes';
import { assemble, type Assembled } from './assembleCube';
import type { Parts } from './context';
import { rearranged, reduceAll, type CubeThreads, type Pixels } from './passes';
import { THUMBNAIL_SIZE } from './thumbnails';
import type { WorkingFiles } from './workingFiles';

/** How far it is, for whoever waits. */
export interface Progress {
  progress: number;
  activity: string;
}

/** Read a whole cube: numbers, pictures and maps for the database, copies for the store. */
export async function takeIn(
  parts: Parts,
  row: CubeRow,
  files: WorkingFiles,
  threads: CubeThreads,
  state: Progress,
  signal: AbortSignal,
): Promise<Assembled & { copies: CubeCopies }> {
  const head = await readHead(parts, row);
  const { channels } = head.shape;
  const { dataDir, objectStore } = parts.config;
  const original: Pixels = {
    place: { files: { dataDir, objectStore }, key: row.fileKey },
    head: sourceOf(head),
  };
  state.activity = 'putting channels together';
  const copy = await rearranged(
    parts,
    files,
    original,
    threads,
    (share) => (state.progress += 0.3 * share),
    signal,
  );
  const began = state.progress;
  state.activity = `reading ${channels} channels`;
  const pixels = copy ?? original;
  const sampledNoise = (await threads.sample(pixels, signal)) ?? 0;
  const { velocityOf } = buildWcs(head.wcs);
  const reduction = await reduceAll(
    parts,
    files,
    pixels,
    {
      velocities: Array.from({ length: channels }, (_, k) => velocityOf(k)),
      threshold: MASK_NOISES * sampledNoise,
      sampledNoise,
      thumbnail: THUMBNAIL_SIZE,
    },
    threads,
    () => (state.progress += (0.9 - began) / channels),
    signal,
  );
  state.activity = 'drawing thumbnails';
  const { made } = reduction;
  const planes = copy !== null || made.planes;
  const [result, planesKey, spectraKey, reducedKey] = await Promise.all([
    assemble(head, reduction, signal),
    planes ? files.keep('planes') : null,
    made.spectra && files.keep('spectra'),
    made.reduced && files.keep('reduced'),
  ]);
  const layout = {
    planes: planes ? planeByPlane(pixels.head) : null,
    spectra: made.spectra,
    reduced: made.reduced,
  };
  return { ...result, copies: { planesKey, spectraKey, reducedKey, layout } };
}

const sourceOf = ({
  bitpix,
  bscale,
  bzero,
  blank,
  dataOffset,
  dataBytes,
  layout,
}: CubeHead): PixelSource => ({
  ...{ bitpix, bscale, bzero, blank, dataOffset, dataBytes, layout },
});

async function readHead(parts: Parts, row: CubeRow): Promise<CubeHead> {
  const source = await parts.cubeFiles.open(row.fileKey);
  return readCubeHead(source).finally(() => source.close());
}
