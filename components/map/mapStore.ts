import type { RingDraft } from '@/shared/shell/suggest/ringDraft';
import type { ChannelPlane } from '@/hooks/planes/decodePlane';
import { valueStore, type ValueStore } from '@/hooks/valueStore';
import type { Look } from '@/shared/image/tone';
import type { ImagePoint, ScreenPoint, Viewport } from '@/shared/image/viewport';

/** What moves with the pointer: kept outside React, one set a map. */
export interface MapStore {
  viewport: ValueStore<Viewport | null>;
  /** A plane to draw at once, before the page has caught up with the step to its channel. */
  early: ValueStore<ChannelPlane | null>;
  /** A look to draw at once, in the same way. */
  earlyLook: ValueStore<Look | null>;
  /** The image point under the pointer (or the crosshair). */
  hover: ValueStore<ImagePoint | null>;
  /** Where Enter places a mark; shown while the map has the keyboard. */
  crosshair: ValueStore<ImagePoint | null>;
  /** What a finger hides: it is shown in the magnifier. */
  aim: ValueStore<ScreenPoint | null>;
  /** The line that is being drawn around marks. */
  lasso: ValueStore<readonly ImagePoint[] | null>;
  /** The circle that is to become marks. */
  ring: ValueStore<RingDraft | null>;
}

export const mapStore = (): MapStore => ({
  viewport: valueStore<Viewport | null>(null),
  early: valueStore<ChannelPlane | null>(null),
  earlyLook: valueStore<Look | null>(null),
  hover: valueStore<ImagePoint | null>(null),
  crosshair: valueStore<ImagePoint | null>(null),
  aim: valueStore<ScreenPoint | null>(null),
  lasso: valueStore<readonly ImagePoint[] | null>(null),
  ring: valueStore<RingDraft | null>(null),
});
