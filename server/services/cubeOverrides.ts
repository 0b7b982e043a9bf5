import type { Cube, CubeOverrides, CubeSource } from '@/shared/contract/cubes';
import { Problem } from '@/shared/contract/problem';
import { applyOverrides } from '@/shared/fits/overrides';
import { buildWcs } from '@/shared/sky/wcs';
import { updateVelocities } from '../store/channels';
import { countMarked, findCube, setOverrides, setSource } from '../store/cubes';
import type { Context } from './context';
import { choicesOf } from './cubeView';
import { cubeFor, queueIngest, readCube, writeCube } from './cubes';

/**
 * Say what the header does not say, or says wrong; null takes a word back. The header stays as it is. Fits keep the
 * velocities that their marks were frozen with.
 */
export async function overrideCube(ctx: Context, id: string, change: CubeOverrides): Promise<Cube> {
  const row = await cubeFor(ctx, id, 'cube.manage');
  const head = (await findCube(ctx.db, id))!.head; // as the file has it, not as it is understood now
  if (!head) throw new Problem('conflict', 'The header of this cube has not been read yet.');
  const values = withoutNulls({ ...row.overrides, ...change });
  const wcs = buildWcs(applyOverrides(head, values).wcs); // refuses what cannot be
  const velocities = Array.from({ length: head.shape.channels }, (_, k) => wcs.velocityOf(k));
  await writeCube(
    ctx,
    row,
    'cube.overridden',
    async (trx) => {
      await setOverrides(trx, id, Object.keys(values).length > 0 ? values : null, ctx.actor.id);
      await updateVelocities(trx, id, velocities);
    },
    { ...change },
  );
  return readCube(ctx, id);
}

const withoutNulls = (values: CubeOverrides): CubeOverrides =>
  Object.fromEntries(Object.entries(values).filter(([, value]) => value !== null && value !== undefined));

/** Read another image or Stokes plane of the file. Marks lie on what was read before, so there must be none. */
export async function chooseSource(ctx: Context, id: string, { hdu, stokes }: CubeSource): Promise<Cube> {
  const row = await cubeFor(ctx, id, 'cube.manage');
  const choices = choicesOf(row.head);
  if (hdu !== row.head?.hdu && !choices.hdus.some((h) => h.index === hdu && h.usable))
    throw new Problem('invalid-input', `HDU ${hdu} of this file is not a cube.`, { field: 'hdu' });
  // another image may have other planes: that is found out when it is read
  if (hdu === row.head?.hdu && stokes !== 0 && !choices.stokes.some((s) => s.index === stokes))
    throw new Problem('invalid-input', `This image has no Stokes plane ${stokes}.`, { field: 'stokes' });
  if ((await countMarked(ctx.db, id)) > 0)
    throw new Problem(
      'conflict',
      'Marks lie on this cube as it is. Upload the file in another region to read it otherwise.',
    );
  await writeCube(
    ctx,
    row,
    'cube.source-chosen',
    async (trx) => {
      if (!(await setSource(trx, id, hdu, stokes)))
        throw new Problem('conflict', 'This cube is being read. Stop that first, or wait.');
      await queueIngest(trx, id);
    },
    { hdu, stokes },
  );
  return readCube(ctx, id);
}
