import { randomUUID } from 'node:crypto';
import type { Action } from '@/shared/contract/permissions';
import { Problem } from '@/shared/contract/problem';
import type { Shell, ShellChange, ShellDraft } from '@/shared/contract/shells';
import { designation } from '@/shared/physics/designation';
import { isoTime, type Db } from '../store/db';
import { appendEvent } from '../store/events';
import { findFit } from '../store/fits';
import { findShell, insertShell, listShells, updateShell, type ShellRow } from '../store/shells';
import { notFound, requirePermission } from './access';
import { announce } from './announce';
import type { Actor, Context } from './context';
import { isAdoptable } from './adoption';
import { measuresOf } from './measures';
import { regionFor } from './regions';

export const toShell = (row: ShellRow, actor: Actor): Shell => ({
  id: row.id,
  regionId: row.regionId,
  regionName: row.regionName,
  name: row.name,
  note: row.note,
  status: row.status,
  designation: row.designation,
  adoptedFitId: row.adoptedFitId,
  adopted: measuresOf(row),
  readings: row.readings.map((r) => ({
    id: r.id,
    cubeId: r.cubeId,
    person: { id: r.personId, name: r.personName },
    mine: r.personId === actor.id,
    marks: r.marks,
    channels: r.channels,
    updatedAt: isoTime(new Date(r.updatedAt)),
  })),
  fits: row.fits,
  createdBy: row.createdById ? { id: row.createdById, name: row.createdByName ?? '' } : null,
  createdAt: isoTime(row.createdAt),
  updatedAt: isoTime(row.updatedAt),
});

/** Load a shell for an action, or refuse. One that was taken out is there only for putting it back. */
export async function shellFor(ctx: Context, id: string, action: Action, removed = false): Promise<ShellRow> {
  const row = await findShell(ctx.db, id);
  if (!row || (row.removedAt !== null) !== removed) throw notFound('shell');
  requirePermission(ctx.actor, action, row.teamId, 'shell');
  return row;
}

export async function shellsOfRegion(ctx: Context, regionId: string): Promise<Shell[]> {
  await regionFor(ctx, regionId, 'shell.read');
  return (await listShells(ctx.db, regionId)).map((row) => toShell(row, ctx.actor));
}

export const readShell = async (ctx: Context, id: string): Promise<Shell> =>
  toShell(await shellFor(ctx, id, 'shell.read'), ctx.actor);

export async function createShell(ctx: Context, regionId: string, draft: ShellDraft): Promise<Shell> {
  const { teamId } = await regionFor(ctx, regionId, 'shell.create');
  const id = randomUUID();
  await ctx.db.transaction(async (trx) => {
    await insertShell(trx, { id, regionId, createdBy: ctx.actor.id, ...draft });
    await appendEvent(trx, { teamId, personId: ctx.actor.id, kind: 'shell.created', subjectId: id });
    await announce(trx, teamId, { subject: 'shell', id, regionId, shellId: id });
  });
  return readShell(ctx, id);
}

export async function changeShell(ctx: Context, id: string, change: ShellChange): Promise<Shell> {
  const row = await shellFor(ctx, id, 'shell.edit');
  const { adoptedFitId, ...rest } = change;
  await write(ctx, row, 'shell.changed', change, async (trx) => {
    const adoption = adoptedFitId === undefined ? {} : await adoptionOf(trx, ctx, row, adoptedFitId);
    if (rest.status !== undefined && row.status !== 'draft' && row.status !== 'withdrawn')
      throw new Problem('conflict', `A shell that is ${row.status} is not withdrawn here.`, {
        field: 'status',
      });
    await updateShell(trx, id, { ...rest, ...adoption });
  });
  return readShell(ctx, id);
}

/** The fit that stands for the shell, with the designation that follows from it. */
async function adoptionOf(trx: Db, ctx: Context, row: ShellRow, fitId: string | null) {
  requirePermission(ctx.actor, 'fit.adopt', row.teamId);
  if (fitId === null) return { adoptedFitId: null, designation: null };
  const fit = await findFit(trx, fitId);
  if (!fit || fit.shellId !== row.id) throw notFound('fit');
  const { l, b, vSys } = fit.outcome?.parameters ?? {};
  if (fit.status !== 'done' || !fit.outcome || !l || !b || !vSys)
    throw new Problem('conflict', `Only a finished fit is adopted; this one is ${fit.status}.`, {
      field: 'adoptedFitId',
    });
  if (!isAdoptable(fit.outcome))
    throw new Problem(
      'conflict',
      'These marks do not measure the radius of the shell: the arc is too short. Mark more of the rim and fit again.',
      { field: 'adoptedFitId' },
    );
  return { adoptedFitId: fitId, designation: designation(l.value, b.value, vSys.value) };
}

export async function removeShell(ctx: Context, id: string): Promise<void> {
  const row = await shellFor(ctx, id, 'shell.edit');
  await write(ctx, row, 'shell.removed', {}, (trx) => updateShell(trx, id, { removed: true }));
}

export async function restoreShell(ctx: Context, id: string): Promise<Shell> {
  const row = await shellFor(ctx, id, 'shell.edit', true);
  await write(ctx, row, 'shell.restored', {}, (trx) => updateShell(trx, id, { removed: false }));
  return readShell(ctx, id);
}

async function write(
  ctx: Context,
  row: ShellRow,
  kind: string,
  data: Record<string, unknown>,
  change: (trx: Db) => PromiseLike<unknown>,
) {
  await ctx.db.transaction(async (trx) => {
    await change(trx);
    await appendEvent(trx, { teamId: row.teamId, personId: ctx.actor.id, kind, subjectId: row.id, data });
    await announce(trx, row.teamId, {
      subject: 'shell',
      id: row.id,
      regionId: row.regionId,
      shellId: row.id,
    });
  });
}
