import type { Mark } from '@/shared/contract/readings';
import type { Edge, TraceOutcome } from '@/shared/contract/traces';
import type { CubeHead } from '@/shared/fits/cubeHead';
import type { FittedShell } from '@/shared/shell/modelRing';
import { tracedInput } from '@/shared/shell/trace/traceOutcome';
import { buildWcs } from '@/shared/sky/wcs';
import { withPixels, type PixelPlace } from '../files/pixelFile';
import { traceCube } from '../files/traceCube';

/** What a thread is told, so that it can trace a rim by itself. */
export interface RimTask {
  place: PixelPlace;
  head: CubeHead;
  fit: FittedShell;
  edge: Edge;
}
export interface TracedRim {
  outcome: TraceOutcome;
  /** Of the sectors in which a rim was found: the reading that is made of it. */
  marks: Mark[];
}

/** @throws Problem where the fit cannot guide a trace, or too little of a rim was found to be fitted */
export function traceInCube(
  { place, head, fit, edge }: RimTask,
  onProgress: (done: number) => void,
): Promise<TracedRim> {
  return withPixels(place, async (source) => {
    const outcome = await traceCube({ source, head }, { fit, edge, onProgress });
    tracedInput(outcome, buildWcs(head.wcs).velocityStep); // refuses a rim that no fit could be made of
    return { outcome, marks: marksOf(outcome) };
  });
}

const marksOf = ({ sectors }: TraceOutcome): Mark[] =>
  sectors.flatMap(({ channel, x, y, sigma, rejected }) =>
    rejected === null && x !== null && y !== null && sigma !== null ? [{ channel, x, y, sigma }] : [],
  );
