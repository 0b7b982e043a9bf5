import type { CubeSession } from '@/components/cube/cubeSession';
import { channelPanel } from '@/components/figure/channelPanel';
import {
  evenly,
  inARow,
  MOST_FRAMES,
  MOST_PANELS,
  thereAndBack,
  type Choices,
} from '@/components/figure/choices';
import { drawnSvg } from '@/components/figure/drawnSvg';
import { faceCss } from '@/components/figure/face';
import { figureOf, sectionFor, seenPanel } from '@/components/figure/figureOf';
import { loopColours, loopFrame, loopWriter, type Frame, type Pixels } from '@/components/figure/loopFile';
import { rasterOf } from '@/components/figure/rasterOf';
import { loadPlane } from '@/hooks/planes/loadPlane';
import type { FigurePanel } from '@/shared/image/figure/figure';
import { figureSvg } from '@/shared/image/figure/figureSvg';

/** Longest side of a plane in a sheet or a loop: finer is not seen there. */
const PLANE_PX = 1024;
/** Widths of loops, pixels: a page or a message, and a slide. */
export const LOOP_PX = { 1: 480, 2: 960 } as const;

export interface Work {
  signal: AbortSignal;
  /** What is under way, for who waits. */
  say: (words: string, done: number, of: number) => void;
}

/** The channels of a sheet, by rising velocity. */
export function sheetChannels(s: CubeSession, choices: Choices): number[] {
  if (choices.pick === 'marked')
    return evenly(
      s.live.readings.map((r) => r.channel),
      MOST_PANELS,
    );
  return evenly(filmChannels(s), Math.min(choices.count, MOST_PANELS));
}

/** The channels of a loop, one way: those between the film's ends. */
export function loopChannels(s: CubeSession): number[] {
  const all = filmChannels(s);
  const step = Math.ceil(all.length / MOST_FRAMES);
  return all.filter((_, i) => i % step === 0);
}

const filmChannels = (s: CubeSession): number[] => s.order.channels.slice(s.film.from, s.film.to + 1);

/** What is on the map, as an SVG file. */
export async function pictureSvg(s: CubeSession, choices: Choices): Promise<string> {
  const { plane } = s.planes;
  if (!plane) throw new Error('The picture is not there yet. Try again in a moment.');
  const raster = rasterOf(plane, s.look.look, sectionFor(s, choices.part));
  return figureSvg(figureOf(s, choices, [{ ...seenPanel(s), raster }], 1, s.look.look, await faceCss()));
}

/** A sheet of channel maps, as an SVG file. */
export async function sheetSvg(s: CubeSession, choices: Choices, work: Work): Promise<string> {
  const channels = sheetChannels(s, choices);
  const panels: FigurePanel[] = [];
  for (const channel of channels) {
    work.say('Reading the channels', panels.length, channels.length);
    panels.push(await readPanel(s, choices, channel, work.signal));
  }
  const look = s.channelLook.look;
  const perRow = inARow(panels.length, choices.columns);
  return figureSvg(figureOf(s, choices, panels, perRow, look, await faceCss()));
}

/** A loop through the channels, as a GIF file. */
export async function loopGif(
  s: CubeSession,
  choices: Choices,
  work: Work,
): Promise<Uint8Array<ArrayBuffer>> {
  const oneWay = loopChannels(s);
  const css = await faceCss();
  const draw = async (channel: number): Promise<Pixels> => {
    const panel = await readPanel(s, choices, channel, work.signal);
    const svg = figureSvg(figureOf(s, choices, [panel], 1, s.channelLook.look, css));
    const canvas = await drawnSvg(svg, LOOP_PX[choices.columns]);
    const { width, height } = canvas;
    return { rgba: canvas.getContext('2d')!.getImageData(0, 0, width, height).data, width, height };
  };
  work.say('Choosing the colours', 0, 1);
  const samples: Pixels[] = [];
  for (const channel of evenly(oneWay, 3)) samples.push(await draw(channel));
  const palette = loopColours(samples);
  const frames = new Map<number, Frame>();
  for (const channel of oneWay) {
    work.say('Drawing the pictures', frames.size, oneWay.length);
    frames.set(channel, loopFrame(await draw(channel), palette));
  }
  const writer = loopWriter(palette, Math.round(1000 / s.film.rate));
  for (const channel of choices.back ? thereAndBack(oneWay) : oneWay) writer.add(frames.get(channel)!);
  return writer.bytes();
}

async function readPanel(
  s: CubeSession,
  choices: Choices,
  channel: number,
  signal: AbortSignal,
): Promise<FigurePanel> {
  const size = Math.max(s.axes.nx, s.axes.ny) > PLANE_PX ? PLANE_PX : null;
  const plane = s.channelPlanes.store.at(channel, size) ?? (await loadPlane(s.cube, channel, size, signal));
  signal.throwIfAborted();
  return {
    ...channelPanel(s, channel),
    raster: rasterOf(plane, s.channelLook.look, sectionFor(s, choices.part)),
  };
}
