import { useMemo } from 'react';
import useSWR from 'swr';
import { apiResponse } from '@/hooks/api';
import { cubeImage } from '@/hooks/cubeImages';
import type { ChannelPlane } from '@/hooks/planes/decodePlane';
import type { Cube } from '@/shared/contract/cubes';

/** All thumbnails of a cube side by side as grey levels, for each `step`th channel. */
export interface StripGrey {
  pixels: ImageData;
  step: number;
}

/** The thumbnails of a cube; read once for the strip and for the map. */
export function useStripGrey(cube: Pick<Cube, 'id' | 'readyAt'>) {
  return useSWR<StripGrey | null>(cubeImage(cube, 'strip'), readStrip, {
    revalidateOnFocus: false,
    revalidateIfStale: false,
    revalidateOnReconnect: false,
    shouldRetryOnError: false,
  });
}

async function readStrip(path: string): Promise<StripGrey | null> {
  if (typeof createImageBitmap === 'undefined') return null;
  const answer = await apiResponse(path);
  const bitmap = await createImageBitmap(await answer.blob());
  const canvas = document.createElement('canvas');
  canvas.width = bitmap.width;
  canvas.height = bitmap.height;
  const ctx = canvas.getContext('2d', { willReadFrequently: true });
  if (!ctx) return null;
  ctx.drawImage(bitmap, 0, 0);
  bitmap.close();
  const pixels = ctx.getImageData(0, 0, canvas.width, canvas.height);
  return { pixels, step: Math.max(1, Number(answer.headers.get('Strip-Step') ?? 1) || 1) };
}

/**
 * A channel's thumbnail in the form of a plane, to stand in for one that is not there yet. Its numbers are grey levels
 * through the cube's window (1 … 255, 0 a blank), right to a few hundredths of it: the pictures are compressed.
 */
export function thumbnailPlane(
  { pixels, step }: StripGrey,
  image: { nx: number; ny: number; channels: number },
  window: readonly [number, number],
  channel: number,
): ChannelPlane {
  const width = Math.round(pixels.width / Math.ceil(image.channels / step));
  const height = pixels.height;
  const left = Math.floor(channel / step) * width;
  const values = new Uint16Array(width * height);
  for (let y = 0; y < height; y++)
    for (let x = 0; x < width; x++)
      values[y * width + x] = pixels.data[4 * ((height - 1 - y) * pixels.width + left + x)]!;
  const scale = (window[1] - window[0]) / 254;
  const block = Math.ceil(Math.max(image.nx, image.ny) / Math.max(width, height));
  return { channel, values, width, height, block, scale, offset: window[0] - scale, blank: 0, standIn: true };
}

/** Thumbnails by channel, the last few kept so that a plane keeps its identity while it is shown. */
export function useThumbnailPlanes(
  cube: Pick<Cube, 'id' | 'readyAt' | 'window'>,
  image: { nx: number; ny: number; channels: number },
): (channel: number) => ChannelPlane | null {
  const { data } = useStripGrey(cube);
  const { window } = cube;
  return useMemo(() => {
    const made = new Map<number, ChannelPlane>();
    return (channel) => {
      if (!data || !window) return null;
      const known = made.get(channel);
      if (known) return known;
      if (made.size > 64) made.clear();
      const plane = thumbnailPlane(data, image, window, channel);
      made.set(channel, plane);
      return plane;
    };
  }, [data, image, window]);
}
