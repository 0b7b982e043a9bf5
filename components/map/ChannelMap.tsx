// Where there is no pointer and no canvas (native, tests); the web build takes ChannelMap.web.tsx.
import { View } from 'react-native';
import type { MapStore } from '@/components/map/mapStore';
import { Overlay } from '@/components/map/Overlay';
import { Raster } from '@/components/map/Raster';
import type { Scene } from '@/components/map/scene';
import type { ChannelPlane } from '@/hooks/planes/decodePlane';
import type { Look } from '@/shared/image/tone';
import type { ImagePoint } from '@/shared/image/viewport';

export interface ChannelMapProps {
  store: MapStore;
  nx: number;
  ny: number;
  plane: ChannelPlane | null;
  stale: boolean;
  look: Look;
  scene: Scene;
  /** Names the picture, with its velocity. */
  label: string;
  /** Whether taps place marks and drags move them. */
  marking: boolean;
  /** Where to look first; the whole image when null. Zoom 1 fits. */
  start: { x: number; y: number; zoom: number } | null;
  onPlace: (at: ImagePoint) => void;
  onSelect: (mark: string | null) => void;
  /** A mark is being dragged; all moves of one drag carry the same gesture. */
  onMove: (mark: string, at: ImagePoint, gesture: string) => void;
}

export function ChannelMap(props: ChannelMapProps) {
  return (
    <View role="img" aria-label={props.label}>
      <Raster store={props.store} plane={props.plane} look={props.look} stale={props.stale} />
      <Overlay store={props.store} scene={props.scene} />
    </View>
  );
}
