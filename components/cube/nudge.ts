import { degreesPerPixel } from '@/components/cube/Readout';
import type { ImagePoint } from '@/shared/image/viewport';
import type { Wcs } from '@/shared/sky/wcs';

/** Where the header names no beam, a nudge is this many pixels. */
const WITHOUT_BEAM = 0.5;
/** With Shift. */
const FAR = 10;

/** How far an arrow key moves a mark, pixels: a tenth of the beam, with Shift all of it. */
export function nudgeStep(
  axes: { nx: number; ny: number; beam: { major: number } | null },
  wcs: Pick<Wcs, 'pixelToSky'>,
  far: boolean,
): number {
  const step = axes.beam ? Math.max(axes.beam.major / 10 / degreesPerPixel(axes, wcs), 0.05) : WITHOUT_BEAM;
  return step * (far ? FAR : 1);
}

/** A little way on the picture, its pixels: for the direction that an arrow key has there. */
const AHEAD = 0.01;

/**
 * A mark moved by `step` image pixels the way that an arrow points on the picture, which may show the sky otherwise than
 * the image does: in a polar view up is towards the centre. Where the way leads nowhere the mark stays.
 */
export function nudged(
  mark: ImagePoint,
  [right, up]: readonly [number, number],
  step: number,
  seen: { fromImage(at: ImagePoint): ImagePoint | null; toImage(at: ImagePoint): ImagePoint | null },
): ImagePoint {
  const at = seen.fromImage(mark);
  const before = at && seen.toImage({ x: at.x - AHEAD * right, y: at.y - AHEAD * up });
  const after = at && seen.toImage({ x: at.x + AHEAD * right, y: at.y + AHEAD * up });
  if (!before || !after) return mark;
  const [dx, dy] = [after.x - before.x, after.y - before.y];
  const length = Math.hypot(dx, dy);
  return length > 0 ? { x: mark.x + (dx / length) * step, y: mark.y + (dy / length) * step } : mark;
}
