import type { TraceOutcome } from '@/shared/contract/traces';
import { traceChannel } from '@/shared/shell/trace/traceChannel';
import { traceOutcome } from '@/shared/shell/trace/traceOutcome';
import { planTrace, type TraceTask } from '@/shared/shell/trace/tracePlan';

/**
 * Trace the rim of a shell through a cube that lies in memory. For one that does not, plan the trace, hand
 * `traceChannel` one channel at a time, and close with `traceOutcome`.
 *
 * @param planeOf the pixels of a channel, row by row from y = 0, NaN where blank
 * @throws Problem as planTrace says
 */
export function traceRim(
  task: TraceTask,
  planeOf: (channel: number) => Float32Array | Float64Array,
): TraceOutcome {
  const plan = planTrace(task);
  return traceOutcome(
    plan,
    plan.channels.flatMap((channel) => traceChannel(plan, channel, planeOf(channel))),
  );
}
