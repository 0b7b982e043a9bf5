/** The course of a film that was let go: pure arithmetic, so that it can be tested without a clock. */
export interface Sample {
  x: number;
  /** Milliseconds. */
  time: number;
}

/** Only the last stretch before letting go counts. */
const STRETCH_MS = 90;
/** The speed falls to a third in this time. */
const FADE_MS = 260;
/** Slower than this, px/ms, is letting go, not flicking. */
const LEAST_SPEED = 0.15;

/** Speed in px/ms at the moment of letting go; 0 where the finger had come to rest. */
export function speedOf(samples: readonly Sample[], now: number): number {
  const recent = samples.filter((s) => now - s.time <= STRETCH_MS);
  const first = recent[0];
  const last = recent[recent.length - 1];
  if (!first || !last || last.time - first.time < 8) return 0;
  const speed = (last.x - first.x) / (last.time - first.time);
  return Math.abs(speed) < LEAST_SPEED ? 0 : speed;
}

/** How far, in px, a flick of this speed has come after some milliseconds. */
export const flickedBy = (speed: number, ms: number): number =>
  speed * FADE_MS * (1 - Math.exp(-ms / FADE_MS));

/** When a flick has come to rest: less than half a pixel to go. */
export const flickLasts = (speed: number): number =>
  Math.max(0, FADE_MS * Math.log((Math.abs(speed) * FADE_MS) / 0.5));
