import type { PlacedMark } from '@/hooks/reading/placedMark';
import type { SkyMark } from '@/shared/shell/fitInput';
import { fitRing, type Ring } from '@/shared/shell/ring';
import type { Wcs } from '@/shared/sky/wcs';

/** A rim mark as the fit wants it, with the identity it has on the screen. */
export interface SkyRimMark extends SkyMark {
  id: string;
  channel: number;
}

/** Marks on the sky; a mark outside the projection has no place there and is left out. */
export function skyMarks(marks: readonly PlacedMark[], wcs: Wcs): SkyRimMark[] {
  return marks.flatMap(({ id, channel, x, y, sigma, placed }) => {
    const at = wcs.pixelToGalactic(x, y);
    if (!at) return [];
    const mark: SkyRimMark = { id, channel, l: at.l, b: at.b, velocity: wcs.velocityOf(channel) };
    return [{ ...mark, ...(sigma !== undefined && { sigma }), ...(placed === 'ring' && { drawn: true }) }];
  });
}

/** A channel that carries marks, with the circle through them where three or more trace one. */
export interface ChannelReading {
  channel: number;
  velocity: number;
  marks: number;
  ring: Ring | null;
  /** Why there is no ring though there are marks enough. */
  reason: 'too-few' | 'same-point' | 'straight-line' | null;
}

/** The reading by channel, by rising velocity. */
export function readingByChannel(marks: readonly SkyRimMark[]): ChannelReading[] {
  const channels = new Map<number, SkyRimMark[]>();
  for (const mark of marks) {
    const own = channels.get(mark.channel);
    if (own) own.push(mark);
    else channels.set(mark.channel, [mark]);
  }
  return [...channels]
    .map(([channel, own]) => {
      const found = fitRing(own);
      return {
        channel,
        velocity: own[0]!.velocity,
        marks: own.length,
        ring: found.ring,
        reason: found.ring ? null : found.reason,
      };
    })
    .sort((a, b) => a.velocity - b.velocity);
}
