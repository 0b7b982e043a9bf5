import { useMemo } from 'react';
import useSWR from 'swr';
import { apiResponse, asProblem } from '@/hooks/api';
import { cubeImage } from '@/hooks/cubeImages';
import { ALL_CHANNELS, decodePlane, type ChannelPlane } from '@/hooks/planes/decodePlane';
import type { Planes } from '@/hooks/planes/usePlanes';
import type { Cube, MapKind } from '@/shared/contract/cubes';

/** A map that ingest made of all channels; null reads none. */
export function useMapPlane(cube: Pick<Cube, 'id' | 'readyAt' | 'overrides'>, kind: MapKind | null): Planes {
  const { data, error, mutate } = useSWR<ChannelPlane>(kind && cubeImage(cube, `maps/${kind}`), readMap, {
    revalidateOnFocus: false,
    revalidateIfStale: false,
    shouldRetryOnError: false,
  });
  return useMemo(
    () => ({
      plane: data ?? null,
      problem: error === undefined ? null : asProblem(error),
      retry: () => void mutate(),
    }),
    [data, error, mutate],
  );
}

async function readMap(path: string): Promise<ChannelPlane> {
  const answer = await apiResponse(path);
  return decodePlane(ALL_CHANNELS, await answer.arrayBuffer(), (name) => answer.headers.get(name));
}
