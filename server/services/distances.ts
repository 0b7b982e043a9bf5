import { randomUUID } from 'node:crypto';
import type { Distance, DistanceDraft } from '@/shared/contract/shells';
import { isoTime } from '../store/db';
import { insertDistance, listDistances, type DistanceRow } from '../store/distances';
import { appendEvent } from '../store/events';
import { announce } from './announce';
import type { Context } from './context';
import { shellFor } from './shells';

const toDistance = (row: DistanceRow): Distance => ({
  id: row.id,
  shellId: row.shellId,
  pc: row.pc,
  errorPc: row.errorPc,
  method: row.method,
  note: row.note,
  createdBy: row.createdById ? { id: row.createdById, name: row.createdByName ?? '' } : null,
  createdAt: isoTime(row.createdAt),
});

export async function distancesOf(ctx: Context, shellId: string): Promise<Distance[]> {
  await shellFor(ctx, shellId, 'shell.read');
  return (await listDistances(ctx.db, shellId)).map(toDistance);
}

/** Enter a distance; entries are kept, and the newest one holds. */
export async function addDistance(ctx: Context, shellId: string, draft: DistanceDraft): Promise<Distance> {
  const shell = await shellFor(ctx, shellId, 'distance.add');
  const id = randomUUID();
  await ctx.db.transaction(async (trx) => {
    await insertDistance(trx, { id, shellId, createdBy: ctx.actor.id, ...draft });
    await appendEvent(trx, {
      teamId: shell.teamId,
      personId: ctx.actor.id,
      kind: 'distance.added',
      subjectId: id,
      data: { shellId, pc: draft.pc },
    });
    await announce(trx, shell.teamId, { subject: 'shell', id: shellId, regionId: shell.regionId, shellId });
  });
  return (await distancesOf(ctx, shellId)).find((d) => d.id === id)!;
}
