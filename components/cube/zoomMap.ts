import type { MapStore } from '@/components/map/mapStore';
import { fitted, zoomedAbout } from '@/shared/image/viewport';

/** Zoom about the middle of the map; null shows the whole image. */
export function zoomMap(store: MapStore, factor: number | null): void {
  const v = store.viewport.get();
  if (!v) return;
  store.viewport.set(
    factor === null
      ? fitted(v.nx, v.ny, v.width, v.height)
      : zoomedAbout(v, factor, { sx: v.width / 2, sy: v.height / 2 }),
  );
}
