import { Problem } from '@/shared/contract/problem';
import type { CubeHead } from '@/shared/fits/cubeHead';
import { quantise } from '@/shared/image/quantise';
import { buildWcs } from '@/shared/sky/wcs';
import type { CubeStatistics } from '../store/cubes';
import type { ChannelDraft, ImageDraft } from '../store/ingests';
import type { Reduced } from './reduceCube';
import { brightnessWindow, stripPicture, thumbnail, type SmallCube } from './thumbnails';

export interface Assembled {
  /** The head with what only the pixels could tell added to its cautions. */
  head: CubeHead;
  statistics: CubeStatistics;
  window: [number, number];
  channels: ChannelDraft[];
  images: ImageDraft[];
}

/** Put together what the threads found: statistics and thumbnail of each channel, spectrum, total intensity. */
export async function assemble(head: CubeHead, parts: Reduced[], signal: AbortSignal): Promise<Assembled> {
  const reduced = [...parts].sort((a, b) => a.from - b.from);
  refuseBlank(reduced);
  const wcs = buildWcs(head.wcs);
  const small = joinSmall(reduced, head.shape.channels);
  const window = brightnessWindow(small);
  const channels: ChannelDraft[] = [];
  for (const s of reduced.flatMap((r) => r.statistics)) {
    signal.throwIfAborted();
    const channel = channels.length;
    channels.push({
      channel,
      velocity: wcs.velocityOf(channel),
      minimum: s.min,
      maximum: s.max,
      mean: s.mean,
      rms: s.noise,
      rmsAboutZero: s.rms,
      blanks: s.blank,
      thumbnail: await thumbnail(small, channel, window),
    });
  }
  const strip = await stripPicture(small, window);
  return {
    head: withCautions(head, reduced),
    statistics: overall(channels),
    window,
    channels,
    images: [totalImage(head, reduced, wcs.velocityStep), { kind: 'strip', ...strip }],
  };
}

function refuseBlank(reduced: Reduced[]) {
  if (reduced.every((r) => r.statistics.every((s) => s.min === null)))
    throw new Problem(
      'fits-shape',
      'Every pixel of this cube is blank. Look at BLANK, BSCALE and BZERO in the file, or send the cube that holds the emission.',
    );
}

function withCautions(head: CubeHead, reduced: Reduced[]): CubeHead {
  const infinite = reduced.reduce((n, r) => n + r.infinite, 0);
  if (infinite === 0) return head;
  const caution = `${infinite} pixels are infinite in the file; they count as blank.`;
  return { ...head, cautions: [...head.cautions, caution] };
}

function joinSmall(reduced: Reduced[], channels: number): SmallCube {
  const { nx, ny } = reduced[0]!.smallShape;
  const planes = new Float32Array(nx * ny * channels);
  for (const r of reduced) planes.set(r.small, r.from * nx * ny);
  return { planes, nx, ny, channels };
}

function overall(channels: ChannelDraft[]): CubeStatistics {
  const known = (pick: (c: ChannelDraft) => number | null) => channels.map(pick).filter((v) => v !== null);
  const noise = known((c) => c.rms).sort((a, b) => a - b);
  const extreme = (values: number[], best: (a: number, b: number) => number) =>
    values.length ? values.reduce((a, b) => best(a, b)) : null;
  return {
    minimum: extreme(
      known((c) => c.minimum),
      Math.min,
    ),
    maximum: extreme(
      known((c) => c.maximum),
      Math.max,
    ),
    // the quietest quarter of the channels has the least signal in it
    rms: noise[Math.floor(noise.length / 4)] ?? null,
    blanks: channels.reduce((n, c) => n + c.blanks, 0),
  };
}

/** Sum over the channels that are not blank, times the channel width; a pixel without any is blank. */
function totalImage(head: CubeHead, reduced: Reduced[], channelWidth: number): ImageDraft {
  const { nx, ny } = head.shape;
  const total = new Float32Array(nx * ny);
  for (let i = 0; i < total.length; i++) {
    let sum = 0;
    let count = 0;
    for (const r of reduced) {
      sum += r.sum[i]!;
      count += r.count[i]!;
    }
    total[i] = count === 0 ? NaN : sum * channelWidth;
  }
  const { values, ...scale } = quantise(total);
  const unit = `${head.unit ?? head.bunit ?? ''} km/s`.trim();
  return { kind: 'total', meta: { nx, ny, unit, ...scale }, bytes: Buffer.from(values.buffer) };
}
