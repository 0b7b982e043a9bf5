import { FWHM, type Covariance } from '@/shared/image/smoothing';
import { destination, type LonLat } from '@/shared/sky/greatCircle';

/** Full widths at half maximum in degrees; the angle of the major axis from north through east. */
export interface BeamShape {
  major: number;
  minor: number;
  angle: number;
}

interface Projecting {
  pixelToSky(x: number, y: number): LonLat | null;
  skyToPixel(lon: number, lat: number): { x: number; y: number } | null;
}

/** Degrees over which the image is taken to be straight about a place. */
const STEP = 1e-3;

/**
 * The smoothing, in pixels, that turns one beam into a round one of `fwhm` degrees; as the projection is at an image
 * place, so a wide field is smoothed rightly about that place and nearly elsewhere.
 *
 * @param beam what the image has been smoothed with already; null: nothing known, so all of it is done
 * @returns null when the wished beam is not larger than the one there is, or the place is not on the sky
 */
export function kernelTo(
  fwhm: number,
  beam: BeamShape | null,
  wcs: Projecting,
  at: { x: number; y: number },
): Covariance | null {
  const sky = wcs.pixelToSky(at.x, at.y);
  if (!sky) return null;
  const onward = (angle: number) => {
    const { lon, lat } = destination(sky, angle, STEP);
    const there = wcs.skyToPixel(lon, lat);
    return there && { x: (there.x - at.x) / STEP, y: (there.y - at.y) / STEP };
  };
  const [north, east] = [onward(0), onward(90)];
  if (!north || !east) return null;
  const turn = ((beam?.angle ?? 0) * Math.PI) / 180;
  const along = fwhm ** 2 - (beam?.major ?? 0) ** 2;
  const across = fwhm ** 2 - (beam?.minor ?? 0) ** 2;
  if (along < 0 || across < 0 || along + across === 0) return null;
  const axis = (n: number, e: number) => ({ x: n * north.x + e * east.x, y: n * north.y + e * east.y });
  const major = axis(Math.cos(turn), Math.sin(turn));
  const minor = axis(-Math.sin(turn), Math.cos(turn));
  const moment = (a: 'x' | 'y', b: 'x' | 'y') =>
    (along * major[a] * major[b] + across * minor[a] * minor[b]) / FWHM ** 2;
  return { xx: moment('x', 'x'), xy: moment('x', 'y'), yy: moment('y', 'y') };
}
