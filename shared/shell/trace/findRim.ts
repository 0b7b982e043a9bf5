import { withoutTrend } from '@/shared/shell/trace/radialProfile';

/** The rim in one profile, or why there is none. Radii in samples from the beginning of the profile. */
export type RimInProfile = { at: number; curvature: number; contrast: number } | 'faint' | 'at-end';

/** A crest stands this many profile noises above the lowest point on each side. */
const STANDS_OUT = 3;
/** Samples at either end on which a crest does not count: the window may have cut it off. */
const END = 2;

/** Height of the crest of a profile, its place by a parabola through three samples, and its curvature there. */
export interface ProfileOptions {
  edge: 'ridge' | 'inner';
  /** Noise of the profile. */
  noise: number;
  /** Samples in a beam. */
  beam: number;
}

/**
 * Find the rim in a smoothed radial profile.
 *
 * ridge: the highest point once the straight line through the window is taken out (the gas around a shell slopes, and
 * would pull the highest point to its brighter side). inner: the steepest rise within two beams inside of that ridge.
 * Both are refined by a parabola through three samples.
 */
export function findRim(profile: Float64Array, { edge, noise, beam }: ProfileOptions): RimInProfile {
  const t = withoutTrend(profile);
  const top = highest(t, 0, t.length - 1);
  if (top < END || top > t.length - 1 - END) return 'at-end';
  const height = t[top]! - Math.max(lowest(t, 0, top), lowest(t, top, t.length - 1));
  if (height < STANDS_OUT * noise) return 'faint';
  const contrast = height / noise;
  if (edge === 'ridge') return { ...vertex(t, top), contrast };
  const rise = gradient(profile);
  const steepest = highest(rise, Math.max(top - Math.round(2 * beam), 0), top);
  return { ...vertex(rise, steepest), contrast };
}

/** The crest of a parabola through a sample and its neighbours; the sample itself where they do not bend. */
function vertex(values: Float64Array, i: number): { at: number; curvature: number } {
  const [before, here, after] = [values[i - 1], values[i], values[i + 1]];
  if (before === undefined || here === undefined || after === undefined) return { at: i, curvature: 0 };
  const curvature = before - 2 * here + after;
  const isCrest = curvature < 0 && here >= before && here >= after;
  return { at: isCrest ? i + (0.5 * (before - after)) / curvature : i, curvature: isCrest ? curvature : 0 };
}

/** Differences of neighbours, halved; of the end and its neighbour at the ends. */
function gradient(values: Float64Array): Float64Array {
  const last = values.length - 1;
  return values.map((_, i) => {
    const [a, b] = [Math.max(i - 1, 0), Math.min(i + 1, last)];
    return (values[b]! - values[a]!) / (b - a);
  });
}

function highest(values: Float64Array, from: number, to: number): number {
  let best = from;
  for (let i = from; i <= to; i++) if (values[i]! > values[best]!) best = i;
  return best;
}

function lowest(values: Float64Array, from: number, to: number): number {
  let least = Infinity;
  for (let i = from; i <= to; i++) least = Math.min(least, values[i]!);
  return least;
}
