import { useMemo } from 'react';
import { useSWRConfig } from 'swr';
import type { Trace, TraceDraft, TracedSector } from '@/shared/contract/traces';
import { api } from './api';
import { keys } from './keys';
import { useRead, type List } from './useRead';

/** Rims traced from the brightness, newest first. */
export const useTraces = (shellId: string | null) => useRead<List<Trace>>(shellId && keys.traces(shellId));

const NONE: readonly TracedSector[] = [];

/**
 * The sectors of the newest finished trace of a shell on a cube, for drawing on its channel maps; those in which no
 * rim was found carry `rejected` and no place. Empty while there is none.
 */
export function useTracedSectors(shellId: string | null, cubeId: string): readonly TracedSector[] {
  const { data } = useTraces(shellId);
  return useMemo(
    () => data?.items.find((t) => t.cubeId === cubeId && t.outcome)?.outcome?.sectors ?? NONE,
    [data, cubeId],
  );
}

export function useTraceActions() {
  const { mutate } = useSWRConfig();
  const put = (trace: Trace) => {
    void mutate(keys.trace(trace.id), trace, { revalidate: false });
    void mutate(keys.traces(trace.shellId));
    return trace;
  };
  return {
    start: async (shellId: string, draft: TraceDraft) =>
      put(await api<Trace>(keys.traces(shellId), { method: 'POST', body: draft })),
    cancel: async (id: string) => put(await api<Trace>(`${keys.trace(id)}/cancel`, { method: 'POST' })),
  };
}
