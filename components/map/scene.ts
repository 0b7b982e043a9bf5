import type { Furniture } from '@/components/map/furniture';
import type { GraticuleLine } from '@/shared/image/graticule';
import type { PictureLayers } from '@/shared/image/pictureLayers';
import type { Path } from '@/shared/image/skyPath';
import type { ImagePoint, Viewport } from '@/shared/image/viewport';

export interface SceneMark extends ImagePoint {
  id: string;
  /** Channels away from the one shown: 0 is this one's own mark, others are faint. */
  away: number;
  selected: boolean;
  /** The person is not sure of it: drawn hollow. */
  unsure?: boolean;
}

/** Everything that is drawn over a channel map; paths in image pixels. */
export interface Scene {
  /** The lines for a viewport, worked out anew as the map moves; null: not wanted. */
  graticule: ((viewport: Viewport) => GraticuleLine[]) | null;
  marks: readonly SceneMark[];
  /** The model's ring in this channel. */
  modelRing: Path | null;
  /** The ring through this channel's own marks. */
  ownRing: Path | null;
  centre: ImagePoint | null;
  /** The beam's outline about (0, 0), image pixels. */
  beam: readonly ImagePoint[] | null;
  /** Scale bar and directions for a viewport. */
  furniture?: ((viewport: Viewport) => Furniture) | null;
  /** Contours of another picture of the same sky. */
  contours?: readonly { path: Path; strong: boolean }[];
  layers?: PictureLayers;
}

/** The colours of what lies over an image; the same in both themes, since image panels are dark in both. */
export interface SceneColours {
  person: string;
  model: string;
  edge: string;
  text: string;
  shade: string;
  font: string;
}

/** How near a press must be to a mark to mean it, screen pixels. */
export const HIT_PX = { mouse: 12, pen: 16, touch: 26 } as const;

/** The mark of this channel nearest to a screen point, if it is near enough. */
export function markAt(
  marks: readonly SceneMark[],
  at: ImagePoint,
  scale: number,
  reachPx: number,
): string | null {
  let nearest: string | null = null;
  let distance = reachPx / scale;
  for (const mark of marks) {
    if (mark.away !== 0) continue;
    const d = Math.hypot(mark.x - at.x, mark.y - at.y);
    if (d <= distance) {
      distance = d;
      nearest = mark.id;
    }
  }
  return nearest;
}
