import { Problem } from '@/shared/contract/problem';
import type { Edge, TraceOutcome } from '@/shared/contract/traces';
import type { CubeHead } from '@/shared/fits/cubeHead';
import type { FittedShell } from '@/shared/shell/modelRing';
import { groupNoise, leastNoise, noiseGroups } from '@/shared/shell/trace/channelNoise';
import { traceChannel, type SectorTrace } from '@/shared/shell/trace/traceChannel';
import { traceOutcome } from '@/shared/shell/trace/traceOutcome';
import { planTrace } from '@/shared/shell/trace/tracePlan';
import { buildWcs } from '@/shared/sky/wcs';
import type { ByteSource } from './byteSource';
import { readPlanes } from './planes';

export interface CubeToTrace {
  /** Where the pixels are: plain, or an expanded copy (see plainSource.ts and the copies of a stored cube). */
  source: ByteSource;
  head: CubeHead;
  /** World coordinates and beam as the cube is understood, where they are not those of that head. */
  understood?: Pick<CubeHead, 'wcs' | 'beam'>;
}

export interface TraceRequest {
  fit: FittedShell;
  edge: Edge;
  /** Called after each channel with the share that is done; what it throws ends the trace. */
  onProgress?: (done: number) => void | Promise<void>;
}

/**
 * Trace the rim of a fitted shell through a cube, one channel in memory at a time (three while the noise is measured).
 *
 * @throws Problem invalid-input where the fit and the cube do not go together, fits-shape where the cube has no pixels to
 *         measure, fits-truncated where the file ends early
 */
export async function traceCube(
  { source, head, understood = head }: CubeToTrace,
  { fit, edge, onProgress }: TraceRequest,
): Promise<TraceOutcome> {
  const task = { shape: head.shape, wcs: buildWcs(understood.wcs), fit, edge, beam: understood.beam };
  planTrace({ ...task, noise: 0 }); // refuses before anything is read
  const plan = planTrace({ ...task, noise: await noiseOf(source, head) });
  const sectors: SectorTrace[] = [];
  const [first, last] = [plan.channels[0]!, plan.channels.at(-1)!];
  for await (const { channel, values } of readPlanes(source, head, { from: first, to: last + 1 })) {
    sectors.push(...traceChannel(plan, channel, values));
    await onProgress?.((channel - first + 1) / plan.channels.length);
  }
  return traceOutcome(plan, sectors);
}

async function noiseOf(source: ByteSource, head: CubeHead): Promise<number> {
  const groups: (number | null)[] = [];
  for (const from of noiseGroups(head.shape.channels)) {
    const planes: Float32Array[] = [];
    for await (const { values } of readPlanes(source, head, { from, to: from + 3 }))
      planes.push(Float32Array.from(values));
    groups.push(groupNoise(planes[0]!, planes[1]!, planes[2]!));
  }
  const noise = leastNoise(groups);
  if (noise === null)
    throw new Problem(
      'fits-shape',
      'The noise of this cube cannot be measured: no three neighbouring channels have pixels with different values.',
    );
  return noise;
}
