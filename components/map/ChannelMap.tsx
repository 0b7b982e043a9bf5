// Where there is no pointer and no canvas (native, tests); the web build takes ChannelMap.web.tsx.
import { View } from 'react-native';
import type { MapTool, Phase } from '@/components/map/gestures';
import type { MapStore } from '@/components/map/mapStore';
import { Overlay } from '@/components/map/Overlay';
import { Raster } from '@/components/map/Raster';
import type { Scene } from '@/components/map/scene';
import type { ToolScene } from '@/components/map/toolScene';
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
  /** What a press is for. */
  tool: MapTool;
  /** What the tools lay over the picture. */
  tools?: ToolScene;
  /** Where to look first; the whole image when null. Zoom 1 fits. */
  start: { x: number; y: number; zoom: number } | null;
  onPlace: (at: ImagePoint, by: 'pointer' | 'keys') => void;
  /** `extend`: to what is selected already. */
  onSelect: (mark: string | null, extend: boolean) => void;
  /** A mark is being dragged; all moves of one drag carry the same gesture. */
  onMove: (mark: string, at: ImagePoint, gesture: string) => void;
  /** A line was drawn around marks. */
  onLasso?: (line: readonly ImagePoint[]) => void;
  /** Arrow keys on the selected marks: +1 right or up; `far`: with Shift. */
  onNudge?: (right: number, up: number, far: boolean) => void;
  /** The ring tool's pointer, and how near counts as there, image pixels. */
  onRing?: (phase: Phase, at: ImagePoint, reach: number) => void;
  /** A key while a ring is drawn; true where it was one of the ring's. */
  onRingKey?: (key: string, shift: boolean) => boolean;
}

export function ChannelMap(props: ChannelMapProps) {
  return (
    <View role="img" aria-label={props.label}>
      <Raster store={props.store} plane={props.plane} look={props.look} stale={props.stale} />
      <Overlay store={props.store} scene={props.scene} tools={props.tools} />
    </View>
  );
}
