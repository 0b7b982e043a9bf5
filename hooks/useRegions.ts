import { useSWRConfig } from 'swr';
import type { Region, RegionChange, RegionDraft } from '@/shared/contract/regions';
import { api } from './api';
import { keys } from './keys';
import { useRead, type List } from './useRead';

export const useRegions = () => useRead<List<Region>>(keys.regions());
export const useRegion = (id: string | null) => useRead<Region>(id && keys.region(id));

export function useRegionActions() {
  const { mutate } = useSWRConfig();
  return {
    async make(draft: RegionDraft): Promise<Region> {
      const region = await api<Region>(keys.regions(), { method: 'POST', body: draft });
      void mutate(keys.region(region.id), region, { revalidate: false });
      void mutate(keys.regions());
      return region;
    },
    async change(id: string, change: RegionChange): Promise<Region> {
      const region = await api<Region>(keys.region(id), { method: 'PATCH', body: change });
      void mutate(keys.region(id), region, { revalidate: false });
      void mutate(keys.regions());
      return region;
    },
  };
}
