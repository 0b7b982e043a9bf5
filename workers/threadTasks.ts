import type { MessagePort } from 'node:worker_threads';
import type { FitOptions, ModelName } from '@/shared/contract/fits';
import { Problem, type ProblemBody } from '@/shared/contract/problem';
import type { BootstrapDraws } from '@/shared/shell/bootstrap';
import * as engine from '@/shared/shell/fit';
import type { Solved } from '@/shared/shell/solveShell';
import { engineInput } from '@/server/services/engineInput';
import { reduceChannels, type Reduced, type ReduceTask } from '@/server/services/reduceCube';
import { rearrangeChannels, type RearrangeTask } from '@/server/services/rearrangeCube';
import type { FitTask } from '@/server/services/runFit';
import { traceInCube, type RimTask, type TracedRim } from '@/server/services/traceInCube';
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

export async function trace({ task, port }: WithPort<RimTask>): Promise<ThreadAnswer<TracedRim>> {
  const result = await answer(() => traceInCube(task, (done) => port.postMessage(done)));
  port.close();
  return result;
}

export const sample = (task: SampleTask) => answer(() => sampleNoise(task));

export const solveFit = ({ model, options, frozen }: FitTask) =>
  answer(() => engine.solveFit(engineInput(frozen, options), engineOptions(model, options)));

export interface DrawTask {
  solved: Solved;
  seed: number;
  from: number;
  to: number;
}
export async function drawFits({ task, port }: WithPort<DrawTask>): Promise<ThreadAnswer<BootstrapDraws>> {
  const { solved, seed, from, to } = task;
  const result = await answer(() =>
    engine.bootstrapDraws(solved, { seed }, from, to, (done) => port.postMessage(done)),
  );
  port.close();
  return result;
}

export interface FinishTask {
  task: Pick<FitTask, 'model' | 'options' | 'codeVersion'>;
  solved: Solved;
  draws: BootstrapDraws | null;
}
export const finishFit = ({ task: { model, options, codeVersion }, solved, draws }: FinishTask) =>
  answer(() => engine.finishFit(solved, { ...engineOptions(model, options), codeVersion }, draws));

const engineOptions = (model: ModelName, options: FitOptions): engine.FitOptions => ({
  model,
  bootstrap: options.bootstrap,
  seed: options.seed,
  setAside: options.setAside,
  ...(options.start && { start: options.start }),
  optimiser: 'record',
  extras: true,
});
