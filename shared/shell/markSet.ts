import type { Vector } from '@/shared/sky/greatCircle';

/** Rim marks as the fit reads them: flat arrays, radians and km/s. */
export interface MarkSet {
  count: number;
  channels: number;
  /** Unit vectors, three numbers a mark. */
  direction: Float64Array;
  /** Squared positional error of each mark, rad^2. */
  sigma2: Float64Array;
  /** Which channel a mark lies on, 0 … channels - 1. */
  channel: Int32Array;
  /** Velocity of each channel, rising. */
  velocity: Float64Array;
  /** Full width of a channel, km/s. */
  width: number;
  /** Which marks share errors, 0 … blocks - 1: those of a channel, or for a traced rim of neighbouring channels. */
  block: Int32Array;
  blocks: number;
  /** What no scatter among the marks of a traced rim shows; null for a person's marks. */
  unseen: UnseenErrors | null;
  /** How many of the marks came from drawn circles. */
  drawn: number;
}

/** Standard errors that come on top: of theta (rad), of v_sys (km/s) and of ln v_exp. */
export interface UnseenErrors {
  theta: number;
  v0: number;
  lnW: number;
}

/** The marks for which `keep` holds, with the channels that are left counted anew. */
export function subset(marks: MarkSet, keep: (mark: number) => boolean): MarkSet {
  const kept = allOf(marks).filter(keep);
  const used = [...new Set(kept.map((i) => marks.channel[i]!))].sort((a, b) => a - b);
  const renumbered = new Map(used.map((channel, k) => [channel, k]));
  return {
    count: kept.length,
    channels: used.length,
    direction: Float64Array.from(kept.flatMap((i) => [...marks.direction.subarray(3 * i, 3 * i + 3)])),
    sigma2: Float64Array.from(kept, (i) => marks.sigma2[i]!),
    channel: Int32Array.from(kept, (i) => renumbered.get(marks.channel[i]!)!),
    velocity: Float64Array.from(used, (k) => marks.velocity[k]!),
    width: marks.width,
    ...numbered(kept.map((i) => marks.block[i]!)),
    unseen: marks.unseen,
    drawn: marks.drawn,
  };
}

/** Blocks counted from 0 without gaps, in their order. */
export function numbered(blocks: readonly number[]): Pick<MarkSet, 'block' | 'blocks'> {
  const used = [...new Set(blocks)].sort((a, b) => a - b);
  const number = new Map(used.map((block, at) => [block, at]));
  return { block: Int32Array.from(blocks, (block) => number.get(block)!), blocks: used.length };
}

/** Indices of all marks. */
export const allOf = (marks: MarkSet): number[] => Array.from({ length: marks.count }, (_, i) => i);

/** Direction of the mean of the marks' unit vectors, or of some of them. */
export function centroid({ direction: q, count }: MarkSet, members?: readonly number[]): Vector {
  let [x, y, z] = [0, 0, 0];
  for (let m = 0; m < (members?.length ?? count); m++) {
    const i = 3 * (members ? members[m]! : m);
    x += q[i]!;
    y += q[i + 1]!;
    z += q[i + 2]!;
  }
  return normalised(x, y, z);
}

export function normalised(x: number, y: number, z: number): Vector {
  const length = Math.hypot(x, y, z) || 1;
  return [x / length, y / length, z / length];
}

/** Half the velocity range of the marks plus one channel: the scale on which the expansion velocity is bounded. */
export function velocityReach(marks: MarkSet): { low: number; high: number; half: number } {
  const low = Math.min(...marks.velocity);
  const high = Math.max(...marks.velocity);
  return { low, high, half: (high - low) / 2 + marks.width };
}
