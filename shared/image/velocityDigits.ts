import { labelOf } from '@/shared/image/ticks';

const LEAST = 1;
const MOST = 4;

/**
 * Digits after the point that tell the velocities of neighbouring channels apart.
 *
 * @param channelWidth km/s between neighbouring channels, of either sign; nought or not finite gives the least
 * @returns 1 for channels of 0.1 km/s and wider, up to 4
 */
export function velocityDigits(channelWidth: number): number {
  const width = Math.abs(channelWidth);
  if (!(width > 0) || !Number.isFinite(width)) return LEAST;
  // a width of 0.1 that lost its last bit on the way is still 0.1
  return Math.min(Math.max(Math.ceil(-Math.log10(width) - 1e-6), LEAST), MOST);
}

/** A channel's velocity as a label, without its unit: “−42.25” where channels are 0.066 km/s wide. */
export const velocityLabel = (velocity: number, channelWidth: number): string =>
  labelOf(velocity, velocityDigits(channelWidth));
