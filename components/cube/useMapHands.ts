import { useMemo } from 'react';
import type { CubeSession } from '@/components/cube/cubeSession';
import type { ChannelMapProps } from '@/components/map/ChannelMap';
import { pixelAt, type ImagePoint } from '@/shared/image/viewport';

type Hands = Pick<
  ChannelMapProps,
  'tool' | 'tools' | 'onPlace' | 'onSelect' | 'onMove' | 'onLasso' | 'onNudge' | 'onRing' | 'onRingKey'
>;

/** A press this near to an offered mark takes it, screen pixels. */
const GHOST_PX = { mouse: 8, touch: 16 } as const;

/**
 * What hands and keys on the map do to the marks. The picture may show the sky otherwise than the cube's image does;
 * marks belong to the image. A stack of all channels has no channel to mark.
 */
export function useMapHands(s: CubeSession): Hands {
  const { seen, axes, tools, mapTool, takeGhosts, placeMark, moveMark, select, lasso, nudge, ring, store } =
    s;
  const { said } = s;
  return useMemo<Hands>(() => {
    const stacked = seen.lie === 'stacked';
    const reach = GHOST_PX[globalThis.matchMedia?.('(pointer: coarse)').matches ? 'touch' : 'mouse'];
    return {
      tool: stacked ? 'move' : mapTool,
      tools: stacked ? undefined : tools,
      onPlace(at: ImagePoint, by) {
        const near = reach / (store.viewport.get()?.scale ?? 1);
        const ghost = tools.ghosts.find((g) => Math.hypot(g.x - at.x, g.y - at.y) <= near);
        const there = seen.toImage(at);
        if (ghost) takeGhosts([ghost.id]);
        else if (there && pixelAt(axes, there)) placeMark(there, by);
        else said.set('The image does not reach there.');
      },
      onSelect: select,
      onMove(id, at, gesture) {
        const there = seen.toImage(at);
        if (there) moveMark(id, there, gesture);
      },
      onLasso: (line) => lasso(line.flatMap((at) => seen.toImage(at) ?? [])),
      onNudge: (right, up, far) => nudge(right, up, far, seen),
      onRing: ring.onRing,
      onRingKey: ring.onRingKey,
    };
  }, [seen, axes, tools, mapTool, takeGhosts, placeMark, moveMark, select, lasso, nudge, ring, store, said]);
}
