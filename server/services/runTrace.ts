import { randomUUID } from 'node:crypto';
import { Problem } from '@/shared/contract/problem';
import type { Db } from '../store/db';
import { appendEvent } from '../store/events';
import { findFit } from '../store/fits';
import { insertTracedReading } from '../store/readings';
import { claimTrace, findTrace, finishTrace, releaseTrace, renewTrace, type TraceRow } from '../store/traces';
import { announce } from './announce';
import type { Parts } from './context';
import { planesPlace } from './cubePixels';
import { underLease, type Ending } from './lease';
import type { Progress } from './takeIn';
import { cubeToTrace } from './traceCube';
import type { RimTask, TracedRim } from './traceInCube';

/** Reads and measures somewhere that does not hold up the worker; rejects when the signal fires. */
export type RimTracer = (
  task: RimTask,
  onChannel: (done: number) => void,
  signal: AbortSignal,
) => Promise<TracedRim>;

/** One attempt at measuring a rim; what was found becomes a reading in the same transaction. */
export async function runTrace(
  parts: Parts,
  traceId: string,
  holder: string,
  trace: RimTracer,
  stopping: AbortSignal,
): Promise<void> {
  const { db } = parts;
  if (!(await claimTrace(db, traceId, holder))) return; // done, cancelled, or another worker has it
  const row = (await findTrace(db, traceId))!;
  await tell(db, row, 'running', 0);
  const attempt = async (state: Progress, signal: AbortSignal) => {
    const fit = (await findFit(db, row.fitId))!;
    const cube = await cubeToTrace(db, fit);
    const task = {
      ...planesPlace(parts, cube),
      fit: { model: fit.model, parameters: fit.outcome!.parameters },
      edge: row.edge,
    };
    return trace(task, (done) => (state.progress = done), signal);
  };
  await underLease(
    {
      renew: async ({ progress }) => {
        if (!(await renewTrace(db, traceId, holder, progress))) return false;
        await tell(db, row, 'running', progress);
        return true;
      },
      release: () => releaseTrace(db, traceId, holder),
      work: attempt,
      finish: (ending) => store(parts, row, holder, ending),
    },
    stopping,
  );
}

async function store(parts: Parts, row: TraceRow, holder: string, ending: Ending<TracedRim>): Promise<void> {
  await parts.db
    .transaction(async (trx) => {
      const readingId = randomUUID();
      const result =
        'outcome' in ending ? { outcome: ending.outcome.outcome, readingId } : { problem: ending.problem };
      if ('outcome' in ending)
        await insertTracedReading(trx, {
          id: readingId,
          traceId: row.id,
          shellId: row.shellId,
          personId: row.createdById,
          cubeId: row.cubeId,
          marks: ending.outcome.marks,
        });
      if (!(await finishTrace(trx, row.id, holder, result))) throw new LeaseLost();
      const status = 'outcome' in result ? 'done' : 'failed';
      await appendEvent(trx, {
        teamId: row.teamId,
        personId: null,
        kind: `trace.${status}`,
        subjectId: row.id,
      });
      await tell(trx, row, status);
    })
    .catch((error: unknown) => {
      if (!(error instanceof LeaseLost)) throw error; // who took it has the say, and the reading is rolled back
    });
}

class LeaseLost extends Error {}

/** After the last attempt the cause stays on the trace. */
export async function giveUpTrace(
  parts: Parts,
  traceId: string,
  holder: string,
  cause: string,
): Promise<void> {
  if (!(await claimTrace(parts.db, traceId, holder))) return;
  const problem = new Problem(
    'internal',
    `Tracing the rim failed three times: ${cause}. Trace it again, or tell us.`,
  ).toJSON();
  await store(parts, (await findTrace(parts.db, traceId))!, holder, { problem });
}

const tell = (db: Db, row: TraceRow, status: string, progress?: number) =>
  announce(db, row.teamId, {
    subject: 'trace',
    id: row.id,
    regionId: row.regionId,
    shellId: row.shellId,
    status,
    ...(progress !== undefined && { progress }),
  });
