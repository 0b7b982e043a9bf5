import { Problem } from '@/shared/contract/problem';
import type { CubeHead } from '@/shared/fits/cubeHead';
import { mapOf, MASK_NOISES, mergeMaps, type CubeMap } from '@/shared/fits/cubeMaps';
import { cubeNoise } from '@/shared/fits/cubeNoise';
import { quantise } from '@/shared/image/quantise';
import { buildWcs } from '@/shared/sky/wcs';
import type { CubeStatistics } from '../store/cubes';
import type { ChannelDraft, ImageDraft } from '../store/ingests';
import type { Reduction } from './passes';
import { brightnessWindow, stripPicture, thumbnails } from './thumbnails';

export interface Assembled {
  /** The head with what only the pixels could tell added to its cautions. */
  head: CubeHead;
  statistics: CubeStatistics;
  window: [number, number];
  channels: ChannelDraft[];
  images: ImageDraft[];
}

/** Put together what the threads found: statistics and thumbnail of each channel, and the maps over all channels. */
export async function assemble(
  head: CubeHead,
  reduction: Reduction,
  signal: AbortSignal,
): Promise<Assembled> {
  const reduced = [...reduction.reduced].sort((a, b) => a.from - b.from);
  const found = reduced.flatMap((r) => r.statistics);
  if (found.every((s) => s.min === null))
    throw new Problem(
      'fits-shape',
      'Every pixel of this cube is blank. Look at BLANK, BSCALE and BZERO in the file, or send the cube that holds the emission.',
    );
  const wcs = buildWcs(head.wcs);
  const window = brightnessWindow(reduction.small);
  const pictures = await thumbnails(reduction.small, window, signal);
  const channels = found.map((s, channel) => ({
    channel,
    velocity: wcs.velocityOf(channel),
    minimum: s.min,
    maximum: s.max,
    mean: s.mean,
    median: s.median,
    rms: s.noise,
    rmsAboutZero: s.rms,
    blanks: s.blank,
    thumbnail: pictures[channel]!,
  }));
  const strip = await stripPicture(reduction.small, window);
  const infinite = reduced.reduce((n, r) => n + r.infinite, 0);
  return {
    head: withCaution(head, infinite),
    statistics: overall(channels),
    window,
    channels,
    images: [...maps(head, reduction, wcs.velocityStep), { kind: 'strip', ...strip }],
  };
}

function withCaution(head: CubeHead, infinite: number): CubeHead {
  if (infinite === 0) return head;
  const caution = `${infinite} pixels are infinite in the file; they count as blank.`;
  return { ...head, cautions: [...head.cautions, caution] };
}

function overall(channels: ChannelDraft[]): CubeStatistics {
  const known = (pick: (c: ChannelDraft) => number | null) => channels.map(pick).filter((v) => v !== null);
  const minima = known((c) => c.minimum);
  const maxima = known((c) => c.maximum);
  return {
    minimum: minima.reduce((a, b) => Math.min(a, b)),
    maximum: maxima.reduce((a, b) => Math.max(a, b)),
    rms: cubeNoise(channels.map((c) => c.rms)),
    blanks: channels.reduce((n, c) => n + c.blanks, 0),
  };
}

function maps(head: CubeHead, reduction: Reduction, channelWidth: number): ImageDraft[] {
  const [first, ...others] = reduction.reduced;
  for (const other of others) mergeMaps(first!.maps, other.maps);
  const { nx, ny } = head.shape;
  const brightness = head.unit ?? head.bunit ?? '';
  const units: Record<CubeMap, string> = {
    total: `${brightness} km/s`.trim(),
    velocity: 'km/s',
    dispersion: 'km/s',
    peak: brightness,
  };
  return (Object.keys(units) as CubeMap[]).map((kind) => {
    const { values, ...scale } = quantise(mapOf(first!.maps, kind, channelWidth, reduction.origin));
    const mask = kind === 'total' || kind === 'peak' ? NO_MASK : maskInWords(reduction, brightness);
    return { kind, meta: { nx, ny, unit: units[kind], mask, ...scale }, bytes: Buffer.from(values.buffer) };
  });
}

const NO_MASK = 'none: every value that is not blank';

const maskInWords = ({ threshold, sampledNoise }: Reduction, unit: string) =>
  sampledNoise > 0
    ? `values of at least ${threshold} ${unit}`.trim() +
      `: ${MASK_NOISES} times the noise ${sampledNoise}, from a sample of channels without signal`
    : 'values above zero: the cube shows no noise';
