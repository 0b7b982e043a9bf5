import { isProblem, type ProblemBody } from '@/shared/contract/problem';
import type { Progress } from './takeIn';

export type Ending<T> = { outcome: T } | { problem: ProblemBody };

/** What a worker does to one record that it has claimed. Every write names the lease. */
export interface LeasedJob<T> {
  /** Renew the lease and tell how far it is. False: cancelled by a person, or taken over. */
  renew(state: Progress): Promise<boolean>;
  /** Give the record back to the queue; nothing where the lease is lost. */
  release(): Promise<unknown>;
  /** Rejects when the signal fires. */
  work(state: Progress, signal: AbortSignal): Promise<T>;
  /** Store, once, what came of it or what was wrong with the input. */
  finish(ending: Ending<T>): Promise<void>;
}

/** Four times a second is as often as a bar need move. */
const BEAT_MS = 250;
const RENEW_MS = 1000;

/**
 * One attempt. Input at fault is stored and ends the job; a passing fault gives the record back and throws, so that
 * the queue tries again. Stopped by a person, the record is what they made it; stopped with the worker, it waits.
 */
export async function underLease<T>(job: LeasedJob<T>, stopping: AbortSignal): Promise<void> {
  const stop = new AbortController();
  const stopNow = () => stop.abort();
  stopping.addEventListener('abort', stopNow);
  if (stopping.aborted) stopNow();
  const state: Progress = { progress: 0, activity: '' };
  const beat = heartbeat(job, state, stopNow);
  try {
    const ending = await job.work(state, stop.signal).then(
      (outcome): Ending<T> => ({ outcome }),
      (error: unknown) => {
        if (isProblem(error)) return { problem: error.toJSON() };
        throw error;
      },
    );
    await job.finish(ending);
  } catch (error) {
    await job.release();
    if (!stop.signal.aborted) throw error;
  } finally {
    clearInterval(beat);
    stopping.removeEventListener('abort', stopNow);
  }
}

function heartbeat<T>(job: LeasedJob<T>, state: Progress, stop: () => void): NodeJS.Timeout {
  let told = { ...state, at: Date.now() };
  let busy = false;
  return setInterval(() => {
    const moved = state.progress !== told.progress || state.activity !== told.activity;
    if (busy || (!moved && Date.now() - told.at < RENEW_MS)) return;
    busy = true;
    told = { ...state, at: Date.now() };
    job
      .renew({ ...state })
      .then((held) => held || stop())
      .catch(() => undefined) // a database that is away for a moment is noticed by the next beat
      .finally(() => (busy = false));
  }, BEAT_MS);
}
