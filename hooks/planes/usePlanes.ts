import { useEffect, useMemo, useSyncExternalStore } from 'react';
import { apiResponse, asProblem, type ApiProblem } from '@/hooks/api';
import { cubeImage } from '@/hooks/cubeImages';
import { decodePlane, type ChannelPlane } from '@/hooks/planes/decodePlane';
import { planeStore, type PlaneStore } from '@/hooks/planes/planeStore';
import type { Cube } from '@/shared/contract/cubes';

/** Phones keep less: a tab that takes too much is ended by the system. */
const BUDGET_BYTES = { fine: 256e6, coarse: 96e6 };

export interface Planes {
  plane: ChannelPlane | null;
  problem: ApiProblem | null;
  retry: () => void;
}

type Drawn = Pick<Cube, 'id' | 'readyAt'>;

const stores = new Map<string, PlaneStore>();

/** One store for a reading of a cube; opening another cube lets the first one's planes go. */
function storeOf(cube: Drawn, side: number, channels: number): PlaneStore {
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
    async load(channel, size, signal) {
      const path = `channels/${channel}/plane${size === null ? '' : `?size=${size}`}`;
      const answer = await apiResponse(cubeImage(cube, path), { signal });
      return decodePlane(channel, await answer.arrayBuffer(), (name) => answer.headers.get(name));
    },
  });
  stores.set(key, store);
  return store;
}

/**
 * The plane to show for a channel: the finest one there is, at once when it is in memory; null while it is on its way.
 *
 * @param sidePx device pixels along the image's longer side as it is drawn now
 */
export function usePlanes(
  { id, readyAt }: Drawn,
  image: { nx: number; ny: number; channels: number },
  channel: number,
  sidePx: number,
): Planes {
  const side = Math.max(image.nx, image.ny);
  const store = useMemo(
    () => storeOf({ id, readyAt }, side, image.channels),
    [id, readyAt, side, image.channels],
  );
  useSyncExternalStore(store.subscribe, store.version, store.version);
  useEffect(() => store.want(channel, sidePx), [store, channel, sidePx]);
  const plane = store.best(channel);
  const problem = plane ? null : store.problem(channel);
  return useMemo(
    () => ({ plane, problem: problem === null ? null : asProblem(problem), retry: store.retry }),
    [plane, problem, store],
  );
}
