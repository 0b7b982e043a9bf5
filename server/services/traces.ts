import { randomUUID } from 'node:crypto';
import type { Action } from '@/shared/contract/permissions';
import { Problem } from '@/shared/contract/problem';
import type { Trace, TraceDraft } from '@/shared/contract/traces';
import { isoTime, isoTimeOrNull, type Db } from '../store/db';
import { appendEvent } from '../store/events';
import { findFit } from '../store/fits';
import { addJob } from '../store/queue';
import { cancelTraceRow, findTrace, insertTrace, listTraces, type TraceRow } from '../store/traces';
import { notFound, requirePermission } from './access';
import { announce } from './announce';
import type { Context } from './context';
import { shellFor } from './shells';
import { cubeToTrace } from './traceCube';

const toTrace = (row: TraceRow): Trace => ({
  id: row.id,
  shellId: row.shellId,
  fitId: row.fitId,
  cubeId: row.cubeId,
  edge: row.edge,
  status: row.status,
  progress: row.progress,
  problem: row.problem,
  readingId: row.readingId,
  createdBy: { id: row.createdById, name: row.createdByName },
  createdAt: isoTime(row.createdAt),
  finishedAt: isoTimeOrNull(row.finishedAt),
  outcome: row.outcome,
});

async function traceFor(ctx: Context, id: string, action: Action): Promise<TraceRow> {
  const row = await findTrace(ctx.db, id);
  if (!row) throw notFound('trace');
  requirePermission(ctx.actor, action, row.teamId, 'trace');
  return row;
}

export const readTrace = async (ctx: Context, id: string): Promise<Trace> =>
  toTrace(await traceFor(ctx, id, 'shell.read'));

export async function tracesOfShell(ctx: Context, shellId: string): Promise<Trace[]> {
  await shellFor(ctx, shellId, 'shell.read');
  return (await listTraces(ctx.db, shellId)).map(toTrace);
}

/** Queue the measuring of the rim around a finished fit. What cannot be traced is refused here, and nothing is stored. */
export async function startTrace(ctx: Context, shellId: string, draft: TraceDraft): Promise<Trace> {
  const shell = await shellFor(ctx, shellId, 'fit.run');
  const fit = await findFit(ctx.db, draft.fitId);
  if (!fit || fit.shellId !== shellId) throw notFound('fit');
  if (fit.status !== 'done')
    throw new Problem('conflict', `A rim is traced around a finished fit; this one is ${fit.status}.`, {
      field: 'fitId',
    });
  await cubeToTrace(ctx.db, fit);
  const id = randomUUID();
  await ctx.db.transaction(async (trx) => {
    await insertTrace(trx, { id, shellId, cubeId: fit.cubeId, createdBy: ctx.actor.id, ...draft });
    await queueTrace(trx, id);
    await appendEvent(trx, {
      teamId: shell.teamId,
      personId: ctx.actor.id,
      kind: 'trace.queued',
      subjectId: id,
      data: { shellId, ...draft },
    });
    await announce(trx, shell.teamId, {
      subject: 'trace',
      id,
      regionId: shell.regionId,
      shellId,
      status: 'queued',
    });
  });
  return readTrace(ctx, id);
}

export const queueTrace = (db: Db, traceId: string) => addJob(db, 'trace', { traceId }, `trace:${traceId}`);

export async function cancelTrace(ctx: Context, id: string): Promise<Trace> {
  const row = await traceFor(ctx, id, 'fit.run');
  await ctx.db.transaction(async (trx) => {
    if (!(await cancelTraceRow(trx, id)))
      throw new Problem('conflict', `There is nothing to stop: this trace is ${row.status}.`);
    await appendEvent(trx, {
      teamId: row.teamId,
      personId: ctx.actor.id,
      kind: 'trace.cancelled',
      subjectId: id,
    });
    await announce(trx, row.teamId, {
      subject: 'trace',
      id,
      regionId: row.regionId,
      shellId: row.shellId,
      status: 'cancelled',
    });
  });
  return readTrace(ctx, id);
}
