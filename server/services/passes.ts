import { isPlaneByPlane, planeByPlane, shapeOf, type PixelSource } from '@/shared/fits/cubeOrder';
import { blockFor } from '@/shared/image/blockAverage';
import type { PixelPlace } from '../files/pixelFile';
import type { Parts } from './context';
import { slowestAxis, type RearrangeTask } from './rearrangeCube';
import { PIXEL_BYTES, type Reduced, type ReduceTask } from './reduceCube';
import type { SampleTask } from './sampleNoise';
import type { WorkingFiles } from './workingFiles';

/** What threads do for ingest; each rejects when the signal fires. */
export interface CubeThreads {
  rearrange(task: RearrangeTask, onStep: (steps: number) => void, signal: AbortSignal): Promise<void>;
  sample(task: SampleTask, signal: AbortSignal): Promise<number | null>;
  reduce(task: ReduceTask, onChannel: () => void, signal: AbortSignal): Promise<Reduced>;
}

/** Where pixels are read from, and how they lie there. */
export interface Pixels {
  place: PixelPlace;
  head: PixelSource;
}

/** Deepest slab of the copy of spectra. */
const MOST_SLAB = 32;
/** Most bytes of one: more is no quicker, and Node itself needs room for each thread. */
const MOST_SLAB_BYTES = 48 * 2 ** 20;
/** Cubes with fewer bytes than this are read as a whole for a spectrum or a cut. */
const SPECTRA_FROM_BYTES = 2 ** 20;
/** Reduced planes have at most this many pixels a side, and are kept where they are a sixteenth of the cube or less. */
export const REDUCED_SIZE = 256;
const REDUCED_FROM_BLOCK = 4;

/** Parts of 0 … n, cut at multiples of `step`. */
function sharesOf(n: number, shares: number, step = 1): [number, number][] {
  const steps = Math.ceil(n / step);
  const count = Math.min(shares, steps);
  const cut = (i: number) => Math.min(n, Math.round((i * steps) / count) * step);
  return Array.from({ length: count }, (_, i) => [cut(i), cut(i + 1)]);
}

/** Write the cube plane by plane where a channel is not one piece of the file; else leave it as it is. */
export async function rearranged(
  parts: Parts,
  files: WorkingFiles,
  pixels: Pixels,
  threads: CubeThreads,
  onDone: (share: number) => void,
  signal: AbortSignal,
): Promise<Pixels | null> {
  const { head, place: from } = pixels;
  if (isPlaneByPlane(head)) return null;
  const target = planeByPlane(head);
  const to = await files.prepare('planes', target.dataBytes);
  const { workerThreads, workerMemoryBytes } = parts.config;
  const { steps } = slowestAxis(head);
  await Promise.all(
    sharesOf(steps, workerThreads).map((share) =>
      threads.rearrange(
        { from, head, to, share, memoryBytes: workerMemoryBytes / workerThreads },
        (done) => onDone(done / steps),
        signal,
      ),
    ),
  );
  return { place: { path: to }, head: target };
}

export interface Reduction {
  reduced: Reduced[];
  small: { planes: Float32Array; nx: number; ny: number; channels: number };
  /** Brightness below which a pixel does not count for velocity and dispersion, and the noise it comes from. */
  threshold: number;
  sampledNoise: number;
  /** What the velocities of the maps are counted from, km/s. */
  origin: number;
  made: { planes: boolean; spectra: { slab: number } | null; reduced: { block: number } | null };
}

/** Read every pixel once: numbers, thumbnails, and the copies that are written on the way where they are wanted. */
export async function reduceAll(
  parts: Parts,
  files: WorkingFiles,
  pixels: Pixels,
  given: {
    velocities: number[];
    threshold: number;
    sampledNoise: number;
    thumbnail: number;
    copies: boolean;
  },
  threads: CubeThreads,
  onChannel: () => void,
  signal: AbortSignal,
): Promise<Reduction> {
  const { head, place } = pixels;
  const { nx, ny, channels } = shapeOf(head);
  const bytes = (nx * ny * channels * Math.abs(head.bitpix)) / 8;
  const { slab, shares } = sizing(parts, head);
  const block = blockFor(nx, ny, given.thumbnail);
  const small = { nx: Math.ceil(nx / block), ny: Math.ceil(ny / block), channels };
  const planes = new Float32Array(new SharedArrayBuffer(4 * small.nx * small.ny * channels));
  const origin = given.velocities[channels >> 1]!;
  const reducedBlock = blockFor(nx, ny, REDUCED_SIZE);
  const made = {
    planes: given.copies && 'key' in place && bytes > parts.config.copyFromBytes,
    spectra: given.copies && bytes >= SPECTRA_FROM_BYTES ? { slab } : null,
    reduced: given.copies && reducedBlock >= REDUCED_FROM_BLOCK ? { block: reducedBlock } : null,
  };
  const tiles = Math.ceil(nx / 8) * Math.ceil(ny / 8);
  const copies: ReduceTask['copies'] = {
    planes: made.planes ? await files.prepare('planes', bytes) : null,
    spectra:
      made.spectra && (await files.prepare('spectra', (tiles * 64 * channels * Math.abs(head.bitpix)) / 8)),
    reduced: made.reduced && {
      ...made.reduced,
      path: await files.prepare(
        'reduced',
        4 * channels * Math.ceil(nx / reducedBlock) * Math.ceil(ny / reducedBlock),
      ),
    },
  };
  const task = {
    ...{ place, head, slab, block, copies, small: planes },
    velocities: given.velocities.map((v) => v - origin),
    threshold: given.threshold,
  };
  const reduced = await Promise.all(
    sharesOf(channels, shares, slab).map(([from, to]) =>
      threads.reduce({ ...task, from, to }, onChannel, signal),
    ),
  );
  return {
    ...{ reduced, origin, made },
    small: { ...small, planes },
    threshold: given.threshold,
    sampledNoise: given.sampledNoise,
  };
}

/**
 * How deep a slab may be within the memory, and how many threads there is room for. A single plane that needs more
 * than all of the memory is read all the same, one thread, one channel at a time.
 */
function sizing(parts: Parts, head: PixelSource): { slab: number; shares: number } {
  const { nx, ny, channels } = shapeOf(head);
  const { workerThreads, workerMemoryBytes } = parts.config;
  const planeBytes = (nx * ny * Math.abs(head.bitpix)) / 8;
  const fixed = nx * ny * PIXEL_BYTES;
  const fits = Math.floor(workerMemoryBytes / (fixed + planeBytes));
  const shares = Math.max(1, Math.min(workerThreads, channels, fits));
  const room = Math.floor(Math.min(MOST_SLAB_BYTES, workerMemoryBytes / workerThreads - fixed) / planeBytes);
  const even = Math.ceil(channels / shares);
  return { slab: Math.max(1, Math.min(MOST_SLAB, room, even)), shares };
}
