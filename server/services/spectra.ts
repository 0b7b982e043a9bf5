import type { Channel, Spectrum } from '@/shared/contract/cubes';
import { Problem } from '@/shared/contract/problem';
import type { CubeHead } from '@/shared/fits/cubeHead';
import { buildWcs } from '@/shared/sky/wcs';
import { listChannels } from '../store/channels';
import type { Context } from './context';
import { visitSpectra } from './cubePixels';
import { readyCube } from './cubes';

export interface SpectrumPlace {
  x?: number | undefined;
  y?: number | undefined;
  radius: number;
  inner: number;
  of: 'mean' | 'median' | 'maximum';
}

/** Spectrum of the cube as ingest found it, or the mean over the disc or ring of pixels about a place. */
export async function spectrumOf(ctx: Context, cubeId: string, place: SpectrumPlace): Promise<Spectrum> {
  const row = await readyCube(ctx, cubeId);
  const unit = row.head.unit ?? row.head.bunit;
  if (place.x === undefined || place.y === undefined) {
    if (place.x !== undefined || place.y !== undefined)
      throw new Problem('invalid-input', 'Give x and y both, or neither for the whole cube.', {
        field: place.x === undefined ? 'x' : 'y',
      });
    const channels = await listChannels(ctx.db, cubeId);
    const pick = (c: Channel) => c[place.of];
    return {
      velocities: channels.map((c) => c.velocity),
      brightness: channels.map((c) => (place.of === 'maximum' ? c.maximum : pick(c))),
      unit,
      over: `${place.of} of all pixels that are not blank`,
    };
  }
  if (place.of !== 'mean')
    throw new Problem('invalid-input', 'About a place there is the mean only.', { field: 'of' });
  const inside = pixelsAbout(row.head, place.x, place.y, place.inner, place.radius);
  const { channels } = row.head.shape;
  const sum = new Float64Array(channels);
  const count = new Uint32Array(channels);
  await visitSpectra(ctx, row, inside, (_pixel, spectrum) => {
    for (let k = 0; k < channels; k++)
      if (!Number.isNaN(spectrum[k])) {
        sum[k]! += spectrum[k]!;
        count[k]!++;
      }
  });
  const wcs = buildWcs(row.head.wcs);
  return {
    velocities: Array.from(sum, (_, k) => wcs.velocityOf(k)),
    brightness: Array.from(sum, (s, k) => (count[k]! > 0 ? s / count[k]! : null)),
    unit,
    over: inWords(inside.length, place),
  };
}

function inWords(pixels: number, { inner, radius }: SpectrumPlace): string {
  if (inner > 0) return `${pixels} pixels from ${inner} to ${radius} pixels away`;
  return pixels === 1 ? 'one pixel' : `${pixels} pixels within ${radius} pixels`;
}

/** Indices of the pixels whose centres lie between the radii; of a disc at least the nearest one. */
function pixelsAbout(
  { shape: { nx, ny } }: CubeHead,
  x: number,
  y: number,
  inner: number,
  radius: number,
): number[] {
  const [cx, cy] = [Math.round(x), Math.round(y)];
  if (!(cx >= 0 && cx < nx && cy >= 0 && cy < ny))
    throw new Problem('invalid-input', `This place lies outside the ${nx} by ${ny} pixels of the cube.`, {
      field: cx >= 0 && cx < nx ? 'y' : 'x',
    });
  if (inner > radius)
    throw new Problem('invalid-input', 'The inner radius of a ring is smaller than the outer one.', {
      field: 'inner',
    });
  const found = new Set<number>(inner > 0 ? [] : [cy * nx + cx]);
  for (let j = Math.max(0, Math.ceil(y - radius)); j <= Math.min(ny - 1, y + radius); j++)
    for (let i = Math.max(0, Math.ceil(x - radius)); i <= Math.min(nx - 1, x + radius); i++) {
      const distance = Math.hypot(i - x, j - y);
      if (distance <= radius && distance >= inner) found.add(j * nx + i);
    }
  if (found.size === 0)
    throw new Problem('invalid-input', 'No pixel of the cube lies in this ring.', { field: 'inner' });
  return [...found];
}
