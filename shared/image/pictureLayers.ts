import type { Path } from '@/shared/image/skyPath';
import type { ImagePoint } from '@/shared/image/viewport';

/** What others, other shells and the brightness itself say, under the person's own marks; image pixels. */
export interface PictureLayers {
  /** Places on the rim that were found in the brightness, and where it was looked for and not found. */
  traced: readonly ImagePoint[];
  missed: readonly ImagePoint[];
  /** Rings of other shells on this channel. */
  shells: readonly { name: string; path: Path; at: ImagePoint | null }[];
  /** Marks that a fit froze. */
  frozen: readonly ImagePoint[];
}
