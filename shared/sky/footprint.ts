import { lonLatOf, separation, unitVector, type LonLat, type Vector } from '@/shared/sky/greatCircle';
import type { Wcs } from '@/shared/sky/wcs';

/** Places along each side at which an image is looked at. */
const SAMPLES = 9;

/** The sky an image shows: a circle around all of it, for a quick no, and places in it, for the rest. */
export interface Footprint {
  wcs: Wcs;
  nx: number;
  ny: number;
  /** Galactic degrees. */
  centre: LonLat;
  radius: number;
  places: LonLat[];
}

/**
 * Footprint of an image of nx by ny pixels; null when none of its pixels lies on the sky.
 *
 * The places are a grid of 9 by 9 pixel centres including the corners, so that something narrower than an eighth of
 * the image can slip between them.
 */
export function footprintOf(wcs: Wcs, nx: number, ny: number): Footprint | null {
  const places: LonLat[] = [];
  for (let j = 0; j < SAMPLES; j++)
    for (let i = 0; i < SAMPLES; i++) {
      const at = wcs.pixelToGalactic((i * (nx - 1)) / (SAMPLES - 1), (j * (ny - 1)) / (SAMPLES - 1));
      if (at) places.push({ lon: at.l, lat: at.b });
    }
  if (places.length === 0) return null;
  const sum: [number, number, number] = [0, 0, 0];
  for (const place of places) unitVector(place).forEach((v, axis) => (sum[axis]! += v));
  const centre = lonLatOf(normalised(sum));
  const reach = Math.max(...places.map((place) => separation(centre, place)));
  return { wcs, nx, ny, centre, radius: reach, places };
}

const normalised = ([x, y, z]: [number, number, number]): Vector => {
  const length = Math.hypot(x, y, z);
  return length > 1e-12 ? [x / length, y / length, z / length] : [1, 0, 0]; // an image of the whole sky has no middle
};

/** Whether two images show some of the same sky. */
export function overlaps(a: Footprint, b: Footprint): boolean {
  if (separation(a.centre, b.centre) > a.radius + b.radius) return false;
  return a.places.some((place) => contains(b, place)) || b.places.some((place) => contains(a, place));
}

function contains({ wcs, nx, ny }: Footprint, { lon, lat }: LonLat): boolean {
  const at = wcs.galacticToPixel(lon, lat);
  return at !== null && at.x >= -0.5 && at.x <= nx - 0.5 && at.y >= -0.5 && at.y <= ny - 0.5;
}
