import type { CubeHead } from '@/shared/fits/cubeHead';
import type { ByteSource } from '../files/byteSource';
import type { PixelPlace } from '../files/pixelFile';
import { readSpectra, readSpectraFromPlanes, type SpectrumVisitor } from '../files/spectra';
import type { CubeRow } from '../store/cubes';
import type { Parts } from './context';

type Ready = CubeRow & { head: CubeHead };

/** Where the cube's channels are one piece each: its own file, or the copy that ingest made. */
function planesOf({ planesKey, fileKey, layout, head }: Ready): { key: string; head: CubeHead } {
  const copied = planesKey !== null && layout?.planes;
  return copied
    ? { key: planesKey, head: { ...head, ...copied, container: 'plain' } }
    : { key: fileKey, head };
}

/** The same for a thread, which opens the file itself. */
export function planesPlace(
  { config: { dataDir, objectStore } }: Pick<Parts, 'config'>,
  row: Ready,
): { place: PixelPlace; head: CubeHead } {
  const { key, head } = planesOf(row);
  return { place: { files: { dataDir, objectStore }, key }, head };
}

export async function withPlanes<T>(
  parts: Pick<Parts, 'cubeFiles'>,
  row: Ready,
  work: (source: ByteSource, head: CubeHead) => Promise<T>,
): Promise<T> {
  const { key, head } = planesOf(row);
  const source = await parts.cubeFiles.open(key);
  return work(source, head).finally(() => source.close());
}

/** The spectra of some pixels (y · nx + x, each once), from the copy in tiles where there is one. */
export async function visitSpectra(
  parts: Pick<Parts, 'cubeFiles'>,
  row: Ready,
  pixels: Iterable<number>,
  visit: SpectrumVisitor,
): Promise<void> {
  const tiles = row.spectraKey !== null && row.layout?.spectra;
  if (!tiles)
    return withPlanes(parts, row, (source, head) => readSpectraFromPlanes(source, head, pixels, visit));
  const source = await parts.cubeFiles.open(row.spectraKey!);
  const head = { ...row.head, ...row.layout?.planes }; // a compressed file may store pixels otherwise
  return readSpectra(source, head, tiles.slab, pixels, visit).finally(() => source.close());
}
