import type { ChannelReading } from '@/hooks/reading/skyMarks';
import { LEAST_CHANNELS, LEAST_MARKS } from '@/shared/shell/fitInput';
import { velocityLabel } from '@/shared/image/velocityDigits';

export interface AdviceInput {
  readings: readonly ChannelReading[];
  marks: number;
  /** There is a live fit. */
  fitted: boolean;
  /** Why there is no fit though there are marks enough. */
  problem: string | null;
  /** km/s. */
  channelWidth: number;
}

const counted = (n: number, one: string) => `${n} ${one}${n === 1 ? '' : 's'}`;

/** What would help most now, in one sentence under the reading. */
export function advice({ readings, marks, fitted, problem, channelWidth }: AdviceInput): string {
  if (marks === 0)
    return 'Find a channel where the ring is clear and tap points along its rim. Three marks draw its ring; six marks on three channels fit the shell.';
  const moreMarks = Math.max(LEAST_MARKS - marks, 0);
  const moreChannels = Math.max(LEAST_CHANNELS - readings.length, 0);
  if (moreChannels > 0) {
    const least = Math.max(moreMarks, moreChannels);
    return `${counted(least, 'more mark')} on ${counted(moreChannels, 'more channel')} and the fit appears.`;
  }
  if (moreMarks > 0) return `${counted(moreMarks, 'more mark')} and the fit appears.`;
  if (!fitted) return problem ?? 'The fit is on its way.';
  const thin = readings.filter((r) => r.marks < 3);
  if (thin.length > 0)
    return `A third mark on ${thin
      .map((r) => velocityLabel(r.velocity, channelWidth))
      .slice(0, 3)
      .join(', ')} km/s would show whether ${thin.length === 1 ? 'that ring agrees' : 'those rings agree'}.`;
  return 'Run the fit of record when you are content.';
}
