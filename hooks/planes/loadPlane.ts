import { apiResponse } from '@/hooks/api';
import { cubeImage } from '@/hooks/cubeImages';
import { decodePlane, type ChannelPlane } from '@/hooks/planes/decodePlane';
import type { Cube } from '@/shared/contract/cubes';

/** A channel's plane from the server; `size` is its longest side at most, null: as it is in the cube. */
export async function loadPlane(
  cube: Pick<Cube, 'id' | 'readyAt'>,
  channel: number,
  size: number | null,
  signal?: AbortSignal,
): Promise<ChannelPlane> {
  const path = `channels/${channel}/plane${size === null ? '' : `?size=${size}`}`;
  const answer = await apiResponse(cubeImage(cube, path), { signal });
  return decodePlane(channel, await answer.arrayBuffer(), (name) => answer.headers.get(name));
}
