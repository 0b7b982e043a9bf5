import { useSWRConfig } from 'swr';
import type { Distance, DistanceDraft, Shell, ShellChange, ShellDraft } from '@/shared/contract/shells';
import { api } from './api';
import { isCatalogue, keys } from './keys';
import { useRead, type List } from './useRead';

export const useShells = (regionId: string | null) => useRead<List<Shell>>(regionId && keys.shells(regionId));
export const useShell = (id: string | null) => useRead<Shell>(id && keys.shell(id));
/** The catalogue: `query` as in shared/contract/shells, without the question mark. */
export const useCatalogue = (query: string | null) =>
  useRead<List<Shell>>(query === null ? null : keys.catalogue(query), { keepPreviousData: true }, everyPage);

/** Most answers that are put together: 5000 shells at 500 a time. */
const MOST_PAGES = 10;

async function everyPage(path: string): Promise<List<Shell>> {
  let page = await api<List<Shell>>(path);
  const items = [...page.items];
  for (let n = 1; page.next !== null && n < MOST_PAGES; n++) {
    page = await api<List<Shell>>(`${path}&cursor=${encodeURIComponent(page.next)}`);
    items.push(...page.items);
  }
  return { ...page, items };
}

export const useDistances = (shellId: string | null) =>
  useRead<List<Distance>>(shellId && keys.distances(shellId));

export function useShellActions() {
  const { mutate } = useSWRConfig();
  const refresh = (regionId: string) => {
    void mutate(keys.shells(regionId));
    void mutate(keys.region(regionId));
    void mutate(keys.regions());
    void mutate(isCatalogue);
  };
  const put = (shell: Shell) => {
    void mutate(keys.shell(shell.id), shell, { revalidate: false });
    refresh(shell.regionId);
    return shell;
  };
  return {
    make: async (regionId: string, draft: ShellDraft) =>
      put(await api<Shell>(keys.shells(regionId), { method: 'POST', body: draft })),
    async change(id: string, change: ShellChange): Promise<Shell> {
      const shell = put(await api<Shell>(keys.shell(id), { method: 'PATCH', body: change }));
      if (change.adoptedFitId !== undefined) void mutate(keys.fits(id));
      return shell;
    },
    async remove(shell: Shell) {
      await api(keys.shell(shell.id), { method: 'DELETE' });
      refresh(shell.regionId);
    },
    restore: async (id: string) => put(await api<Shell>(`${keys.shell(id)}/restore`, { method: 'POST' })),
    async addDistance(shell: Shell, draft: DistanceDraft): Promise<Distance> {
      const distance = await api<Distance>(keys.distances(shell.id), { method: 'POST', body: draft });
      void mutate(keys.distances(shell.id));
      void mutate(keys.shell(shell.id));
      refresh(shell.regionId);
      return distance;
    },
  };
}
