import { paintedPlane } from '@/components/slices/paintedPlane';
import type { ChannelPlane } from '@/hooks/planes/decodePlane';
import type { FigureRaster, Section } from '@/shared/image/figure/figure';
import type { Look } from '@/shared/image/tone';

/** The part of a plane that a section needs, in whole pixels of the plane, painted upright; null where it shows none. */
export function rasterOf(plane: ChannelPlane, look: Look, section: Section): FigureRaster | null {
  const { width, height, block } = plane;
  const from = (edge: number, n: number) => Math.min(Math.max(Math.floor((edge + 0.5) / block), 0), n);
  const to = (edge: number, n: number) => Math.min(Math.max(Math.ceil((edge + 0.5) / block), 0), n);
  const [i0, i1] = [from(section.x0, width), to(section.x1, width)];
  const [j0, j1] = [from(section.y0, height), to(section.y1, height)];
  if (i1 <= i0 || j1 <= j0) return null;
  const upright = Array.from({ length: height }, (_, j) => height - 1 - j);
  const whole = paintedPlane(plane, look, upright);
  const canvas = document.createElement('canvas');
  canvas.width = i1 - i0;
  canvas.height = j1 - j0;
  const ctx = canvas.getContext('2d');
  if (!whole || !ctx) return null;
  ctx.drawImage(whole, -i0, -(height - j1));
  return {
    href: canvas.toDataURL('image/png'),
    x0: i0 * block - 0.5,
    x1: i1 * block - 0.5,
    y0: j0 * block - 0.5,
    y1: j1 * block - 0.5,
  };
}
