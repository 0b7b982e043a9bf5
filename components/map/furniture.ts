import type { Project } from '@/shared/image/skyPath';
import { scaleBar } from '@/shared/image/scaleBar';
import { toImage, type ImagePoint, type Viewport } from '@/shared/image/viewport';
import { destination, type LonLat } from '@/shared/sky/greatCircle';

/** What tells size and direction on a map. */
export interface Furniture {
  bar: { px: number; label: string } | null;
  /** Unit steps on the screen towards north and east in the middle of the map; null off the sky. */
  arrows: { north: ScreenStep; east: ScreenStep } | null;
}
export interface ScreenStep {
  dx: number;
  dy: number;
}

/** Longest a scale bar may be, of the map's width and in screen pixels. */
const LONGEST = { share: 0.28, px: 150 };
const STEP = 1e-3;

/**
 * Scale bar and directions as they are in the middle of what a viewport shows; the bar lies along the map's horizontal.
 */
export function furnitureOf(
  v: Viewport,
  sky: { project: Project; unproject: (x: number, y: number) => LonLat | null },
  distancePc: number | null,
): Furniture {
  const middle = toImage(v, { sx: v.width / 2, sy: v.height / 2 });
  const x = Math.min(Math.max(middle.x, 0), v.nx - 1);
  const y = Math.min(Math.max(middle.y, 0), v.ny - 1);
  const at = sky.unproject(x, y);
  const onward = (angle: number) => at && sky.project(destination(at, angle, STEP));
  const [north, east] = [onward(0), onward(90)];
  if (!north || !east) return { bar: null, arrows: null };
  const step = (to: ImagePoint): ScreenStep => {
    const length = Math.hypot(to.x - x, to.y - y) || 1;
    return { dx: (to.x - x) / length, dy: (y - to.y) / length };
  };
  // degrees of one step along x: the inverse of the local map from (east, north) to pixels, applied to (1, 0)
  const [a, b, c, d] = [east.x - x, north.x - x, east.y - y, north.y - y];
  const determinant = a * d - b * c;
  const perPixel = (STEP * Math.hypot(d, c)) / Math.abs(determinant);
  const most = Math.min(v.width * LONGEST.share, LONGEST.px);
  const bar = scaleBar((most / v.scale) * perPixel, distancePc);
  return {
    bar: bar && { px: (bar.degrees / perPixel) * v.scale, label: bar.label },
    arrows: { north: step(north), east: step(east) },
  };
}
