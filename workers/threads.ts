import { MessageChannel } from 'node:worker_threads';
import type Piscina from 'piscina';
import type { FitOutcome, FrozenMark } from '@/shared/contract/fits';
import { Problem, type ProblemType } from '@/shared/contract/problem';
import type { CubeThreads } from '@/server/services/passes';
import type { FitSolver } from '@/server/services/runFit';
import type { ThreadAnswer } from './threadTasks';

/** The value a thread found, or the problem it met, thrown as it was there. */
function unpack<T>(answer: ThreadAnswer<T>): T {
  if ('value' in answer) return answer.value;
  const { type, detail, ...extra } = answer.problem;
  throw new Problem(type.replace('/problems/', '') as ProblemType, detail, extra);
}

/** Run a task that tells of its progress over a port of its own. */
async function withProgress<T>(
  pool: Piscina,
  name: string,
  task: object,
  onStep: (steps: number) => void,
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
  sample: async (task, signal) =>
    unpack((await pool.run(task, { name: 'sample', signal })) as ThreadAnswer<number | null>),
  reduce: (task, onChannel, signal) => withProgress(pool, 'reduce', task, onChannel, signal),
});

/** The rings of a fit carry velocities; the channel they were marked on comes from the frozen marks. */
function withChannels(outcome: FitOutcome, marks: FrozenMark[]): FitOutcome {
  const channelAt = (velocity: number) =>
    marks.reduce((best, m) =>
      Math.abs(m.velocity - velocity) < Math.abs(best.velocity - velocity) ? m : best,
    ).channel;
  return { ...outcome, rings: outcome.rings.map((ring) => ({ ...ring, channel: channelAt(ring.velocity) })) };
}

export const solver =
  (pool: Piscina): FitSolver =>
  async (task, signal) =>
    withChannels(
      unpack((await pool.run(task, { name: 'fit', signal })) as ThreadAnswer<FitOutcome>),
      task.frozen.marks,
    );
