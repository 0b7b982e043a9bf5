// Where there is no canvas (native, tests); the web build takes ChannelTile.web.tsx.
import type { StripPicture } from '@/components/strip/drawStrip';

export interface ChannelTileProps {
  picture: StripPicture | null;
  /** Which of the strip's thumbnails, and how many there are. */
  index: number;
  count: number;
}

export function ChannelTile(_: ChannelTileProps) {
  return null;
}
