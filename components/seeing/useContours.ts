import { useMemo } from 'react';
import { brightness } from '@/components/cube/words';
import type { Scene } from '@/components/map/scene';
import type { ContourChoice } from '@/components/seeing/seeing';
import { useContourSource } from '@/components/seeing/useContourSource';
import type { SeenSky } from '@/components/seeing/useSeenSky';
import { contoursOf } from '@/shared/image/contours';
import { linesAcross } from '@/shared/image/linesAcross';
import { dequantise } from '@/shared/image/quantise';
import { windowOf } from '@/shared/image/windowPresets';

export interface Contours {
  lines: NonNullable<Scene['contours']>;
  levels: readonly number[];
  ends: readonly [number, number] | null;
  unit: string | null;
  /** What they are contours of, to be stated on the picture; null: there are none. */
  of: string | null;
  /** The same with the levels. */
  words: string | null;
  problem: string | null;
}

const NONE: Contours = {
  lines: [],
  levels: [],
  ends: null,
  unit: null,
  of: null,
  words: null,
  problem: null,
};
/** The usual levels lie in the upper part of what a map spans: lower down they follow noise. */
const LOWEST_SHARE = 0.35;

/** Contours of another map or of a companion image, laid where the picture shows the same sky. */
export function useContours(choice: ContourChoice | null, seen: SeenSky): Contours {
  const { plane, sky: from, name, unit, problem } = useContourSource(choice);
  const count = choice?.count ?? 0;
  const [low, high] = choice?.ends ?? [null, null];
  const found = useMemo(() => {
    if (!plane || count === 0) return null;
    const [from, to] = windowOf(plane, 0.995) ?? [0, 1];
    const ends = [low ?? from + (to - from) * LOWEST_SHARE, high ?? to] as const;
    const levels = Array.from({ length: count }, (_, i) =>
      count === 1 ? ends[0] : ends[0] + ((ends[1] - ends[0]) * i) / (count - 1),
    );
    const contours = contoursOf(dequantise(plane), plane.width, plane.height, levels);
    return { ends, levels, contours, block: plane.block };
  }, [plane, count, low, high]);
  const { sky, nx, ny } = seen;
  const lines = useMemo<Contours['lines']>(() => {
    if (!found || !from) return [];
    const jump = Math.max(nx, ny) / 4;
    const onPicture = ({ l, b }: { l: number; b: number }) => sky.galacticToPixel(l, b);
    return found.contours.map(({ lines: all }, i) => ({
      path: linesAcross(all, found.block, from, onPicture, jump),
      strong: i % 2 === 1,
    }));
  }, [found, from, sky, nx, ny]);
  return useMemo(() => {
    if (!choice) return NONE;
    const at = found?.levels.map(brightness).join(', ');
    return {
      lines,
      unit,
      of: found && name ? `contours: ${name}` : null,
      words: found && name ? `contours: ${name} at ${[at, unit].filter(Boolean).join(' ')}` : null,
      levels: found?.levels ?? [],
      ends: found?.ends ?? null,
      problem: problem ? `${problem.title}. ${problem.detail}` : null,
    };
  }, [choice, lines, found, name, unit, problem]);
}
