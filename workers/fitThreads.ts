import type Piscina from 'piscina';
import type { FitOutcome, FrozenMark } from '@/shared/contract/fits';
import type { FitSolver } from '@/server/services/runFit';
import { joined, type BootstrapDraws } from '@/shared/shell/bootstrap';
import type { FitResult } from '@/shared/shell/fitResult';
import type { Solved } from '@/shared/shell/solveShell';
import type { DrawTask, FinishTask } from './threadTasks';
import { onThread, withProgress } from './threads';

/** Of the whole fit, how much is done before the draws, and how much with them. */
const SOLVED = 0.05;
const DRAWN = 0.9;

/**
 * The fit of record on the threads of the pool: solved on one, its draws shared out over all, put together on one.
 * The numbers are the same however many threads there are. When the signal fires the threads are ended.
 */
export const solver =
  (pool: Piscina): FitSolver =>
  async (task, state, signal) => {
    const { bootstrap, seed } = task.options;
    state.activity = 'fitting the marks';
    const solved = await onThread<Solved>(pool, 'solveFit', task, signal);
    state.progress = SOLVED;
    let draws: BootstrapDraws | null = null;
    if (bootstrap > 0) {
      state.activity = `repeating the fit on ${bootstrap} drawn readings`;
      const onShare = (share: number) => (state.progress = SOLVED + (DRAWN - SOLVED) * share);
      draws = await shared(pool, { solved, seed, from: 0, to: bootstrap }, onShare, signal);
    }
    state.progress = DRAWN;
    state.activity = 'profiles, fits without each channel, other models';
    const { model, options, codeVersion } = task;
    const finish: FinishTask = { task: { model, options, codeVersion }, solved, draws };
    const result = await onThread<FitResult>(pool, 'finishFit', finish, signal);
    return { outcome: withChannels(result, task.frozen.marks), draws: draws && draws.values };
  };

/** All draws, a share on each thread. */
async function shared(
  pool: Piscina,
  task: DrawTask,
  onShare: (share: number) => void,
  signal: AbortSignal,
): Promise<BootstrapDraws> {
  const { from, to } = task;
  const shares = Math.min(pool.options.maxThreads, to - from);
  const cut = (i: number) => from + Math.round((i * (to - from)) / shares);
  const done = new Float64Array(shares);
  const parts = Array.from(done, (_, i) => {
    const part: DrawTask = { ...task, from: cut(i), to: cut(i + 1) };
    const onStep = (share: number) => {
      done[i] = (share * (part.to - part.from)) / (to - from);
      onShare(done.reduce((sum, d) => sum + d, 0));
    };
    return withProgress<BootstrapDraws>(pool, 'drawFits', part, onStep, signal);
  });
  return joined(await Promise.all(parts));
}

/** The engine knows velocities; the channel comes from the frozen marks. */
function withChannels(result: FitResult, marks: FrozenMark[]): FitOutcome {
  const channelAt = (velocity: number) =>
    marks.reduce((best, m) =>
      Math.abs(m.velocity - velocity) < Math.abs(best.velocity - velocity) ? m : best,
    ).channel;
  const placed = <T extends { velocity: number }>(list: readonly T[]) =>
    list.map((one) => ({ ...one, channel: channelAt(one.velocity) }));
  const { leaveOneOut } = result.extra;
  return {
    ...result,
    rings: placed(result.rings),
    extra: { ...result.extra, ...(leaveOneOut && { leaveOneOut: placed(leaveOneOut) }) },
  } as FitOutcome;
}
