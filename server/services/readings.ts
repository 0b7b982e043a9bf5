import { randomUUID } from 'node:crypto';
import { Problem } from '@/shared/contract/problem';
import type { Mark, Reading, ReadingDraft } from '@/shared/contract/readings';
import { isoTime } from '../store/db';
import { appendEvent } from '../store/events';
import { findReading, insertReading, updateReading, type ReadingRow } from '../store/readings';
import { announce } from './announce';
import type { Context } from './context';
import { cubeFor } from './cubes';
import { shellFor } from './shells';

const toReading = (row: ReadingRow): Reading => ({
  id: row.id,
  shellId: row.shellId,
  cubeId: row.cubeId,
  marks: row.marks,
  revision: row.revision,
  updatedAt: isoTime(row.updatedAt),
});

export async function myReading(ctx: Context, shellId: string): Promise<Reading> {
  await shellFor(ctx, shellId, 'shell.read');
  const row = await findReading(ctx.db, shellId, ctx.actor.id);
  return row ? toReading(row) : { id: null, shellId, cubeId: null, marks: [], revision: 0, updatedAt: null };
}

/**
 * Save the person's marks on a shell. A save that builds on an older revision than the stored one is refused with
 * both sides in the problem, so that the client can let the person keep either or both.
 */
export async function saveMyReading(ctx: Context, shellId: string, draft: ReadingDraft): Promise<Reading> {
  const shell = await shellFor(ctx, shellId, 'reading.write');
  const cube = await cubeFor(ctx, draft.cubeId, 'cube.read');
  if (cube.regionId !== shell.regionId)
    throw new Problem('invalid-input', 'This cube lies in another region than the shell.', {
      field: 'cubeId',
    });
  refuseOutside(draft.marks, cube.head);
  return ctx.db.transaction(async (trx) => {
    const stored = await findReading(trx, shellId, ctx.actor.id);
    if (stored && stored.revision !== draft.revision) throw stale(stored, draft);
    if (!stored && draft.revision !== 0) throw stale(null, draft);
    const saved = stored
      ? await updateReading(trx, stored.id, draft.revision, draft)
      : await insertReading(trx, { id: randomUUID(), shellId, personId: ctx.actor.id, ...draft });
    if (!saved) throw stale((await findReading(ctx.db, shellId, ctx.actor.id)) ?? null, draft);
    await appendEvent(trx, {
      teamId: shell.teamId,
      personId: ctx.actor.id,
      kind: 'reading.saved',
      subjectId: saved.id,
      data: { revision: saved.revision, marks: saved.marks.length },
    });
    await announce(trx, shell.teamId, {
      subject: 'reading',
      id: saved.id,
      regionId: shell.regionId,
      shellId,
    });
    return toReading(saved);
  });
}

function refuseOutside(marks: Mark[], head: { shape: { nx: number; ny: number; channels: number } } | null) {
  if (!head) throw new Problem('conflict', 'This cube has not been read yet. Mark it once it is ready.');
  const { nx, ny, channels } = head.shape;
  const ids = new Set<string>();
  marks.forEach((mark, i) => {
    if (mark.channel >= channels)
      throw new Problem('invalid-input', `The cube has channels 0 to ${channels - 1}.`, {
        field: `marks.${i}.channel`,
      });
    // half a pixel beyond the centres is the edge of the image
    if (!(mark.x >= -0.5 && mark.x <= nx - 0.5 && mark.y >= -0.5 && mark.y <= ny - 0.5))
      throw new Problem('invalid-input', `The mark lies outside the ${nx} by ${ny} pixels of the cube.`, {
        field: `marks.${i}.${mark.x >= -0.5 && mark.x <= nx - 0.5 ? 'y' : 'x'}`,
      });
    if (mark.id !== undefined && ids.has(mark.id))
      throw new Problem('invalid-input', 'Two marks carry the same id.', { field: `marks.${i}.id` });
    if (mark.id !== undefined) ids.add(mark.id);
  });
}

const stale = (stored: ReadingRow | null, draft: ReadingDraft) =>
  new Problem(
    'stale-revision',
    stored
      ? `These marks build on revision ${draft.revision}, but revision ${stored.revision} is stored. Keep yours, take the stored ones, or keep both.`
      : 'There is no stored reading of this revision. Load the shell again.',
    { stored: stored && toReading(stored), yours: draft },
  );
