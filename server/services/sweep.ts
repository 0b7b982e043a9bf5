import { abandonedCubes } from '../store/ingests';
import { abandonedFits } from '../store/fits';
import { queueIngest } from './cubes';
import type { Parts } from './context';
import { queueFit } from './fits';

/**
 * Queue again what lost its worker. The queue holds a killed worker's jobs locked for hours; the leases here run out
 * in seconds, and a job key that is locked lets a new job in.
 */
export async function sweep(parts: Parts): Promise<{ cubes: number; fits: number }> {
  const cubes = await abandonedCubes(parts.db);
  const fits = await abandonedFits(parts.db);
  for (const { id } of cubes) await queueIngest(parts.db, id);
  for (const { id } of fits) await queueFit(parts.db, id);
  if (cubes.length || fits.length)
    parts.log.warn({ cubes: cubes.length, fits: fits.length }, 'work without a worker was queued again');
  return { cubes: cubes.length, fits: fits.length };
}
