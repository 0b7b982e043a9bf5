import type { CubeHead } from '@/shared/fits/cubeHead';
import { planeStatistics, type PlaneStatistics } from '@/shared/fits/statistics';
import { blockAverage } from '@/shared/image/blockAverage';
import type { Config } from '../config';
import { makeCubeStore } from '../files/cubeStore';
import { readPlanes } from '../files/planes';

export interface ReduceTask {
  files: Pick<Config, 'dataDir' | 'objectStore'>;
  fileKey: string;
  head: CubeHead;
  /** Channels from … to − 1. */
  from: number;
  to: number;
  /** Pixels of the cube that make one pixel of a thumbnail, a side. */
  block: number;
}

export interface Reduced {
  from: number;
  statistics: PlaneStatistics[];
  /** The reduced planes, one after the other. */
  small: Float32Array;
  smallShape: { nx: number; ny: number };
  /** Sum over these channels of what is not blank, and how many that were, for each pixel of the sky. */
  sum: Float64Array;
  count: Uint32Array;
  /** Pixels that the file gives as infinite; they count as blank. */
  infinite: number;
}

/** Read some channels once and take from each plane all that ingest needs of it. Runs in a thread of its own. */
export async function reduceChannels(task: ReduceTask, onChannel: () => void): Promise<Reduced> {
  const { head, from, to, block } = task;
  const { nx, ny } = head.shape;
  const store = makeCubeStore(task.files);
  const source = await store.open(task.fileKey);
  const smallShape = { nx: Math.ceil(nx / block), ny: Math.ceil(ny / block) };
  const result: Reduced = {
    from,
    statistics: [],
    small: new Float32Array(smallShape.nx * smallShape.ny * (to - from)),
    smallShape,
    sum: new Float64Array(nx * ny),
    count: new Uint32Array(nx * ny),
    infinite: 0,
  };
  const scratch = new Float64Array(nx * ny);
  try {
    for await (const { channel, values, infinite } of readPlanes(source, head, { from, to })) {
      const plane = values as Float32Array;
      result.statistics.push(planeStatistics(plane, scratch));
      result.small.set(
        blockAverage(plane, nx, ny, block).plane,
        (channel - from) * smallShape.nx * smallShape.ny,
      );
      addTo(result, plane);
      result.infinite += infinite;
      onChannel();
    }
  } finally {
    await source.close();
    await store.close();
  }
  return result;
}

function addTo({ sum, count }: Reduced, plane: Float32Array) {
  for (let i = 0; i < plane.length; i++) {
    const value = plane[i]!;
    if (value - value !== 0) continue; // blank
    sum[i]! += value;
    count[i]!++;
  }
}
