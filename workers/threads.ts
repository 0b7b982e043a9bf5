import { MessageChannel } from 'node:worker_threads';
import type Piscina from 'piscina';
import { Problem, type ProblemType } from '@/shared/contract/problem';
import type { CubeThreads } from '@/server/services/passes';
import type { RimTracer } from '@/server/services/runTrace';
import type { ThreadAnswer } from './threadTasks';

/** The value a thread found, or the problem it met, thrown as it was there. */
function unpack<T>(answer: ThreadAnswer<T>): T {
  if ('value' in answer) return answer.value;
  const { type, detail, ...extra } = answer.problem;
  throw new Problem(type.replace('/problems/', '') as ProblemType, detail, extra);
}

/** Run a task of this name on a thread. */
export const onThread = async <T>(
  pool: Piscina,
  name: string,
  task: object,
  signal: AbortSignal,
): Promise<T> => unpack((await pool.run(task, { name, signal })) as ThreadAnswer<T>);

/** The same for a task that tells of its progress over a port of its own. */
export async function withProgress<T>(
  pool: Piscina,
  name: string,
  task: object,
  onStep: (step: number) => void,
  signal: AbortSignal,
): Promise<T> {
  const { port1, port2 } = new MessageChannel();
  port1.on('message', onStep);
  try {
    return unpack(
      (await pool.run({ task, port: port2 }, { name, signal, transferList: [port2] })) as ThreadAnswer<T>,
    );
  } finally {
    port1.close();
  }
}

export const cubeThreads = (pool: Piscina): CubeThreads => ({
  rearrange: (task, onStep, signal) => withProgress(pool, 'rearrange', task, onStep, signal),
  sample: (task, signal) => onThread(pool, 'sample', task, signal),
  reduce: (task, onChannel, signal) => withProgress(pool, 'reduce', task, onChannel, signal),
});

export const tracer =
  (pool: Piscina): RimTracer =>
  (task, onProgress, signal) =>
    withProgress(pool, 'trace', task, onProgress, signal);
