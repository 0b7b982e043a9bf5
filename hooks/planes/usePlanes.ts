import { useEffect, useMemo, useSyncExternalStore } from 'react';
import { asProblem, type ApiProblem } from '@/hooks/api';
import type { ChannelPlane } from '@/hooks/planes/decodePlane';
import { loadPlane } from '@/hooks/planes/loadPlane';
import { planeStore, type PlaneStore } from '@/hooks/planes/planeStore';
import { useThumbnailPlanes } from '@/hooks/planes/thumbnailPlanes';
import type { Cube } from '@/shared/contract/cubes';

/** Phones keep less: a tab that takes too much is ended by the system. */
const BUDGET_BYTES = { fine: 160e6, coarse: 96e6 };

export interface Planes {
  plane: ChannelPlane | null;
  problem: ApiProblem | null;
  retry: () => void;
}

type Drawn = Pick<Cube, 'id' | 'readyAt' | 'window'>;
type Image = { nx: number; ny: number; channels: number };

const stores = new Map<string, PlaneStore>();

/** One store for a reading of a cube; opening another cube lets the first one's planes go. */
function storeOf(cube: Pick<Cube, 'id' | 'readyAt'>, side: number, channels: number): PlaneStore {
  const key = `${cube.id} ${cube.readyAt}`;
  const known = stores.get(key);
  if (known) return known;
  for (const [id, store] of stores) {
    store.close();
    stores.delete(id);
  }
  const coarse = globalThis.matchMedia?.('(pointer: coarse)').matches ?? false;
  const store = planeStore({
    side,
    channels,
    budgetBytes: coarse ? BUDGET_BYTES.coarse : BUDGET_BYTES.fine,
    load: (channel, size, signal) => loadPlane(cube, channel, size, signal),
  });
  stores.set(key, store);
  return store;
}

export interface ChannelPlanes extends Planes {
  store: PlaneStore;
  /** Changes with what the store holds. */
  version: number;
  /** A channel's thumbnail as a plane; null until they are read. */
  thumbnail: (channel: number) => ChannelPlane | null;
}

/**
 * The plane to show for a channel: the finest one there is, at once when it is in memory; else its thumbnail.
 *
 * @param sidePx device pixels along the image's longer side as it is drawn now
 * @param others channels that are needed with it
 */
export function usePlanes(
  cube: Drawn,
  image: Image,
  channel: number,
  sidePx: number,
  others: readonly number[] = NONE,
): ChannelPlanes {
  const { id, readyAt } = cube;
  const side = Math.max(image.nx, image.ny);
  const store = useMemo(
    () => storeOf({ id, readyAt }, side, image.channels),
    [id, readyAt, side, image.channels],
  );
  const version = useSyncExternalStore(store.subscribe, store.version, store.version);
  useEffect(() => store.want(channel, sidePx, others), [store, channel, sidePx, others]);
  const thumbnail = useThumbnailPlanes(cube, image);
  const held = store.best(channel);
  const problem = held ? null : store.problem(channel);
  const plane = held ?? (problem === null ? thumbnail(channel) : null);
  return useMemo(
    () => ({
      plane,
      problem: problem === null ? null : asProblem(problem),
      retry: store.retry,
      store,
      version,
      thumbnail,
    }),
    [plane, problem, store, version, thumbnail],
  );
}

const NONE: readonly number[] = [];
