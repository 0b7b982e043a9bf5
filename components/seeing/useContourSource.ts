import { useMemo } from 'react';
import { unitOf, VIEWS } from '@/components/cube/views';
import type { ContourChoice } from '@/components/seeing/seeing';
import type { ApiProblem } from '@/hooks/api';
import type { ChannelPlane } from '@/hooks/planes/decodePlane';
import { useImagePlane, useMapPlane } from '@/hooks/planes/useMapPlane';
import { useCube } from '@/hooks/useCubes';
import { useImage } from '@/hooks/useImages';
import type { Cube, MapKind } from '@/shared/contract/cubes';
import type { SkyImage } from '@/shared/contract/images';
import { buildSky, type Sky } from '@/shared/sky/wcs';
import type { SkySpec, WcsSpec } from '@/shared/sky/wcsSpec';

/** What contours are drawn of: numbers, and where their pixels lie. */
export interface ContourSource {
  plane: ChannelPlane | null;
  sky: Sky | null;
  /** What it is a map of, for people, and its unit; null until it is known. */
  name: string | null;
  unit: string | null;
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
  const { name, unit } = ofImage ? nameOfImage(image.data) : nameOfMap(cube.data, kind);
  return { plane, sky, name, unit, problem: (ofImage ? image : cube).problem ?? problem };
}

const nameOfImage = (image: SkyImage | undefined) => ({
  name: image?.name ?? null,
  unit: image?.unit ?? null,
});
const nameOfMap = (cube: Cube | undefined, kind: MapKind | null) => ({
  name: cube && kind ? `${VIEWS[kind].label.toLowerCase()} of ${cube.name}` : null,
  unit: kind ? unitOf(kind, cube?.axes?.unit ?? null) : null,
});
