import { useSWRConfig } from 'swr';
import type { SkyImage } from '@/shared/contract/images';
import { api } from './api';
import { keys } from './keys';
import { sendFile, type SendOptions } from './uploads/sendFile';
import { useRead, type List } from './useRead';

/** The companion images of a region. */
export const useImages = (regionId: string | null) =>
  useRead<List<SkyImage>>(regionId && keys.images(regionId));

export const useImage = (id: string | null) => useRead<SkyImage>(id && keys.image(id));

export function useImageActions() {
  const { mutate } = useSWRConfig();
  const put = (image: SkyImage) => {
    void mutate(keys.image(image.id), image, { revalidate: false });
    void mutate(keys.images(image.regionId));
    return image;
  };
  return {
    /** Sends one file; it is checked at once, and a refusal says what to do. */
    add: async (regionId: string, file: File, options?: SendOptions) =>
      put(
        await sendFile<SkyImage>(
          `${keys.images(regionId)}?fileName=${encodeURIComponent(file.name)}`,
          file,
          options,
        ),
      ),
    rename: async (id: string, name: string) =>
      put(await api<SkyImage>(keys.image(id), { method: 'PATCH', body: { name } })),
    restore: async (id: string) => put(await api<SkyImage>(`${keys.image(id)}/restore`, { method: 'POST' })),
    async remove({ id, regionId }: SkyImage) {
      await api(keys.image(id), { method: 'DELETE' });
      void mutate(keys.images(regionId));
    },
  };
}
