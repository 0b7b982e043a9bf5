import { useMemo } from 'react';
import type { ContourChoice } from '@/components/seeing/seeing';
import type { ApiProblem } from '@/hooks/api';
import type { ChannelPlane } from '@/hooks/planes/decodePlane';
import { useImagePlane, useMapPlane } from '@/hooks/planes/useMapPlane';
import { useCube } from '@/hooks/useCubes';
import { useImage } from '@/hooks/useImages';
import type { Cube } from '@/shared/contract/cubes';
import { buildSky, type Sky } from '@/shared/sky/wcs';
import type { SkySpec, WcsSpec } from '@/shared/sky/wcsSpec';

/** What contours are drawn of: numbers, and where their pixels lie. */
export interface ContourSource {
  plane: ChannelPlane | null;
  sky: Sky | null;
  problem: ApiProblem | null;
}

const NO_CUBE = { id: '', readyAt: null, overrides: null } as Pick<Cube, 'id' | 'readyAt' | 'overrides'>;

/** A map of some cube of the region, or a companion image. */
export function useContourSource(choice: ContourChoice | null): ContourSource {
  const ofImage = choice?.kind === 'image';
  const cube = useCube(choice && !ofImage ? choice.of : null);
  const image = useImage(choice && ofImage ? choice.of : null);
  const kind = choice && choice.kind !== 'image' && cube.data?.status === 'ready' ? choice.kind : null;
  const map = useMapPlane(cube.data ?? NO_CUBE, kind);
  const numbers = useImagePlane((ofImage && image.data) || null);
  const axes = cube.data?.axes;
  const spec = ofImage ? image.data?.sky : axes && (axes.wcs as unknown as WcsSpec).sky;
  const sky = useMemo(() => (spec ? buildSky(spec as unknown as SkySpec) : null), [spec]);
  const { plane, problem } = ofImage ? numbers : map;
  return { plane, sky, problem: (ofImage ? image : cube).problem ?? problem };
}
