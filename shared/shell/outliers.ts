import type { Evaluation } from '@/shared/shell/frame';
import type { MarkSet } from '@/shared/shell/markSet';
import { MAD_TO_SD, median } from '@/shared/shell/robust';

/** Marks further than this many robust standard deviations off their own ring are set aside. */
const LIMIT = 4.5;
/** Two groups of marks are judged apart only where both are at least this large. */
const GROUP_SIZE = 16;
/** The robust deviation in units of the stated error is not taken below this. */
const LEAST_SCALE = 0.3;

/**
 * Which marks lie off their own ring. Each is compared with the median of its channel, so a ring that is biased as a
 * whole is no outlier. Marks whose error is mostly the spread of radii within the channel are judged apart from the
 * rest, because that spread is overstated for a smooth rim.
 */
export function offTheirRing(marks: MarkSet, { residual, variance }: Evaluation): boolean[] {
  const z = Array.from({ length: marks.count }, (_, i) => residual[i]! / Math.sqrt(variance[i]!));
  const ofChannel: number[][] = Array.from({ length: marks.channels }, () => []);
  z.forEach((value, i) => ofChannel[marks.channel[i]!]!.push(value));
  const centre = ofChannel.map(median);
  const deviation = z.map((value, i) => value - centre[marks.channel[i]!]!);

  const all = z.map((_, i) => i);
  const spreadOut = all.filter((i) => marks.sigma2[i]! < 0.5 * variance[i]!);
  const rest = all.filter((i) => !(marks.sigma2[i]! < 0.5 * variance[i]!));
  const groups = Math.min(spreadOut.length, rest.length) >= GROUP_SIZE ? [spreadOut, rest] : [all];
  const absorbed = 1 / Math.sqrt(Math.max(1 - marks.channels / marks.count, 0.3)); // by the channels' medians
  const off = z.map(() => false);
  for (const group of groups) {
    const scale = MAD_TO_SD * median(group.map((i) => Math.abs(deviation[i]!))) * absorbed;
    const limit = LIMIT * Math.max(scale, LEAST_SCALE);
    for (const i of group) off[i] = Math.abs(deviation[i]!) > limit;
  }
  return off;
}
