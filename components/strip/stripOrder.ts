/** Channels by rising velocity, whichever way the file's axis runs. Positions count from 0 at the lowest velocity. */
export interface StripOrder {
  /** The channel at each position. */
  channels: readonly number[];
  /** The position of each channel. */
  positions: readonly number[];
  /** Velocity at each position, rising, km/s. */
  velocities: readonly number[];
}

/** km/s from one channel to the next, on the mean; 0 where there is only one. */
export const channelStep = ({ velocities: v }: StripOrder): number =>
  v.length > 1 ? (v[v.length - 1]! - v[0]!) / (v.length - 1) : 0;

/** @param velocities of the channels, in the order of the file */
export function stripOrder(velocities: readonly number[]): StripOrder {
  const channels = velocities.map((_, k) => k).sort((a, b) => velocities[a]! - velocities[b]! || a - b);
  const positions = new Array<number>(channels.length);
  channels.forEach((channel, position) => (positions[channel] = position));
  return { channels, positions, velocities: channels.map((k) => velocities[k]!) };
}

/**
 * Where on the strip a velocity lies: whole numbers at the centres of channels, fractions between, and beyond the ends
 * as if the last step went on.
 */
export function positionOfVelocity(order: StripOrder, velocity: number): number {
  const v = order.velocities;
  if (v.length < 2) return 0;
  let low = 0;
  let high = v.length - 1;
  while (high - low > 1) {
    const middle = (low + high) >> 1;
    if (v[middle]! <= velocity) low = middle;
    else high = middle;
  }
  const step = v[high]! - v[low]!;
  return step > 0 ? low + (velocity - v[low]!) / step : low;
}

/** The channel some steps up in velocity (or down), held at the ends. */
export function stepped(order: StripOrder, channel: number, steps: number): number {
  const last = order.channels.length - 1;
  const position = Math.min(Math.max((order.positions[channel] ?? 0) + steps, 0), last);
  return order.channels[position] ?? channel;
}
