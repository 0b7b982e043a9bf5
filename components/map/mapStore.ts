import { valueStore, type ValueStore } from '@/hooks/valueStore';
import type { ImagePoint, Viewport } from '@/shared/image/viewport';

/** What moves with the pointer: kept outside React, one set a map. */
export interface MapStore {
  viewport: ValueStore<Viewport | null>;
  /** The image point under the pointer (or the crosshair). */
  hover: ValueStore<ImagePoint | null>;
  /** Where Enter places a mark; shown while the map has the keyboard. */
  crosshair: ValueStore<ImagePoint | null>;
}

export const mapStore = (): MapStore => ({
  viewport: valueStore<Viewport | null>(null),
  hover: valueStore<ImagePoint | null>(null),
  crosshair: valueStore<ImagePoint | null>(null),
});
