import { useMemo } from 'react';
import useSWR from 'swr';
import { apiResponse, asProblem } from '@/hooks/api';
import { cubeImage, skyImagePlane } from '@/hooks/cubeImages';
import { ALL_CHANNELS, decodePlane, type ChannelPlane } from '@/hooks/planes/decodePlane';
import type { Planes } from '@/hooks/planes/usePlanes';
import type { Cube, MapKind } from '@/shared/contract/cubes';
import type { SkyImage } from '@/shared/contract/images';

/** Of an image of the sky so many pixels are read along its longer side: lines on a map need no more. */
const IMAGE_SIZE = 1024;

/** A map that ingest made of all channels; null reads none. */
export const useMapPlane = (cube: Pick<Cube, 'id' | 'readyAt' | 'overrides'>, kind: MapKind | null): Planes =>
  usePlaneAt(kind && cubeImage(cube, `maps/${kind}`));

/** The numbers of a companion image; null reads none. */
export const useImagePlane = (image: Pick<SkyImage, 'id'> | null): Planes =>
  usePlaneAt(image && skyImagePlane(image, IMAGE_SIZE));

/** A plane that never changes under its address. */
function usePlaneAt(path: string | null): Planes {
  const { data, error, mutate } = useSWR<ChannelPlane>(path, readMap, {
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
