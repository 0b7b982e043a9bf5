import type { MessagePort } from 'node:worker_threads';
import { Problem, type ProblemBody } from '@/shared/contract/problem';
import { fitShell } from '@/shared/shell/fit';
import { engineInput } from '@/server/services/fits';
import { reduceChannels, type Reduced, type ReduceTask } from '@/server/services/reduceCube';
import { rearrangeChannels, type RearrangeTask } from '@/server/services/rearrangeCube';
import type { FitTask } from '@/server/services/runFit';
import { sampleNoise, type SampleTask } from '@/server/services/sampleNoise';

/** What comes back from a thread: a problem loses its class on the way, so it travels as its body. */
export type ThreadAnswer<T> = { value: T } | { problem: ProblemBody };

async function answer<T>(work: () => T | Promise<T>): Promise<ThreadAnswer<T>> {
  try {
    return { value: await work() };
  } catch (error) {
    if (error instanceof Problem) return { problem: error.toJSON() };
    throw error;
  }
}

interface WithPort<Task> {
  task: Task;
  port: MessagePort;
}

export async function reduce({ task, port }: WithPort<ReduceTask>): Promise<ThreadAnswer<Reduced>> {
  const result = await answer(() => reduceChannels(task, () => port.postMessage(1)));
  port.close();
  return result;
}

export async function rearrange({ task, port }: WithPort<RearrangeTask>): Promise<ThreadAnswer<void>> {
  const result = await answer(() => rearrangeChannels(task, (steps) => port.postMessage(steps)));
  port.close();
  return result;
}

export const sample = (task: SampleTask) => answer(() => sampleNoise(task));

export function fit({ model, options, frozen, codeVersion }: FitTask) {
  return answer(() => {
    const { bootstrap, seed, setAside, vSys } = options;
    const input = { ...engineInput(frozen), ...(vSys && { vSys }) };
    const result = fitShell(input, { model, bootstrap, seed, setAside, optimiser: 'record' });
    return { ...result, provenance: { ...result.provenance, codeVersion } };
  });
}
