import { MAD_TO_SD, median } from '@/shared/shell/robust';
import { withoutTrend } from '@/shared/shell/trace/radialProfile';

/** The rim in one profile, or why there is none. Lengths in samples of the profile, from its beginning. */
export type RimInProfile = FoundRim | 'faint' | 'at-end';

export interface FoundRim {
  at: number;
  /** Second difference at the crest of the profile (ridge) or of its slope (inner); 0 where it does not bend. */
  curvature: number;
  /** Height of the ridge over the scatter of the profile away from it, or over its noise if that is larger. */
  contrast: number;
}

/** A crest stands this many profile noises above the lowest point on each side. */
const STANDS_OUT = 3;
/** Samples at either end on which a crest does not count: the window may have cut it off. */
const END = 2;
/** What lies further from a crest than this many beams is its surroundings, if so many samples do. */
const AWAY = 1.5;
const LEAST_AWAY = 8;

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
  const contrast = height / Math.max(noise, scatterAway(t, top, beam));
  if (edge === 'ridge') return { ...vertex(t, top), contrast };
  const rise = gradient(profile);
  const steepest = highest(rise, Math.max(top - Math.round(2 * beam), 0), top);
  return { ...vertex(rise, steepest), contrast };
}

/** Robust scatter of the samples away from the crest; 0 where the window holds too few. */
function scatterAway(t: Float64Array, top: number, beam: number): number {
  const away = t.filter((_, i) => Math.abs(i - top) > AWAY * beam);
  if (away.length < LEAST_AWAY) return 0;
  const middle = median(away);
  return MAD_TO_SD * median(away.map((value) => Math.abs(value - middle)));
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
