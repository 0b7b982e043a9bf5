import { useSWRConfig } from 'swr';
import type { Fit, FitDraft, FitDraws, FrozenMarks } from '@/shared/contract/fits';
import { api } from './api';
import { keys } from './keys';
import { useRead, type List } from './useRead';

/** Fits of record of a shell, newest first. */
export const useFits = (shellId: string | null) => useRead<List<Fit>>(shellId && keys.fits(shellId));
export const useFit = (id: string | null) => useRead<Fit>(id && keys.fit(id));
export const useFitMarks = (id: string | null) =>
  useRead<FrozenMarks>(id && keys.fitMarks(id), { revalidateOnFocus: false, revalidateIfStale: false });
/** The bootstrap's draws of a finished fit: some hundred kilobytes, asked for where they are drawn. */
export const useFitDraws = (id: string | null) =>
  useRead<FitDraws>(id && keys.fitDraws(id), { revalidateOnFocus: false, revalidateIfStale: false });

export function useFitActions() {
  const { mutate } = useSWRConfig();
  const put = (fit: Fit) => {
    void mutate(keys.fit(fit.id), fit, { revalidate: false });
    void mutate(keys.fits(fit.shellId));
    void mutate(keys.shell(fit.shellId));
    return fit;
  };
  return {
    run: async (shellId: string, draft: FitDraft) =>
      put(await api<Fit>(keys.fits(shellId), { method: 'POST', body: draft })),
    cancel: async (id: string) => put(await api<Fit>(`${keys.fit(id)}/cancel`, { method: 'POST' })),
    retry: async (id: string) => put(await api<Fit>(`${keys.fit(id)}/retry`, { method: 'POST' })),
  };
}
