import { abandonedCubes } from '../store/ingests';
import { abandonedFits } from '../store/fits';
import { abandonedTraces } from '../store/traces';
import { queueIngest } from './cubes';
import type { Parts } from './context';
import { queueFit } from './fits';
import { queueTrace } from './traces';

/**
 * Queue again what lost its worker. The queue holds a killed worker's jobs locked for hours; the leases here run out
 * in seconds, and a job key that is locked lets a new job in.
 */
export async function sweep(parts: Parts): Promise<{ cubes: number; fits: number; traces: number }> {
  const cubes = await abandonedCubes(parts.db);
  const fits = await abandonedFits(parts.db);
  const traces = await abandonedTraces(parts.db);
  for (const { id } of cubes) await queueIngest(parts.db, id);
  for (const { id } of fits) await queueFit(parts.db, id);
  for (const { id } of traces) await queueTrace(parts.db, id);
  const found = { cubes: cubes.length, fits: fits.length, traces: traces.length };
  if (found.cubes + found.fits + found.traces > 0)
    parts.log.warn(found, 'work without a worker was queued again');
  return found;
}
