// Where there is no canvas (native, tests); the web build takes Overlay.web.tsx.
import { View } from 'react-native';
import type { MapStore } from '@/components/map/mapStore';
import type { Scene } from '@/components/map/scene';
import type { ToolScene } from '@/components/map/toolScene';

export interface OverlayProps {
  store: MapStore;
  scene: Scene;
  tools?: ToolScene;
}

export function Overlay({ scene }: OverlayProps) {
  return <View aria-label={`${scene.marks.filter((mark) => mark.away === 0).length} marks`} />;
}
