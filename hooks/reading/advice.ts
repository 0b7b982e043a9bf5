import type { ChannelReading } from '@/hooks/reading/skyMarks';
import { LEAST_CHANNELS, LEAST_MARKS } from '@/shared/shell/fitInput';
import { velocityLabel } from '@/shared/image/velocityDigits';

export interface AdviceInput {
  readings: readonly ChannelReading[];
  marks: number;
  /** The live fit's three numbers; null without one. */
  model: { vSys: number; vExp: number } | null;
  /** Why there is no fit though there are marks enough. */
  problem: string | null;
  /** Velocities of the cube's first and last channel, km/s. */
  range: readonly [number, number];
  /** km/s. */
  channelWidth: number;
}

const counted = (n: number, one: string) => `${n} ${one}${n === 1 ? '' : 's'}`;

/** Marks within this share of v_exp of a cap speak for it. */
const NEAR_CAP = 0.8;
const WISHED = 0.9;

/** What would help most now, in one sentence under the reading. */
export function advice({ readings, marks, model, problem, range, channelWidth }: AdviceInput): string {
  if (marks === 0)
    return 'Find a channel where the ring is clear and tap points along its rim. Three marks draw its ring; six marks on three channels fit the shell.';
  const moreMarks = Math.max(LEAST_MARKS - marks, 0);
  const moreChannels = Math.max(LEAST_CHANNELS - readings.length, 0);
  if (moreChannels > 0) {
    const least = Math.max(moreMarks, moreChannels);
    return `${counted(least, 'more mark')} on ${counted(moreChannels, 'more channel')} and the fit appears.`;
  }
  if (moreMarks > 0) return `${counted(moreMarks, 'more mark')} and the fit appears.`;
  if (!model) return problem ?? 'The fit is on its way.';
  return nextMarks(readings, model, range, channelWidth);
}

/** The expansion velocity hangs on the channels near the caps: say where they are if none carries marks. */
function nextMarks(
  readings: readonly ChannelReading[],
  { vSys, vExp }: { vSys: number; vExp: number },
  range: readonly [number, number],
  channelWidth: number,
): string {
  const reach = readings.map((r) => (r.velocity - vSys) / vExp);
  const [low, high] = [Math.min(...range), Math.max(...range)];
  const wished: string[] = [];
  for (const side of [-1, 1]) {
    const at = vSys + side * WISHED * vExp;
    if (reach.some((u) => side * u >= NEAR_CAP) || at < low || at > high) continue;
    wished.push(velocityLabel(at, channelWidth));
  }
  if (wished.length > 0)
    return `Marks near ${wished.join(' or ')} km/s would help most: the expansion velocity hangs on the channels where the shell closes.`;
  const thin = readings.filter((r) => r.marks < 3);
  if (thin.length > 0)
    return `A third mark on ${thin
      .map((r) => velocityLabel(r.velocity, channelWidth))
      .slice(0, 3)
      .join(', ')} km/s would show whether ${thin.length === 1 ? 'that ring agrees' : 'those rings agree'}.`;
  return 'The marks reach both caps. Run the fit of record when you are content.';
}
