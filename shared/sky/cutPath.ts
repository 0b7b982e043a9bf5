import { destination, positionAngle, separation } from './greatCircle';
import type { PixelPoint, Wcs } from './wcs';

/** Places along a cut, in pixels; null where the projection does not show the sky. */
export interface CutPath {
  pixels: (PixelPoint | null)[];
  /** Degrees along the cut between neighbouring places. */
  step: number;
}

/** What is cut: a great-circle segment, or a small circle about a centre. Galactic degrees. */
export type CutShape = { l: number; b: number } & ({ toL: number; toB: number } | { radius: number });

/** Times the spacing is refined where the projection stretches pixels. */
const REFINEMENTS = 4;

/**
 * Places along a cut, evenly spaced on the sky and at most one pixel apart in the image.
 *
 * A segment has a place at both ends; a ring begins north of its centre, runs through east, and does not repeat its
 * first place at the end.
 *
 * @param pixelDegrees size of a pixel, about
 * @param most         places at most
 * @throws RangeError when the segment has no length, or joins opposite points of the sky, or is too long
 */
export function cutPath(wcs: Wcs, shape: CutShape, pixelDegrees: number, most: number): CutPath {
  const centre = { lon: shape.l, lat: shape.b };
  const isRing = 'radius' in shape;
  const end = isRing ? centre : { lon: shape.toL, lat: shape.toB };
  const length = isRing ? 360 * Math.sin((shape.radius * Math.PI) / 180) : separation(centre, end);
  if (!(length > 0)) throw new RangeError('This cut begins where it ends.');
  if (!isRing && length > 179.999)
    throw new RangeError('Opposite points of the sky have no one circle between them.');
  const angle = isRing ? 0 : positionAngle(centre, end);
  const at = (share: number) => {
    const { lon, lat } = isRing
      ? destination(centre, 360 * share, shape.radius)
      : destination(centre, angle, length * share);
    return wcs.galacticToPixel(lon, lat);
  };
  let intervals = Math.max(isRing ? 8 : 1, Math.ceil(length / pixelDegrees));
  for (let round = 0; ; round++) {
    if (intervals + 1 > most) throw new RangeError(`This cut is longer than ${most} pixels.`);
    const pixels = Array.from({ length: isRing ? intervals : intervals + 1 }, (_, i) => at(i / intervals));
    const widest = widestGap(pixels);
    if (widest <= 1 || round === REFINEMENTS) return { pixels, step: length / intervals };
    intervals = Math.ceil(intervals * Math.min(widest, 8) * 1.001);
  }
}

/** Largest distance between neighbours in the image; where it breaks off (an edge of the map) there is none. */
function widestGap(pixels: readonly (PixelPoint | null)[]): number {
  let widest = 0;
  for (let i = 1; i < pixels.length; i++) {
    const [a, b] = [pixels[i - 1], pixels[i]];
    if (!a || !b) continue;
    const gap = Math.hypot(a.x - b.x, a.y - b.y);
    if (gap < 16 && gap > widest) widest = gap; // farther apart: the two ends of an all-sky map
  }
  return widest;
}
