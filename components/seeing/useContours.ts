import { useMemo } from 'react';
import type { Scene } from '@/components/map/scene';
import type { ContourChoice } from '@/components/seeing/seeing';
import type { SeenSky } from '@/components/seeing/useSeenSky';
import { useMapPlane } from '@/hooks/planes/useMapPlane';
import { useCube } from '@/hooks/useCubes';
import type { Cube } from '@/shared/contract/cubes';
import { contoursOf } from '@/shared/image/contours';
import { dequantise } from '@/shared/image/quantise';
import { windowOf } from '@/shared/image/windowPresets';
import { buildWcs } from '@/shared/sky/wcs';
import type { WcsSpec } from '@/shared/sky/wcsSpec';

export interface Contours {
  lines: NonNullable<Scene['contours']>;
  levels: readonly number[];
  ends: readonly [number, number] | null;
  problem: string | null;
}

const NONE: Contours = { lines: [], levels: [], ends: null, problem: null };
const NO_CUBE = { id: '', readyAt: null, overrides: null } as Pick<Cube, 'id' | 'readyAt' | 'overrides'>;
/** The usual levels lie in the upper part of what a map spans: lower down they follow noise. */
const LOWEST_SHARE = 0.35;

/** Contours of a map of some cube of the region, laid where the picture shows the same sky. */
export function useContours(choice: ContourChoice | null, seen: SeenSky): Contours {
  const { data: cube, problem: cubeProblem } = useCube(choice?.cube ?? null);
  const { plane, problem } = useMapPlane(cube ?? NO_CUBE, cube?.status === 'ready' ? choice!.kind : null);
  const wcs = useMemo(
    () => (cube?.axes ? buildWcs(cube.axes.wcs as unknown as WcsSpec) : null),
    [cube?.axes],
  );
  const count = choice?.count ?? 0;
  const [low, high] = choice?.ends ?? [null, null];
  const found = useMemo(() => {
    if (!plane || count === 0) return null;
    const [from, to] = windowOf(plane, 0.995) ?? [0, 1];
    const ends = [low ?? from + (to - from) * LOWEST_SHARE, high ?? to] as const;
    const levels = Array.from({ length: count }, (_, i) =>
      count === 1 ? ends[0] : ends[0] + ((ends[1] - ends[0]) * i) / (count - 1),
    );
    return { ends, levels, contours: contoursOf(dequantise(plane), plane.width, plane.height, levels) };
  }, [plane, count, low, high]);
  const { sky, nx, ny } = seen;
  const lines = useMemo<Contours['lines']>(() => {
    if (!found || !wcs) return [];
    const jump = Math.max(nx, ny) / 4;
    return found.contours.map(({ lines: all }, i) => {
      const path = all.flatMap((line) => {
        const pieces: { x: number; y: number }[][] = [[]];
        for (const { x, y } of line) {
          const at = wcs.pixelToGalactic(x, y);
          const here = at && sky.galacticToPixel(at.l, at.b);
          const piece = pieces[pieces.length - 1]!;
          const before = piece[piece.length - 1];
          if (!here || (before && Math.hypot(here.x - before.x, here.y - before.y) > jump)) pieces.push([]);
          if (here) pieces[pieces.length - 1]!.push(here);
        }
        return pieces.filter((piece) => piece.length > 1);
      });
      return { path, strong: i % 2 === 1 };
    });
  }, [found, wcs, sky, nx, ny]);
  return useMemo(() => {
    if (!choice) return NONE;
    const trouble = cubeProblem ?? problem;
    return {
      lines,
      levels: found?.levels ?? [],
      ends: found?.ends ?? null,
      problem: trouble ? `${trouble.title}. ${trouble.detail}` : null,
    };
  }, [choice, lines, found, cubeProblem, problem]);
}
