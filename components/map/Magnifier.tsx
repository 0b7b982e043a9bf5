import type { RefObject } from 'react';
import type { MapStore } from '@/components/map/mapStore';

export interface MagnifierProps {
  /** The element whose canvases it enlarges. */
  map: RefObject<HTMLElement | null>;
  store: MapStore;
}

// Where there is no canvas (native, tests); the web build takes Magnifier.web.tsx.
export function Magnifier(_: MagnifierProps) {
  return null;
}
