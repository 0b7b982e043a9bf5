// Where there is no canvas (native, tests); the web build takes Overlay.web.tsx.
import { View } from 'react-native';
import type { MapStore } from '@/components/map/mapStore';
import type { Scene } from '@/components/map/scene';

export interface OverlayProps {
  store: MapStore;
  scene: Scene;
}

export function Overlay({ scene }: OverlayProps) {
  return <View aria-label={`${scene.marks.filter((mark) => mark.away === 0).length} marks`} />;
}
