import type { SkyImage } from '@/shared/contract/images';
import type { Action } from '@/shared/contract/permissions';
import { Problem } from '@/shared/contract/problem';
import { asOnePlane } from '@/shared/fits/imageHead';
import { blockAverage, blockFor } from '@/shared/image/blockAverage';
import { quantise } from '@/shared/image/quantise';
import { readPlane } from '../files/planes';
import { isUniqueViolation, type Db } from '../store/db';
import { appendEvent } from '../store/events';
import { findImage, listImages, renameImage, setImageRemoved, type ImageRow } from '../store/images';
import { notFound, requirePermission } from './access';
import { announce } from './announce';
import type { Context } from './context';
import { toImage } from './imageView';
import type { PlaneAnswer } from './planes';
import { regionFor } from './regions';

/** Load a companion image for an action, or refuse. One that was taken out is there only for putting it back. */
async function imageFor(ctx: Context, id: string, action: Action, removed = false): Promise<ImageRow> {
  const row = await findImage(ctx.db, id);
  if (!row || (row.removedAt !== null) !== removed) throw notFound('image');
  requirePermission(ctx.actor, action, row.teamId, 'image');
  return row;
}

export async function imagesOfRegion(ctx: Context, regionId: string): Promise<SkyImage[]> {
  await regionFor(ctx, regionId, 'cube.read');
  return (await listImages(ctx.db, regionId)).map(toImage);
}

export const readImage = async (ctx: Context, id: string): Promise<SkyImage> =>
  toImage(await imageFor(ctx, id, 'cube.read'));

/** The numbers of an image, reduced by block averages to at most `size` pixels on its longer side. */
export async function imagePlane(
  ctx: Context,
  id: string,
  { size, bits }: { size?: number | undefined; bits: 8 | 16 },
): Promise<PlaneAnswer> {
  const { head, fileKey, plainKey } = await imageFor(ctx, id, 'cube.read');
  const { nx, ny } = head.shape;
  const plane = new Float32Array(nx * ny);
  const source = await ctx.cubeFiles.open(plainKey ?? fileKey);
  await readPlane(source, asOnePlane(head), 0, plane).finally(() => source.close());
  const block = size === undefined ? 1 : blockFor(nx, ny, size);
  const small = blockAverage(plane, nx, ny, block);
  return { ...quantise(small.plane, bits), nx: small.nx, ny: small.ny, block, unit: head.unit };
}

export async function changeImage(ctx: Context, id: string, name: string): Promise<SkyImage> {
  const row = await imageFor(ctx, id, 'cube.manage');
  await writeImage(ctx, row, 'image.renamed', (trx) => renameImage(trx, id, name), { name });
  return readImage(ctx, id);
}

export async function removeImage(ctx: Context, id: string): Promise<void> {
  const row = await imageFor(ctx, id, 'cube.manage');
  await writeImage(ctx, row, 'image.removed', (trx) => setImageRemoved(trx, id, true));
}

export async function restoreImage(ctx: Context, id: string): Promise<SkyImage> {
  const row = await imageFor(ctx, id, 'cube.manage', true);
  try {
    await writeImage(ctx, row, 'image.restored', (trx) => setImageRemoved(trx, id, false));
  } catch (error) {
    if (isUniqueViolation(error, 'sky_images_checksum'))
      throw new Problem('conflict', 'The same file has been added again since. Use that image.');
    throw error;
  }
  return readImage(ctx, id);
}

/** One change of an image: in one transaction with its event, and told to every open page as a change of the region. */
export async function writeImage(
  ctx: Context,
  { id, teamId, regionId }: Pick<ImageRow, 'id' | 'teamId' | 'regionId'>,
  kind: string,
  change: (trx: Db) => PromiseLike<unknown>,
  data: Record<string, unknown> = {},
): Promise<void> {
  await ctx.db.transaction(async (trx) => {
    await change(trx);
    await appendEvent(trx, { teamId, personId: ctx.actor.id, kind, subjectId: id, data });
    await announce(trx, teamId, { subject: 'region', id: regionId, regionId });
  });
}
