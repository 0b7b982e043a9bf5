import { isProblem, Problem } from '@/shared/contract/problem';
import type { FitOptions, FitOutcome, ModelName } from '@/shared/contract/fits';
import {
  claimFit,
  findFit,
  findFrozenReading,
  finishFit,
  FIT_LEASE_SECONDS,
  releaseFit,
  renewFit,
  type FrozenReading,
} from '../store/fits';
import { appendEvent } from '../store/events';
import { announce } from './announce';
import type { Parts } from './context';

export interface FitTask {
  model: ModelName;
  options: FitOptions;
  frozen: FrozenReading;
  codeVersion: string;
}
/** Does the arithmetic somewhere that does not hold up the worker; rejects when the signal fires. */
export type FitSolver = (task: FitTask, signal: AbortSignal) => Promise<FitOutcome>;

/**
 * One attempt at the fit of record. Input at fault is stored on the fit and ends the job; a passing fault gives the
 * fit back to the queue and throws, so that the queue tries again.
 */
export async function runFit(parts: Parts, fitId: string, holder: string, solve: FitSolver): Promise<void> {
  const { db } = parts;
  if (!(await claimFit(db, fitId, holder))) return; // done, cancelled, or another worker has it
  const row = (await findFit(db, fitId))!;
  const frozen = (await findFrozenReading(db, fitId))!;
  const tell = (status: string) =>
    announce(db, row.teamId, {
      subject: 'fit',
      id: fitId,
      regionId: row.regionId,
      shellId: row.shellId,
      status,
    });
  await tell('running');
  const stop = new AbortController();
  const beat = setInterval(
    () => {
      renewFit(db, fitId, holder)
        .then((held) => held || stop.abort())
        .catch(() => undefined); // a database that is away for a moment is noticed by the next beat
    },
    (FIT_LEASE_SECONDS * 1000) / 30,
  );
  try {
    const task = { model: row.model, options: row.options, frozen, codeVersion: parts.config.codeVersion };
    const result = await solve(task, stop.signal).then(
      (outcome) => ({ outcome }),
      (error: unknown) => {
        if (isProblem(error)) return { problem: error.toJSON() };
        throw error;
      },
    );
    await db.transaction(async (trx) => {
      if (!(await finishFit(trx, fitId, holder, result))) return;
      const status = 'outcome' in result ? 'done' : 'failed';
      await appendEvent(trx, { teamId: row.teamId, personId: null, kind: `fit.${status}`, subjectId: fitId });
      await announce(trx, row.teamId, {
        subject: 'fit',
        id: fitId,
        regionId: row.regionId,
        shellId: row.shellId,
        status,
      });
    });
  } catch (error) {
    if (stop.signal.aborted) return; // cancelled by a person, or taken over: whoever did it has the say
    await releaseFit(db, fitId, holder);
    throw error;
  } finally {
    clearInterval(beat);
  }
}

/** After the last attempt the cause stays on the fit. */
export async function giveUpFit(parts: Parts, fitId: string, holder: string, cause: string): Promise<void> {
  if (!(await claimFit(parts.db, fitId, holder))) return;
  const problem = new Problem(
    'internal',
    `The fit failed three times: ${cause}. Run it again, or tell us.`,
  ).toJSON();
  await finishFit(parts.db, fitId, holder, { problem });
  const row = (await findFit(parts.db, fitId))!;
  await announce(parts.db, row.teamId, {
    subject: 'fit',
    id: fitId,
    regionId: row.regionId,
    shellId: row.shellId,
    status: 'failed',
  });
}
