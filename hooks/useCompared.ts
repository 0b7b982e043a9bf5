import useSWR from 'swr';
import type { Fit, FrozenMarks } from '@/shared/contract/fits';
import type { Shell } from '@/shared/contract/shells';
import { api, asProblem } from './api';
import { keys } from './keys';
import type { Read } from './useRead';

/** A shell with the fit that stands for it; null where none is adopted. */
export interface Compared {
  shell: Shell;
  fit: Fit | null;
  channelWidth: number | null;
}

async function load(id: string): Promise<Compared> {
  const shell = await api<Shell>(keys.shell(id));
  if (!shell.adoptedFitId) return { shell, fit: null, channelWidth: null };
  const [fit, marks] = await Promise.all([
    api<Fit>(keys.fit(shell.adoptedFitId)),
    api<FrozenMarks>(keys.fitMarks(shell.adoptedFitId)),
  ]);
  return { shell, fit, channelWidth: marks.channelWidth };
}

/** Several shells with their adopted fits, in the order asked for. */
export function useCompared(ids: readonly string[]): Read<Compared[]> {
  const { data, error, isLoading, mutate } = useSWR(ids.length > 0 ? ['compared', ...ids] : null, () =>
    Promise.all(ids.map(load)),
  );
  return {
    data: ids.length > 0 ? data : [],
    problem: error === undefined ? null : asProblem(error),
    waiting: isLoading && data === undefined,
    reload: () => mutate(),
  };
}
