import { randomUUID } from 'node:crypto';
import type { Region, RegionChange, RegionDraft } from '@/shared/contract/regions';
import type { Action } from '@/shared/contract/permissions';
import { appendEvent } from '../store/events';
import { findRegion, insertRegion, listRegions, updateRegion } from '../store/regions';
import { notFound, requirePermission, requireTeam } from './access';
import { announce } from './announce';
import type { Context } from './context';

export const regionsOfTeam = async (ctx: Context): Promise<Region[]> =>
  listRegions(ctx.db, requireTeam(ctx.actor));

/** Load a region for an action, or refuse. */
export async function regionFor(
  ctx: Context,
  id: string,
  action: Action,
): Promise<{ teamId: string; region: Region }> {
  const found = await findRegion(ctx.db, id);
  if (!found) throw notFound('region');
  requirePermission(ctx.actor, action, found.teamId, 'region');
  return found;
}

export const readRegion = async (ctx: Context, id: string): Promise<Region> =>
  (await regionFor(ctx, id, 'region.read')).region;

export async function createRegion(ctx: Context, draft: RegionDraft): Promise<Region> {
  const teamId = requireTeam(ctx.actor);
  requirePermission(ctx.actor, 'region.create', teamId);
  const id = randomUUID();
  await ctx.db.transaction(async (trx) => {
    await insertRegion(trx, id, teamId, ctx.actor.id, draft);
    await appendEvent(trx, { teamId, personId: ctx.actor.id, kind: 'region.created', subjectId: id });
    await announce(trx, teamId, { subject: 'region', id, regionId: id });
  });
  return readRegion(ctx, id);
}

export async function changeRegion(ctx: Context, id: string, change: RegionChange): Promise<Region> {
  const { teamId } = await regionFor(ctx, id, 'region.edit');
  await ctx.db.transaction(async (trx) => {
    await updateRegion(trx, id, change);
    await appendEvent(trx, {
      teamId,
      personId: ctx.actor.id,
      kind: 'region.changed',
      subjectId: id,
      data: change,
    });
    await announce(trx, teamId, { subject: 'region', id, regionId: id });
  });
  return readRegion(ctx, id);
}
