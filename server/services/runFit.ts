import { Problem } from '@/shared/contract/problem';
import type { FitOptions, FitOutcome, ModelName } from '@/shared/contract/fits';
import {
  claimFit,
  findFit,
  findFrozenReading,
  finishFit,
  releaseFit,
  renewFit,
  type FitRow,
  type FrozenReading,
} from '../store/fits';
import { appendEvent } from '../store/events';
import type { Db } from '../store/db';
import { announce } from './announce';
import type { Parts } from './context';
import { toBytes } from './fitDraws';
import { underLease, type Ending } from './lease';
import type { Progress } from './takeIn';

export interface FitTask {
  model: ModelName;
  options: FitOptions;
  frozen: FrozenReading;
  codeVersion: string;
}
export interface Fitted {
  outcome: FitOutcome;
  /** The draws of the bootstrap, a row of the parameters each; null where there was none. */
  draws: Float64Array | null;
}
/** Does the arithmetic somewhere that does not hold up the worker; rejects when the signal fires. */
export type FitSolver = (task: FitTask, state: Progress, signal: AbortSignal) => Promise<Fitted>;

/** One attempt at the fit of record. */
export async function runFit(
  parts: Parts,
  fitId: string,
  holder: string,
  solve: FitSolver,
  stopping: AbortSignal,
): Promise<void> {
  const { db } = parts;
  if (!(await claimFit(db, fitId, holder))) return; // done, cancelled, or another worker has it
  const row = (await findFit(db, fitId))!;
  const frozen = (await findFrozenReading(db, fitId))!;
  await tell(db, row, 'running', { progress: 0, activity: '' });
  const { codeVersion } = parts.config;
  await underLease(
    {
      renew: async (state) => {
        if (!(await renewFit(db, fitId, holder, state))) return false;
        await tell(db, row, 'running', state);
        return true;
      },
      release: () => releaseFit(db, fitId, holder),
      work: (state, signal) =>
        solve({ model: row.model, options: row.options, frozen, codeVersion }, state, signal),
      finish: (ending) => store(db, row, holder, ending),
    },
    stopping,
  );
}

const store = (db: Db, row: FitRow, holder: string, ending: Ending<Fitted>): Promise<void> =>
  db.transaction(async (trx) => {
    const result =
      'problem' in ending
        ? ending
        : { outcome: ending.outcome.outcome, draws: ending.outcome.draws && toBytes(ending.outcome.draws) };
    if (!(await finishFit(trx, row.id, holder, result))) return;
    const status = 'outcome' in result ? 'done' : 'failed';
    await appendEvent(trx, { teamId: row.teamId, personId: null, kind: `fit.${status}`, subjectId: row.id });
    await tell(trx, row, status);
  });

/** After the last attempt the cause stays on the fit. */
export async function giveUpFit(parts: Parts, fitId: string, holder: string, cause: string): Promise<void> {
  if (!(await claimFit(parts.db, fitId, holder))) return;
  const problem = new Problem(
    'internal',
    `The fit failed three times: ${cause}. Run it again, or tell us.`,
  ).toJSON();
  await store(parts.db, (await findFit(parts.db, fitId))!, holder, { problem });
}

const tell = (db: Db, row: FitRow, status: string, state?: Progress) =>
  announce(db, row.teamId, {
    subject: 'fit',
    id: row.id,
    regionId: row.regionId,
    shellId: row.shellId,
    status,
    ...state,
  });
