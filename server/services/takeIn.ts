import type { CubeHead } from '@/shared/fits/cubeHead';
import { MASK_NOISES } from '@/shared/fits/cubeMaps';
import { planeByPlane, type PixelSource } from '@/shared/fits/cubeOrder';
import { buildWcs } from '@/shared/sky/wcs';
import { openDiskSource } from '../files/byteSource';
import { readCubeHead } from '../files/cubeHead';
import { needsPlainCopy, writePlainFile } from '../files/plainCopy';
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
  const original = await plainPixels(parts, row, head, files, state, signal);
  state.activity = 'putting channels together';
  const copy = await rearranged(
    parts,
    files,
    original,
    threads,
    (done) => (state.progress += 0.3 * done),
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
      copies: true,
    },
    threads,
    () => (state.progress += (0.9 - began) / channels),
    signal,
  );
  state.activity = 'drawing thumbnails';
  const { made } = reduction;
  const planes = copy || made.planes ? 'planes' : 'path' in original.place ? 'plain' : null;
  const [result, planesKey, spectraKey, reducedKey] = await Promise.all([
    assemble(head, reduction, signal),
    planes && files.keep(planes),
    made.spectra && files.keep('spectra'),
    made.reduced && files.keep('reduced'),
  ]);
  const layout = {
    planes: planes && (planes === 'plain' ? original.head : planeByPlane(pixels.head)),
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

/** Which image of the file, and which plane of it: chosen by a person, or the first. */
const choiceOf = ({ sourceHdu, sourceStokes }: CubeRow) =>
  sourceHdu === null ? {} : { hdu: sourceHdu, stokes: sourceStokes };

async function readHead(parts: Parts, row: CubeRow): Promise<CubeHead> {
  const source = await parts.cubeFiles.open(row.fileKey);
  const { maxExpandedBytes } = parts.config;
  return readCubeHead(source, { ...choiceOf(row), maxExpandedBytes }).finally(() => source.close());
}

/** The pixels in the uploaded file, or, where that is compressed, in a plain copy made of it here. */
async function plainPixels(
  parts: Parts,
  row: CubeRow,
  head: CubeHead,
  files: WorkingFiles,
  state: Progress,
  signal: AbortSignal,
): Promise<Pixels> {
  const { dataDir, objectStore, maxExpandedBytes } = parts.config;
  if (!needsPlainCopy(head))
    return { place: { files: { dataDir, objectStore }, key: row.fileKey }, head: sourceOf(head) };
  state.activity = 'expanding the file';
  const path = files.path('plain');
  const packed = await parts.cubeFiles.open(row.fileKey);
  await writePlainFile(packed, path, {
    hdu: head.hdu,
    maxBytes: maxExpandedBytes,
    signal,
    onProgress: (done) => (state.progress = 0.3 * done),
  }).finally(() => packed.close());
  const plain = await openDiskSource(path);
  const { stokes } = choiceOf(row);
  const found = await readCubeHead(plain, { stokes }).finally(() => plain.close());
  return { place: { path }, head: sourceOf(found) };
}
