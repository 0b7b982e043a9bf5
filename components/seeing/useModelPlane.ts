import { useMemo } from 'react';
import type { SceneModel } from '@/components/cube/useScene';
import { ALL_CHANNELS, type ChannelPlane } from '@/hooks/planes/decodePlane';
import { quantise } from '@/shared/image/quantise';
import { distanceField, modelPicture } from '@/shared/shell/modelPicture';
import type { Wcs } from '@/shared/sky/wcs';

/** Pixels a side for which distances are worked out: they cost a coordinate transformation each. */
const SIDE = 256;

/** The model in the channel shown, as bright as the window is wide; null while it is not looked at. */
export function useModelPlane(
  wanted: boolean,
  model: SceneModel | null,
  { nx, ny }: { nx: number; ny: number },
  wcs: Wcs,
  velocity: number,
  channelWidth: number,
  beam: number,
  window: readonly [number, number],
): ChannelPlane | null {
  const [lon, lat] = [model?.l, model?.b];
  const field = useMemo(() => {
    if (!wanted || lon === undefined || lat === undefined) return null;
    return distanceField(wcs, { nx, ny }, Math.max(1, Math.ceil(Math.max(nx, ny) / SIDE)), { lon, lat });
  }, [wanted, lon, lat, nx, ny, wcs]);
  const [low, high] = window;
  return useMemo(() => {
    if (!field || !model) return null;
    const rim = modelPicture(field, velocity, channelWidth, model, beam);
    const { values, scale, offset, blank } = quantise(rim.map((v) => low + (high - low) * v));
    const { width, height, block } = field;
    return { channel: ALL_CHANNELS, values, width, height, block, scale, offset, blank };
  }, [field, model, velocity, channelWidth, beam, low, high]);
}
