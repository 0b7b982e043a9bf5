import { angleWords, LIE_WORDS, type Seeing } from '@/components/seeing/seeing';
import type { StripOrder } from '@/components/strip/stripOrder';
import type { SeenSky } from '@/components/seeing/useSeenSky';
import type { Recipe } from '@/hooks/planes/usePicture';
import { kernelTo, type BeamShape } from '@/shared/image/beamKernel';
import { velocityLabel } from '@/shared/image/velocityDigits';
import { modelRadius, type RingParameters } from '@/shared/shell/channelCurve';
import type { Wcs } from '@/shared/sky/wcs';

export interface RecipeInput {
  seeing: Omit<Seeing, 'second' | 'contours' | 'slice' | 'layers' | 'marksOf'>;
  seen: SeenSky;
  channel: number;
  /** The picture is a map of all channels. */
  allChannels: boolean;
  order: StripOrder;
  channelWidth: number;
  image: { nx: number; ny: number };
  beam: BeamShape | null;
  wcs: Wcs;
  model: RingParameters | null;
}

export interface Seen {
  recipe: Recipe;
  /** What was done, to be stated on the picture. */
  said: string[];
  /** What was asked for and cannot be done, and why. */
  refused: string[];
}

/** Channels with rings wider than this share of the shell's radius are stacked: near the caps a ring is a blob. */
const LEAST_RING = 0.35;
const MOST_STACKED = 48;

/** What has to be done to the planes for what is to be seen, and the words for it. */
export function recipeOf(input: RecipeInput): Seen {
  const { seeing, seen, channel, allChannels, order, image, beam, wcs, model, channelWidth } = input;
  const said: string[] = [];
  const refused: string[] = [];
  const middle = { x: (image.nx - 1) / 2, y: (image.ny - 1) / 2 };
  const stacking = seen.lie === 'stacked' && !allChannels;
  let sources = allChannels ? [] : around(order, channel, seeing.mean);
  let stretch: number[] | null = null;
  if (stacking && model) {
    const rings = order.channels.flatMap((c) => {
      const ring = modelRadius(wcs.velocityOf(c), channelWidth, model);
      return ring !== null && ring > LEAST_RING * model.theta ? [{ c, stretch: ring / model.theta }] : [];
    });
    const each = Math.ceil(rings.length / MOST_STACKED);
    const taken = rings.filter((_, i) => i % each === 0);
    sources = taken.map((r) => r.c);
    stretch = taken.map((r) => r.stretch);
    if (taken.length > 0) said.push(`${taken.length} channels stacked by scaled radius`);
    else stretch = null;
  } else if (stacking) refused.push('no model to stack channels by');
  else if (sources.length > 1) said.push(`mean of ${sources.length} channels`);
  if (sources.length === 0 && !allChannels) sources = [channel];

  const minus =
    seeing.minus && typeof seeing.other === 'number' && !allChannels && !stretch
      ? around(order, Math.min(seeing.other, order.channels.length - 1), seeing.mean)
      : [];
  if (minus.length > 0)
    said.push(
      `minus channel ${(seeing.other as number) + 1} (${velocityLabel(wcs.velocityOf(seeing.other as number), channelWidth)} km/s)`,
    );

  const kernel = (arcmin: number | null, from: BeamShape | null) =>
    arcmin === null ? null : kernelTo(arcmin / 60, from, wcs, middle);
  const smooth = kernel(seeing.beam, beam);
  if (smooth) said.push(`smoothed to ${angleWords(seeing.beam!)}`);
  else if (seeing.beam !== null)
    refused.push(`not smoothed: the beam is ${angleWords((beam?.major ?? 0) * 60)} already`);
  const less = kernel(seeing.less, null);
  if (less) said.push(`less smoothing to ${angleWords(seeing.less!)}`);
  const lie = LIE_WORDS[seen.lie].said;
  if (lie && !(stacking && stretch)) said.push(lie);
  return { recipe: { sources, minus, smooth, less, view: seen.view, stretch }, said, refused };
}

/** A channel and as many of its neighbours, by velocity, as make the number; fewer at the ends of the cube. */
export function around(order: StripOrder, channel: number, number: number): number[] {
  const at = order.positions[channel] ?? 0;
  const half = (number - 1) >> 1;
  return order.channels.slice(Math.max(at - half, 0), at + half + 1);
}
