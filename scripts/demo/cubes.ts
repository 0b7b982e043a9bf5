import type { Cube, UploadState } from '@/shared/contract/cubes';
import { makeCube } from '@/shared/synthetic/makeCube';
import { writeFits } from '@/shared/synthetic/writeFits';
import { Refused, type Client } from './client';
import { until } from './until';
import type { PlannedCube } from './plan';

/** The planned cube in its region: the one that is there, or made and sent now. */
export async function cubeInRegion(who: Client, regionId: string, planned: PlannedCube): Promise<Cube> {
  const { fileName, recipe } = planned;
  for (const begun of await who.list<UploadState>(`/regions/${regionId}/uploads`))
    if (begun.mine && begun.fileName === fileName) await who.cancelUpload(begun.id); // by a run that was killed
  const there = await who.list<Cube>(`/regions/${regionId}/cubes`);
  const found = there.find((cube) => cube.fileName === fileName);
  if (found) return readAgain(who, found);
  const bytes = writeFits(recipe, makeCube(recipe));
  const id = await who.upload(regionId, fileName, bytes).catch((error: unknown) => {
    // a run that was killed had sent these bytes already, under another name perhaps
    if (error instanceof Refused && typeof error.problem?.cubeId === 'string') return error.problem.cubeId;
    throw error;
  });
  return who.get<Cube>(`/cubes/${id}`);
}

const readAgain = (who: Client, cube: Cube): Promise<Cube> =>
  cube.status === 'failed' || cube.status === 'cancelled'
    ? who.send('POST', `/cubes/${cube.id}/retry`)
    : Promise.resolve(cube);

/** The cube once the worker has read it. */
export function untilReady(who: Client, cube: Cube): Promise<Cube> {
  return until(`${cube.fileName} to be read by the worker`, async () => {
    const now = await who.get<Cube>(`/cubes/${cube.id}`);
    if (now.status === 'failed' || now.status === 'cancelled')
      throw new Error(`${cube.fileName} could not be read: ${now.problem?.detail ?? now.status}`);
    return now.status === 'ready' ? now : null;
  });
}
