import type { Channel, Cube, CubeHeader } from '@/shared/contract/cubes';
import type { Action } from '@/shared/contract/permissions';
import { Problem } from '@/shared/contract/problem';
import type { CubeHead } from '@/shared/fits/cubeHead';
import { listChannels } from '../store/channels';
import { findCube, listCubes, moveCube, renameCube, setCubeRemoved, type CubeRow } from '../store/cubes';
import { isUniqueViolation, type Db } from '../store/db';
import { appendEvent } from '../store/events';
import { addJob } from '../store/queue';
import { notFound, requirePermission } from './access';
import { announce } from './announce';
import { toCubes, understood } from './cubeView';
import type { Context } from './context';
import { regionFor } from './regions';

/** Load a cube for an action, or refuse. One that was taken out is there only for putting it back. */
export async function cubeFor(ctx: Context, id: string, action: Action, removed = false): Promise<CubeRow> {
  const row = await findCube(ctx.db, id);
  if (!row || (row.removedAt !== null) !== removed) throw notFound('cube');
  requirePermission(ctx.actor, action, row.teamId, 'cube');
  return understood(row);
}

/** A cube whose pixels can be looked at. */
export async function readyCube(ctx: Context, id: string): Promise<CubeRow & { head: CubeHead }> {
  const row = await cubeFor(ctx, id, 'cube.read');
  if (row.status !== 'ready' || !row.head)
    throw new Problem('conflict', `This cube is not ready to look at: it is ${row.status}.`);
  return row as CubeRow & { head: CubeHead };
}

export async function cubesOfRegion(ctx: Context, regionId: string): Promise<Cube[]> {
  await regionFor(ctx, regionId, 'cube.read');
  return toCubes(await listCubes(ctx.db, regionId));
}

export async function readCube(ctx: Context, id: string): Promise<Cube> {
  const row = await cubeFor(ctx, id, 'cube.read');
  return toCubes(await listCubes(ctx.db, row.regionId)).find((cube) => cube.id === id)!;
}

export async function headerOf(ctx: Context, id: string): Promise<CubeHeader> {
  const row = await cubeFor(ctx, id, 'cube.read');
  return { cards: row.head?.cards ?? [], cautions: row.head?.cautions ?? [] };
}

export async function channelsOf(ctx: Context, id: string): Promise<Channel[]> {
  await readyCube(ctx, id);
  return listChannels(ctx.db, id);
}

export async function changeCube(ctx: Context, id: string, name: string): Promise<Cube> {
  const row = await cubeFor(ctx, id, 'cube.manage');
  await writeCube(ctx, row, 'cube.renamed', (trx) => renameCube(trx, id, name), { name });
  return readCube(ctx, id);
}

export async function removeCube(ctx: Context, id: string): Promise<void> {
  const row = await cubeFor(ctx, id, 'cube.manage');
  await writeCube(ctx, row, 'cube.removed', (trx) => setCubeRemoved(trx, id, true));
}

export async function restoreCube(ctx: Context, id: string): Promise<Cube> {
  const row = await cubeFor(ctx, id, 'cube.manage', true);
  try {
    await writeCube(ctx, row, 'cube.restored', (trx) => setCubeRemoved(trx, id, false));
  } catch (error) {
    if (isUniqueViolation(error, 'cubes_checksum'))
      throw new Problem('conflict', 'The same file has been uploaded again since. Use that cube.');
    throw error;
  }
  return readCube(ctx, id);
}

export async function retryCube(ctx: Context, id: string): Promise<Cube> {
  const row = await cubeFor(ctx, id, 'cube.manage');
  await writeCube(ctx, row, 'cube.retried', async (trx) => {
    if (!(await moveCube(trx, id, ['failed', 'cancelled'], 'uploaded', 'waiting for a worker')))
      throw new Problem(
        'conflict',
        `Only a failed or cancelled cube is read again; this one is ${row.status}.`,
      );
    await queueIngest(trx, id);
  });
  return readCube(ctx, id);
}

export async function cancelCube(ctx: Context, id: string): Promise<Cube> {
  const row = await cubeFor(ctx, id, 'cube.manage');
  await writeCube(ctx, row, 'cube.cancelled', async (trx) => {
    if (!(await moveCube(trx, id, ['uploaded', 'ingesting'], 'cancelled', null)))
      throw new Problem('conflict', `There is nothing to stop: this cube is ${row.status}.`);
  });
  return readCube(ctx, id);
}

export const queueIngest = (db: Db, cubeId: string) => addJob(db, 'ingest', { cubeId }, `ingest:${cubeId}`);

/** One change of a cube: in one transaction with its event, and told to every open page. */
export async function writeCube(
  ctx: Context,
  row: CubeRow,
  kind: string,
  change: (trx: Db) => PromiseLike<unknown>,
  data: Record<string, unknown> = {},
) {
  await ctx.db.transaction(async (trx) => {
    await change(trx);
    await appendEvent(trx, { teamId: row.teamId, personId: ctx.actor.id, kind, subjectId: row.id, data });
    await announce(trx, row.teamId, { subject: 'cube', id: row.id, regionId: row.regionId });
  });
}
