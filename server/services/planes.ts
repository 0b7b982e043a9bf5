import type { Spectrum } from '@/shared/contract/cubes';
import { Problem } from '@/shared/contract/problem';
import type { CubeHead } from '@/shared/fits/cubeHead';
import { blockAverage, blockFor } from '@/shared/image/blockAverage';
import { quantise, type Quantised } from '@/shared/image/quantise';
import { buildWcs } from '@/shared/sky/wcs';
import type { ByteSource } from '../files/byteSource';
import { readPixel, readPlane, readPlanes } from '../files/planes';
import { findImage, findThumbnail, listChannels } from '../store/channels';
import { notFound } from './access';
import type { Context } from './context';
import { readyCube } from './cubes';

export interface PlaneAnswer extends Quantised {
  nx: number;
  ny: number;
  /** Pixels of the cube in one of these, a side. */
  block: number;
  unit: string | null;
}

/** One channel as 16-bit numbers, reduced by block averages to at most `size` pixels on its longer side. */
export async function planeOf(
  ctx: Context,
  cubeId: string,
  channel: number,
  size?: number,
): Promise<PlaneAnswer> {
  const { head, fileKey } = await readyCube(ctx, cubeId);
  requireChannel(head, channel);
  const { nx, ny } = head.shape;
  const plane = new Float32Array(nx * ny);
  const source = await ctx.cubeFiles.open(fileKey);
  await readPlane(source, head, channel, plane).finally(() => source.close());
  const block = size === undefined ? 1 : blockFor(nx, ny, size);
  const small = blockAverage(plane, nx, ny, block);
  return { ...quantise(small.plane), nx: small.nx, ny: small.ny, block, unit: head.unit ?? head.bunit };
}

/** The total-intensity map, stored by ingest. */
export async function totalOf(ctx: Context, cubeId: string): Promise<PlaneAnswer> {
  await readyCube(ctx, cubeId);
  const image = await findImage(ctx.db, cubeId, 'total');
  if (!image) throw notFound('total-intensity map');
  const { nx, ny, unit, scale, offset, blank } = image.meta as unknown as Omit<
    PlaneAnswer,
    'values' | 'block'
  >;
  const values = new Uint16Array(
    image.bytes.buffer.slice(image.bytes.byteOffset, image.bytes.byteOffset + image.bytes.byteLength),
  );
  return { values, nx, ny, unit, scale, offset, blank, block: 1 };
}

export async function thumbnailOf(ctx: Context, cubeId: string, channel: number): Promise<Buffer> {
  const { head } = await readyCube(ctx, cubeId);
  requireChannel(head, channel);
  const bytes = await findThumbnail(ctx.db, cubeId, channel);
  if (!bytes) throw notFound('thumbnail');
  return bytes;
}

export async function stripOf(ctx: Context, cubeId: string) {
  await readyCube(ctx, cubeId);
  const image = await findImage(ctx.db, cubeId, 'strip');
  if (!image) throw notFound('strip');
  return image;
}

/** Mean spectrum of the cube as ingest found it, or of the disc of pixels about a place. */
export async function spectrumOf(
  ctx: Context,
  cubeId: string,
  place: { x?: number | undefined; y?: number | undefined; radius: number },
): Promise<Spectrum> {
  const { head, fileKey } = await readyCube(ctx, cubeId);
  const unit = head.unit ?? head.bunit;
  if (place.x === undefined || place.y === undefined) {
    if (place.x !== undefined || place.y !== undefined)
      throw new Problem('invalid-input', 'Give x and y both, or neither for the whole cube.', {
        field: place.x === undefined ? 'x' : 'y',
      });
    const channels = await listChannels(ctx.db, cubeId);
    return {
      velocities: channels.map((c) => c.velocity),
      brightness: channels.map((c) => c.mean),
      unit,
      over: 'all pixels that are not blank',
    };
  }
  const inside = discPixels(head, place.x, place.y, place.radius);
  const wcs = buildWcs(head.wcs);
  const result: Spectrum = {
    velocities: [],
    brightness: [],
    unit,
    over: inside.length === 1 ? 'one pixel' : `${inside.length} pixels within ${place.radius} pixels`,
  };
  const source = await ctx.cubeFiles.open(fileKey);
  try {
    if (inside.length === 1) return await pixelSpectrum(source, head, inside[0]!, result);
    for await (const { channel, values } of readPlanes(source, head)) {
      const found = inside.map((i) => values[i]!).filter(Number.isFinite);
      result.velocities.push(wcs.velocityOf(channel));
      result.brightness.push(found.length ? found.reduce((a, b) => a + b, 0) / found.length : null);
    }
  } finally {
    await source.close();
  }
  return result;
}

/** One pixel a channel is read, not whole planes. */
async function pixelSpectrum(
  source: ByteSource,
  head: CubeHead,
  pixel: number,
  result: Spectrum,
): Promise<Spectrum> {
  const { nx, channels } = head.shape;
  const wcs = buildWcs(head.wcs);
  for (let channel = 0; channel < channels; channel++) {
    result.velocities.push(wcs.velocityOf(channel));
    result.brightness.push(await readPixel(source, head, pixel % nx, Math.floor(pixel / nx), channel));
  }
  return result;
}

/** Indices of the pixels whose centres lie within the radius; at least the nearest one. */
function discPixels(head: CubeHead, x: number, y: number, radius: number): number[] {
  const { nx, ny } = head.shape;
  const cx = Math.round(x);
  const cy = Math.round(y);
  if (!(cx >= 0 && cx < nx && cy >= 0 && cy < ny))
    throw new Problem('invalid-input', `This place lies outside the ${nx} by ${ny} pixels of the cube.`, {
      field: cx >= 0 && cx < nx ? 'y' : 'x',
    });
  const found = [cy * nx + cx];
  for (let j = Math.ceil(y - radius); j <= y + radius; j++)
    for (let i = Math.ceil(x - radius); i <= x + radius; i++)
      if (
        i >= 0 &&
        i < nx &&
        j >= 0 &&
        j < ny &&
        Math.hypot(i - x, j - y) <= radius &&
        !(i === cx && j === cy)
      )
        found.push(j * nx + i);
  return found;
}

function requireChannel(head: CubeHead, channel: number) {
  if (!Number.isInteger(channel) || channel < 0 || channel >= head.shape.channels) throw notFound('channel');
}
