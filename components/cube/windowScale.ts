/**
 * Where brightness lies along the window's track: the root of its share of the range, so that the faint end, where
 * most of the sky is, has most of the room.
 */
export interface TrackRange {
  low: number;
  high: number;
}

export const trackRange = (
  window: readonly [number, number],
  minimum: number | null,
  maximum: number | null,
): TrackRange => ({
  low: Math.min(window[0], minimum ?? window[0]),
  high: Math.max(window[1], maximum ?? window[1]),
});

/** 0 … 1 along the track. */
export function shareOf({ low, high }: TrackRange, value: number): number {
  if (!(high > low)) return 0;
  return Math.sqrt(Math.min(Math.max((value - low) / (high - low), 0), 1));
}

export const valueAt = ({ low, high }: TrackRange, share: number): number =>
  low + (high - low) * Math.min(Math.max(share, 0), 1) ** 2;

/** Move one end; the ends keep a hundredth of the track between them and never pass each other. */
export function movedEnd(
  range: TrackRange,
  window: readonly [number, number],
  end: 0 | 1,
  share: number,
): [number, number] {
  const gap = 0.01;
  const [low, high] = [shareOf(range, window[0]), shareOf(range, window[1])];
  if (end === 0) return [valueAt(range, Math.min(share, high - gap)), window[1]];
  return [window[0], valueAt(range, Math.max(share, low + gap))];
}

/** What the two handles are called. */
export const ENDS = ['Dark end', 'Bright end'] as const;
