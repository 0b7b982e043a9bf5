import { closeSync, openSync, writeSync } from 'node:fs';
import { addPlane, MAP_BYTES, newMapSums, type MapSums } from '@/shared/fits/cubeMaps';
import { shapeOf, stridesOf, type PixelSource } from '@/shared/fits/cubeOrder';
import { decodePixels } from '@/shared/fits/decode';
import { gatherTile, slabOffset, TILE, tileCount, type SpectraTiles } from '@/shared/fits/spectraTiles';
import { channelStatistics, type PlaneStatistics } from '@/shared/fits/statistics';
import { blockAverage } from '@/shared/image/blockAverage';
import { fillFrom, withPixels, type PixelPlace } from '../files/pixelFile';

export interface ReduceTask {
  place: PixelPlace;
  /** Plane by plane. */
  head: PixelSource;
  /** Channels from … to − 1; `from` begins a slab. */
  from: number;
  to: number;
  /** Channels read in one piece, and the depth of a slab of the copy of spectra. */
  slab: number;
  /** Pixels of the cube that make one pixel of a thumbnail, a side. */
  block: number;
  /** Receives the reduced planes of all channels: memory shared by the threads. */
  small: Float32Array;
  /** Velocity of each channel of the cube, km/s, from one near its middle. */
  velocities: number[];
  /** Brightness from which a pixel counts for velocity and dispersion. */
  threshold: number;
  /** Files to write along; null: not wanted. All are of full size already. */
  copies: {
    planes: string | null;
    spectra: string | null;
    reduced: { path: string; block: number } | null;
  };
}

export interface Reduced {
  from: number;
  statistics: (PlaneStatistics & { median: number | null })[];
  maps: MapSums;
  /** Pixels that the file gives as infinite; they count as blank. */
  infinite: number;
}

/** Memory that one thread needs for this beside the slab, bytes for each pixel of the sky: maps, plane, selection. */
export const PIXEL_BYTES = MAP_BYTES + 4 + 8;

/** Read some channels once and take from each plane all that ingest needs of it. Runs in a thread of its own. */
export async function reduceChannels(task: ReduceTask, onChannel: () => void): Promise<Reduced> {
  const { head, from, to, slab } = task;
  const { nx, ny } = shapeOf(head);
  const planeBytes = (nx * ny * Math.abs(head.bitpix)) / 8;
  const raw = new Uint8Array(Math.min(slab, to - from) * planeBytes);
  const reduction = new PlaneReduction(task);
  const copies = new CopyWriter(task);
  try {
    await withPixels(task.place, async (source) => {
      const { start, channel: stride } = stridesOf(head);
      const strideBytes = (stride * Math.abs(head.bitpix)) / 8;
      for (let first = from; first < to; first += slab) {
        const depth = Math.min(slab, to - first);
        if (strideBytes === planeBytes)
          await fillFrom(source, raw.subarray(0, depth * planeBytes), start + first * planeBytes);
        else
          for (let k = 0; k < depth; k++)
            await fillFrom(
              source,
              raw.subarray(k * planeBytes, (k + 1) * planeBytes),
              start + (first + k) * strideBytes,
            );
        for (let k = 0; k < depth; k++) {
          const plane = reduction.add(first + k, raw.subarray(k * planeBytes, (k + 1) * planeBytes));
          copies.addReduced(first + k, plane);
          onChannel();
        }
        copies.addSlab(first, depth, raw.subarray(0, depth * planeBytes));
      }
    });
  } finally {
    copies.close();
  }
  return reduction.result;
}

/** Numbers from one plane after the other. */
class PlaneReduction {
  readonly result: Reduced;
  private readonly stored: Float32Array;
  private readonly plane: Float32Array;
  private readonly scratch: Float64Array;

  constructor(private readonly task: ReduceTask) {
    const { nx, ny } = shapeOf(task.head);
    this.result = { from: task.from, statistics: [], maps: newMapSums(nx * ny), infinite: 0 };
    this.stored = new Float32Array(nx * ny);
    this.plane = stridesOf(task.head).y >= stridesOf(task.head).x ? this.stored : new Float32Array(nx * ny);
    this.scratch = new Float64Array(nx * ny);
  }

  add(channel: number, bytes: Uint8Array): Float32Array {
    const { head, block, small, velocities, threshold } = this.task;
    const { nx, ny } = shapeOf(head);
    this.result.infinite += decodePixels(bytes, head, this.stored);
    if (this.plane !== this.stored)
      for (let y = 0; y < ny; y++)
        for (let x = 0; x < nx; x++) this.plane[y * nx + x] = this.stored[x * ny + y]!;
    this.result.statistics.push(channelStatistics(this.plane, this.scratch));
    addPlane(this.result.maps, this.plane, velocities[channel]!, threshold);
    const reduced = blockAverage(this.plane, nx, ny, block);
    small.set(reduced.plane, channel * reduced.nx * reduced.ny);
    return this.plane;
  }
}

/** Writes the copies that are made on the way: in this thread, in pieces of a few kilobytes and more. */
class CopyWriter {
  private readonly files = new Map<string, number>();
  private readonly tile: Uint8Array;
  private readonly tiles: SpectraTiles;

  constructor(private readonly task: ReduceTask) {
    const { bitpix } = task.head;
    this.tiles = { ...shapeOf(task.head), slab: task.slab, bitpix };
    this.tile = new Uint8Array((TILE * TILE * task.slab * Math.abs(bitpix)) / 8);
    const { planes, spectra, reduced } = task.copies;
    for (const path of [planes, spectra, reduced?.path]) if (path) this.files.set(path, openSync(path, 'r+'));
  }

  addReduced(channel: number, plane: Float32Array) {
    const { reduced } = this.task.copies;
    if (!reduced) return;
    const { nx, ny } = shapeOf(this.task.head);
    const { plane: values } = blockAverage(plane, nx, ny, reduced.block);
    const bytes = new Uint8Array(values.buffer, values.byteOffset, values.byteLength);
    writeSync(this.files.get(reduced.path)!, bytes, 0, bytes.length, channel * bytes.length);
  }

  addSlab(first: number, depth: number, raw: Uint8Array) {
    const { head, copies } = this.task;
    if (copies.planes)
      writeSync(this.files.get(copies.planes)!, raw, 0, raw.length, first * (raw.length / depth));
    if (!copies.spectra) return;
    const { nx, ny } = shapeOf(head);
    const { x, y } = stridesOf(head);
    const file = this.files.get(copies.spectra)!;
    const bytes = (TILE * TILE * depth * Math.abs(head.bitpix)) / 8;
    for (let tile = 0; tile < tileCount(this.tiles); tile++) {
      gatherTile(raw, this.tile, this.tiles, tile, depth, { x, y, plane: nx * ny });
      writeSync(file, this.tile, 0, bytes, slabOffset(this.tiles, tile, first));
    }
  }

  close() {
    for (const file of this.files.values()) closeSync(file);
  }
}
