/** How a hand moves through the channels. */
export interface Pace {
  /** When the last step was, ms. */
  at: number;
  way: 1 | -1;
  /** Channels a second, smoothed over a few steps. */
  rate: number;
  /** Too fast for full planes to be seen. */
  fast: boolean;
  /** Channels that will have gone by when a plane asked for now is here. */
  ahead: number;
}

/** Channels a second from which on the hand is passing by. */
const FAST = 6;
/** A pause this long begins anew, ms. */
const PAUSE_MS = 600;
/** What a plane may take to come, s; it is asked for that much ahead. */
const COMING_S = 0.5;
const MOST_AHEAD = 40;

/** The pace after a step from one channel to another; turning round begins anew. */
export function pace(before: Pace | null, from: number, to: number, at: number): Pace {
  const way = to >= from ? 1 : -1;
  const since = before ? at - before.at : Infinity;
  if (!before || before.way !== way || since > PAUSE_MS) return { at, way, rate: 0, fast: false, ahead: 0 };
  const now = (Math.abs(to - from) * 1000) / Math.max(since, 1);
  const rate = before.rate === 0 ? now : 0.6 * before.rate + 0.4 * now;
  return { at, way, rate, fast: rate > FAST, ahead: Math.min(Math.ceil(rate * COMING_S), MOST_AHEAD) };
}
