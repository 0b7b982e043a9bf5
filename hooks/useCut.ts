import { useEffect, useRef, useState } from 'react';
import { apiResponse, asProblem, type ApiProblem } from '@/hooks/api';
import { cubeImage } from '@/hooks/cubeImages';
import { ALL_CHANNELS, decodePlane, type ChannelPlane } from '@/hooks/planes/decodePlane';
import type { Cube } from '@/shared/contract/cubes';

export interface Cut {
  /** What was asked for: the query. */
  query: string;
  /** Places across, channels upward. */
  plane: ChannelPlane;
  interpolation: string;
}

/**
 * Position against velocity along a cut. While the query changes quickly one request runs at a time and the newest
 * waits, so that a drag is followed as fast as the server answers; the last cut stays until the next is there.
 */
export function useCut(
  cube: Pick<Cube, 'id' | 'readyAt'>,
  query: string | null,
): { cut: Cut | null; problem: ApiProblem | null; retry: () => void } {
  const [cut, setCut] = useState<Cut | null>(null);
  const [problem, setProblem] = useState<ApiProblem | null>(null);
  const [tries, setTries] = useState(0);
  const line = useRef<{ running: boolean; next: string | null }>({ running: false, next: null });
  const { id, readyAt } = cube;
  useEffect(() => {
    if (!query) return;
    const here = line.current;
    here.next = query;
    const run = async () => {
      if (here.running) return;
      here.running = true;
      while (here.next) {
        const asked = here.next;
        here.next = null;
        try {
          const answer = await apiResponse(cubeImage({ id, readyAt }, `cut?${asked}`));
          const plane = decodePlane(ALL_CHANNELS, await answer.arrayBuffer(), (n) => answer.headers.get(n));
          setCut({ query: asked, plane, interpolation: answer.headers.get('Cut-Interpolation') ?? '' });
          setProblem(null);
        } catch (error) {
          setProblem(asProblem(error));
        }
      }
      here.running = false;
    };
    void run();
  }, [id, readyAt, query, tries]);
  return { cut, problem, retry: () => setTries((n) => n + 1) };
}
