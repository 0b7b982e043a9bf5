import { brightnessOf } from '@/shared/image/quantise';

/** In the place of a channel's number: the plane is a map made of all of them. */
export const ALL_CHANNELS = -1;

/** One channel, or a map of all, as numbers, whole or reduced; row y = 0 first. */
export interface ChannelPlane {
  channel: number;
  values: Uint16Array;
  width: number;
  height: number;
  /** Image pixels along a side of one of its pixels. */
  block: number;
  scale: number;
  offset: number;
  blank: number;
  /** A thumbnail in the place of a plane that is on its way. */
  standIn?: boolean;
  /** Of a map: which values were left out, in words. */
  mask?: string;
}

/**
 * Read the answer of the plane route: little-endian 16-bit numbers, and headers that say what they mean.
 *
 * @throws Error when a header is missing or the length is not width times height
 */
export function decodePlane(
  channel: number,
  body: ArrayBuffer,
  header: (name: string) => string | null,
): ChannelPlane {
  const what = channel === ALL_CHANNELS ? 'The map' : `The plane of channel ${channel}`;
  const read = (name: string): number => {
    const text = header(name);
    const value = text === null || text.trim() === '' ? NaN : Number(text);
    if (!Number.isFinite(value)) throw new Error(`${what} came without ${name}.`);
    return value;
  };
  const plane = {
    channel,
    width: read('Plane-Width'),
    height: read('Plane-Height'),
    block: read('Plane-Block'),
    scale: read('Plane-Scale'),
    offset: read('Plane-Offset'),
    blank: read('Plane-Blank'),
  };
  if (body.byteLength !== plane.width * plane.height * 2)
    throw new Error(`${what} has ${body.byteLength} bytes, not ${plane.width} × ${plane.height} × 2.`);
  const mask = header('Plane-Mask');
  return { ...plane, values: new Uint16Array(body), ...(mask && { mask }) };
}

/** Brightness at an image pixel; NaN for a blank, and outside the image. */
export function brightnessAt(plane: ChannelPlane, i: number, j: number): number {
  const x = Math.floor(i / plane.block);
  const y = Math.floor(j / plane.block);
  if (x < 0 || y < 0 || x >= plane.width || y >= plane.height) return NaN;
  return brightnessOf(plane.values[y * plane.width + x]!, plane);
}
