/**
 * How positions lie along the strip.
 *
 * A strip whose channels all find room is a rule: the box goes to where the finger is. One with too many of them is a
 * film: the box stays in the middle and the film runs under it.
 */
export interface StripLayout {
  width: number;
  count: number;
  /** Screen pixels a channel. */
  pitch: number;
  film: boolean;
  /** Channels a thumbnail stands for, so that thumbnails stay wide enough to be recognised. */
  cell: number;
}

const LEAST_PITCH = { fine: 5, coarse: 10 };
const LEAST_THUMBNAIL = 26;

export function stripLayout(width: number, count: number, pointer: 'fine' | 'coarse'): StripLayout {
  const even = width / Math.max(count, 1);
  const film = even < LEAST_PITCH[pointer];
  const pitch = film ? LEAST_PITCH[pointer] : even;
  return { width, count, pitch, film, cell: Math.max(1, Math.ceil(LEAST_THUMBNAIL / pitch)) };
}

/** The screen x of a position, given the position under the box. */
export const xOf = (l: StripLayout, position: number, current: number): number =>
  l.film ? l.width / 2 + (position - current) * l.pitch : (position + 0.5) * l.pitch;

/** The position at a screen x: fractional, not held at the ends. */
export const positionAt = (l: StripLayout, x: number, current: number): number =>
  l.film ? current + (x - l.width / 2) / l.pitch : x / l.pitch - 0.5;

export const held = (l: StripLayout, position: number): number =>
  Math.min(Math.max(position, 0), l.count - 1);

/** The first and the last position any part of which is seen. */
export function seen(l: StripLayout, current: number): [first: number, last: number] {
  if (!l.film) return [0, l.count - 1];
  const half = l.width / 2 / l.pitch;
  return [held(l, Math.floor(current - half)), held(l, Math.ceil(current + half))];
}
