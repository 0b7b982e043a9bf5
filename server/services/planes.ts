import type { MapKind } from '@/shared/contract/cubes';
import type { CubeHead } from '@/shared/fits/cubeHead';
import { blockAverage, blockFor, type Plane } from '@/shared/image/blockAverage';
import { dequantise, quantise, type Quantised } from '@/shared/image/quantise';
import { buildWcs, type Wcs } from '@/shared/sky/wcs';
import { fillFrom } from '../files/pixelFile';
import { readPlane } from '../files/planes';
import { withFloats } from '../files/scratch';
import { findImage, findThumbnail } from '../store/channels';
import { findCube } from '../store/cubes';
import { notFound } from './access';
import type { Context } from './context';
import { withPlanes } from './cubePixels';
import { readyCube } from './cubes';

export interface PlaneAnswer extends Omit<Quantised, 'values'> {
  values: Uint8Array | Uint16Array;
  nx: number;
  ny: number;
  /** Pixels of the cube in one of these, a side. */
  block: number;
  unit: string | null;
  /** Of a map: which values were left out, in words. */
  mask?: string;
}

/** One channel as 16- or 8-bit numbers, reduced by block averages to at most `size` pixels on its longer side. */
export async function planeOf(
  ctx: Context,
  cubeId: string,
  channel: number,
  { size, bits }: { size?: number | undefined; bits: 8 | 16 },
): Promise<PlaneAnswer> {
  const row = await readyCube(ctx, cubeId);
  const { head } = row;
  requireChannel(head, channel);
  const { nx, ny } = head.shape;
  const block = size === undefined ? 1 : blockFor(nx, ny, size);
  const answer = ({ plane, ...size }: Plane): PlaneAnswer => ({
    ...quantise(plane, bits),
    ...{ ...size, block, unit: head.unit ?? head.bunit },
  });
  if (row.reducedKey && row.layout?.reduced?.block === block)
    return answer(await readReduced(ctx, row.reducedKey, head, block, channel));
  return withFloats(nx * ny, async (plane) => {
    await withPlanes(ctx, row, (source, stored) => readPlane(source, stored, channel, plane));
    return answer(blockAverage(plane, nx, ny, block));
  });
}

/** A plane that ingest has reduced to the same block. */
async function readReduced(
  ctx: Context,
  key: string,
  head: CubeHead,
  block: number,
  channel: number,
): Promise<Plane> {
  const [nx, ny] = [Math.ceil(head.shape.nx / block), Math.ceil(head.shape.ny / block)];
  const plane = new Float32Array(nx * ny);
  const source = await ctx.cubeFiles.open(key);
  const bytes = new Uint8Array(plane.buffer);
  await fillFrom(source, bytes, channel * bytes.length).finally(() => source.close());
  return { plane, nx, ny };
}

/** A map over all channels, stored by ingest. */
export async function mapOf(ctx: Context, cubeId: string, kind: MapKind): Promise<PlaneAnswer> {
  const row = await readyCube(ctx, cubeId);
  const image = await findImage(ctx.db, cubeId, kind);
  if (!image) throw notFound('map');
  const { nx, ny, scale, offset, blank, mask } = image.meta as unknown as Omit<
    PlaneAnswer,
    'values' | 'block'
  >;
  const values = new Uint16Array(
    image.bytes.buffer.slice(image.bytes.byteOffset, image.bytes.byteOffset + image.bytes.byteLength),
  );
  const brightness = row.head.unit ?? row.head.bunit ?? '';
  const unit = { peak: brightness, total: `${brightness} km/s`.trim(), velocity: 'km/s', dispersion: 'km/s' }[
    kind
  ];
  const stored = {
    values,
    nx,
    ny,
    unit,
    scale,
    offset,
    blank,
    block: 1,
    ...(mask !== undefined && { mask }),
  };
  if (!row.overrides || kind === 'peak') return stored;
  const asRead = (await findCube(ctx.db, cubeId))!.head!; // without what was said since
  return { ...stored, ...onOtherAxis(stored, kind, buildWcs(asRead.wcs), buildWcs(row.head.wcs)) };
}

/** A map on the velocity axis as it is understood now: channels stay, their velocities and widths do not. */
function onOtherAxis(stored: Quantised, kind: MapKind, before: Wcs, now: Wcs): Quantised {
  const ratio = now.velocityStep / before.velocityStep;
  if (kind !== 'velocity') return { ...stored, scale: stored.scale * ratio, offset: stored.offset * ratio };
  return quantise(dequantise(stored).map((v) => now.velocityOf(before.channelOf(v))));
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

/** Changes whenever the numbers of the cube, or what they mean, do: it is read again, or something is said of it. */
export async function versionOf(ctx: Context, cubeId: string): Promise<string> {
  const { readyAt, overriddenAt } = await readyCube(ctx, cubeId);
  return [readyAt, overriddenAt].map((time) => (time ? time.getTime().toString(36) : '0')).join('-');
}

function requireChannel(head: CubeHead, channel: number) {
  if (!Number.isInteger(channel) || channel < 0 || channel >= head.shape.channels) throw notFound('channel');
}
