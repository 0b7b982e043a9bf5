import type { Path } from '@/shared/image/skyPath';
import type { ImagePoint } from '@/shared/image/viewport';
import type { RingDraft } from '@/shared/shell/suggest/ringDraft';

/** A circle that is being drawn, as the projection shows it; image pixels. */
export interface RingOnMap {
  /** The parts that are seen, and those erased. */
  seen: Path;
  erased: Path;
  centre: ImagePoint | null;
  /** Dragged, it changes the radius. */
  handle: ImagePoint | null;
  /** Where its marks would come. */
  marks: readonly ImagePoint[];
}

/** What tools lay over the map besides its scene. */
export interface ToolScene {
  /** Marks that are offered. */
  ghosts: readonly (ImagePoint & { id: string })[];
  /** Marks as the server has them, while two versions stand against each other. */
  others: readonly ImagePoint[];
  ring: (draft: RingDraft) => RingOnMap;
}
