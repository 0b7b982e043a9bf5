import { useSWRConfig } from 'swr';
import type {
  Channel,
  Cube,
  CubeHeader,
  CubeOverrides,
  CubeSource,
  Spectrum,
  UploadState,
} from '@/shared/contract/cubes';
import { api } from './api';
import { keys } from './keys';
import { useRead, type List } from './useRead';

export const useCubes = (regionId: string | null) => useRead<List<Cube>>(regionId && keys.cubes(regionId));
export const useCube = (id: string | null) => useRead<Cube>(id && keys.cube(id));
export const useCubeHeader = (id: string | null) => useRead<CubeHeader>(id && keys.header(id));
export const useChannels = (id: string | null) =>
  useRead<List<Channel>>(id && keys.channels(id), { revalidateOnFocus: false });
export const useSpectrum = (id: string | null, query = '') =>
  useRead<Spectrum>(id && keys.spectrum(id, query), { revalidateOnFocus: false, keepPreviousData: true });
/** Uploads begun and not finished, of everybody in the team. */
export const useUploadStates = (regionId: string | null) =>
  useRead<List<UploadState>>(regionId && keys.uploads(regionId));

export function useCubeActions() {
  const { mutate } = useSWRConfig();
  const put = (cube: Cube) => {
    void mutate(keys.cube(cube.id), cube, { revalidate: false });
    void mutate(keys.cubes(cube.regionId));
    void mutate(keys.region(cube.regionId));
    void mutate(keys.regions());
    return cube;
  };
  return {
    rename: async (id: string, name: string) =>
      put(await api<Cube>(keys.cube(id), { method: 'PATCH', body: { name } })),
    retry: async (id: string) => put(await api<Cube>(`${keys.cube(id)}/retry`, { method: 'POST' })),
    cancel: async (id: string) => put(await api<Cube>(`${keys.cube(id)}/cancel`, { method: 'POST' })),
    restore: async (id: string) => put(await api<Cube>(`${keys.cube(id)}/restore`, { method: 'POST' })),
    /** Sends only what changes; null takes it back. */
    async override(id: string, change: CubeOverrides) {
      const cube = await api<Cube>(`${keys.cube(id)}/overrides`, { method: 'PATCH', body: change });
      // another rest frequency or convention moves the velocities
      void mutate(keys.channels(id));
      void mutate((key) => typeof key === 'string' && key.startsWith(keys.spectrum(id)));
      return put(cube);
    },
    chooseSource: async (id: string, source: CubeSource) =>
      put(await api<Cube>(`${keys.cube(id)}/source`, { method: 'PATCH', body: source })),
    async remove(cube: Cube) {
      await api(keys.cube(cube.id), { method: 'DELETE' });
      void mutate(keys.cubes(cube.regionId));
      void mutate(keys.region(cube.regionId));
      void mutate(keys.regions());
    },
  };
}
