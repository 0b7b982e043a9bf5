import type { Edge, TraceOutcome } from '@/shared/contract/traces';
import type { FitInput } from '@/shared/shell/fitInput';
import type { FittedShell } from '@/shared/shell/modelRing';
import { tracedInput } from '@/shared/shell/trace/traceOutcome';
import { buildWcs } from '@/shared/sky/wcs';
import type { ByteSource } from '@/server/files/byteSource';
import { openPlain } from '@/server/files/plainSource';
import { traceCube } from '@/server/files/traceCube';

/**
 * Trace the rim around a fit through a cube file of any container; what was found, and the input of its own fit.
 *
 * @throws Problem as traceCube and tracedInput say
 */
export async function traceOnCube(
  source: ByteSource,
  fit: FittedShell,
  edge: Edge,
): Promise<{ outcome: TraceOutcome; input: FitInput }> {
  const { pixels, head, close } = await openPlain(source);
  try {
    const outcome = await traceCube({ ...pixels, understood: head }, { fit, edge });
    return { outcome, input: tracedInput(outcome, buildWcs(head.wcs).velocityStep) };
  } finally {
    await close();
  }
}
