import { Problem } from '@/shared/contract/problem';
import type { CubeHead } from '@/shared/fits/cubeHead';
import { separation } from '@/shared/sky/greatCircle';
import { buildWcs } from '@/shared/sky/wcs';
import { findCube, type CubeRow } from '../store/cubes';
import type { Db } from '../store/db';
import { findFrozenReading, type FitRow } from '../store/fits';
import { understood } from './cubeView';

/** Places and velocities that differ by less than this are the same; rounding is far below. */
const SAME_DEGREES = 1e-6;
const SAME_KM_S = 1e-6;

/**
 * The cube of a fit, if its pixels can be read and still mean what they meant when the marks were frozen.
 *
 * @throws Problem conflict, saying what stands in the way
 */
export async function cubeToTrace(
  db: Db,
  fit: Pick<FitRow, 'id' | 'cubeId'>,
): Promise<CubeRow & { head: CubeHead }> {
  const refuse = (detail: string) => new Problem('conflict', detail, { field: 'fitId' });
  const stored = await findCube(db, fit.cubeId);
  if (!stored || stored.removedAt !== null)
    throw refuse('The cube of this fit has been taken out. Put it back to trace the rim in it.');
  const row = understood(stored);
  const { head } = row;
  if (row.status !== 'ready' || !head)
    throw refuse(`The cube of this fit is ${row.status}. Its rim is traced once the cube is ready.`);
  const wcs = buildWcs(head.wcs);
  const { marks } = (await findFrozenReading(db, fit.id))!;
  const same = marks.every((mark) => {
    const place = wcs.pixelToGalactic(mark.x, mark.y);
    return (
      place !== null &&
      separation({ lon: place.l, lat: place.b }, { lon: mark.l, lat: mark.b }) < SAME_DEGREES &&
      Math.abs(wcs.velocityOf(mark.channel) - mark.velocity) < SAME_KM_S
    );
  });
  if (!same)
    throw refuse(
      'The header of the cube is understood otherwise since this fit was made. Fit the marks again, and trace around that fit.',
    );
  return { ...row, head };
}
