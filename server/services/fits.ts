import { randomUUID } from 'node:crypto';
import type { Fit, FitDraft, FrozenMark, FrozenMarks } from '@/shared/contract/fits';
import type { Action } from '@/shared/contract/permissions';
import { isProblem, Problem } from '@/shared/contract/problem';
import { readConstraints } from '@/shared/shell/constraints';
import { readMarks } from '@/shared/shell/fitInput';
import { buildWcs } from '@/shared/sky/wcs';
import { isoTime, isoTimeOrNull, type Db } from '../store/db';
import { appendEvent } from '../store/events';
import {
  findFit,
  findFrozenReading,
  insertFit,
  listFits,
  moveFit,
  type FitRow,
  type FrozenReading,
} from '../store/fits';
import { addJob } from '../store/queue';
import { findReadingById, type ReadingRow } from '../store/readings';
import { findTrace } from '../store/traces';
import { notFound, requirePermission } from './access';
import { isAdoptable } from './adoption';
import { announce } from './announce';
import type { Context } from './context';
import { cubeFor } from './cubes';
import { engineInput } from './engineInput';
import { shellFor } from './shells';

const toFit = (row: FitRow): Fit => ({
  ...row.outcome,
  id: row.id,
  shellId: row.shellId,
  readingId: row.readingId,
  readingRevision: row.readingRevision,
  cubeId: row.cubeId,
  model: row.model,
  status: row.status,
  progress: row.progress,
  activity: row.activity,
  options: row.options,
  traceId: row.traceId,
  problem: row.problem,
  adopted: row.adopted,
  adoptable: row.outcome !== null && isAdoptable(row.outcome),
  createdBy: row.createdById ? { id: row.createdById, name: row.createdByName ?? '' } : null,
  createdAt: isoTime(row.createdAt),
  finishedAt: isoTimeOrNull(row.finishedAt),
});

export async function fitFor(ctx: Context, id: string, action: Action): Promise<FitRow> {
  const row = await findFit(ctx.db, id);
  if (!row) throw notFound('fit');
  requirePermission(ctx.actor, action, row.teamId, 'fit');
  return row;
}

export const readFit = async (ctx: Context, id: string): Promise<Fit> =>
  toFit(await fitFor(ctx, id, 'shell.read'));

export async function fitsOfShell(ctx: Context, shellId: string): Promise<Fit[]> {
  await shellFor(ctx, shellId, 'shell.read');
  return (await listFits(ctx.db, shellId)).map(toFit);
}

export async function frozenMarksOf(ctx: Context, id: string): Promise<FrozenMarks> {
  const row = await fitFor(ctx, id, 'shell.read');
  const frozen = (await findFrozenReading(ctx.db, id))!;
  return { cubeId: row.cubeId, ...frozen };
}

/**
 * Freeze a reading and queue the fit of record. Marks that cannot constrain a shell are refused here, where the
 * person still has them in hand, and nothing is stored.
 */
export async function startFit(ctx: Context, shellId: string, draft: FitDraft): Promise<Fit> {
  const shell = await shellFor(ctx, shellId, 'fit.run');
  const reading = await findReadingById(ctx.db, draft.readingId);
  if (!reading || reading.shellId !== shellId) throw notFound('reading');
  const frozen = await freeze(ctx, reading);
  refuseUnfittable(frozen, draft);
  const id = randomUUID();
  await ctx.db.transaction(async (trx) => {
    await insertFit(trx, {
      id,
      shellId,
      readingId: reading.id,
      cubeId: reading.cubeId,
      model: draft.model,
      options: draft.options,
      marks: frozen,
      readingRevision: reading.revision,
      traceId: reading.traceId,
      createdBy: ctx.actor.id,
    });
    await queueFit(trx, id);
    await appendEvent(trx, {
      teamId: shell.teamId,
      personId: ctx.actor.id,
      kind: 'fit.queued',
      subjectId: id,
      data: { shellId, model: draft.model, readingRevision: reading.revision },
    });
    await announce(trx, shell.teamId, {
      subject: 'fit',
      id,
      regionId: shell.regionId,
      shellId,
      status: 'queued',
    });
  });
  return readFit(ctx, id);
}

/** The fields of the request lie one step deeper than those of the engine. */
function refuseUnfittable(frozen: FrozenReading, { model, options }: FitDraft): void {
  const input = engineInput(frozen, options);
  try {
    readConstraints(model, input.constraints, input.vSys);
    readMarks(input, model);
  } catch (error) {
    if (!isProblem(error) || !/^(constraints|vSys)\b/.test(error.extra.field ?? '')) throw error;
    throw new Problem(error.type, error.detail, { ...error.extra, field: `options.${error.extra.field}` });
  }
}

/** The marks as places on the sky: what a fit needs, and what remains if the cube goes. */
async function freeze(ctx: Context, reading: ReadingRow): Promise<FrozenReading> {
  const cube = await cubeFor(ctx, reading.cubeId, 'cube.read');
  const wcs = buildWcs(cube.head!.wcs);
  const marks = reading.marks.map((mark, i): FrozenMark => {
    const place = wcs.pixelToGalactic(mark.x, mark.y);
    if (!place)
      throw new Problem(
        'invalid-input',
        `Mark ${i + 1} lies where this projection shows no sky. Remove it.`,
        {
          field: `marks.${i}`,
        },
      );
    return { ...mark, ...place, velocity: wcs.velocityOf(mark.channel), sigma: mark.sigma ?? null };
  });
  const trace = reading.traceId === null ? null : (await findTrace(ctx.db, reading.traceId))!.outcome!;
  const traced = trace && { beamDeg: trace.beamDeg, faint: trace.faint };
  return { channelWidth: wcs.velocityStep, marks, ...(traced && { traced }) };
}

export const queueFit = (db: Db, fitId: string) => addJob(db, 'fit', { fitId }, `fit:${fitId}`);

export async function cancelFit(ctx: Context, id: string): Promise<Fit> {
  const row = await fitFor(ctx, id, 'fit.run');
  await move(ctx, row, 'fit.cancelled', async (trx) => {
    if (!(await moveFit(trx, id, ['queued', 'running'], 'cancelled')))
      throw new Problem('conflict', `There is nothing to stop: this fit is ${row.status}.`);
  });
  return readFit(ctx, id);
}

export async function retryFit(ctx: Context, id: string): Promise<Fit> {
  const row = await fitFor(ctx, id, 'fit.run');
  await move(ctx, row, 'fit.retried', async (trx) => {
    if (!(await moveFit(trx, id, ['failed', 'cancelled'], 'queued')))
      throw new Problem(
        'conflict',
        `Only a failed or cancelled fit is run again; this one is ${row.status}.`,
      );
    await queueFit(trx, id);
  });
  return readFit(ctx, id);
}

async function move(ctx: Context, row: FitRow, kind: string, change: (trx: Db) => Promise<void>) {
  await ctx.db.transaction(async (trx) => {
    await change(trx);
    await appendEvent(trx, { teamId: row.teamId, personId: ctx.actor.id, kind, subjectId: row.id });
    await announce(trx, row.teamId, {
      subject: 'fit',
      id: row.id,
      regionId: row.regionId,
      shellId: row.shellId,
    });
  });
}
