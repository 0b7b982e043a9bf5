import { DEGREE, eastNorth, unitVector, lonLatOf, type LonLat } from '@/shared/sky/greatCircle';
import type { Wcs } from '@/shared/sky/wcs';

/** One channel to look at: brightness row by row from y = 0, NaN where it is blank. */
export interface Plane {
  values: Float32Array | Float64Array;
  nx: number;
  ny: number;
}

export const SECTORS = 24;
export const RAYS = 5;

/** The middle of a sector's rays: degrees, north through east. */
export const sectorAzimuth = (sector: number): number => ((sector + 0.5) * 360) / SECTORS;

/**
 * Mean brightness along the great-circle rays of one sector of azimuth.
 *
 * @param radii degrees from the centre
 * @returns one value a radius, or why there is none: a ray leaves the map, or meets a blank pixel
 */
export function sectorProfile(
  plane: Plane,
  wcs: Wcs,
  centre: LonLat,
  sector: number,
  radii: Float64Array,
): Float64Array | 'outside' | 'blank' {
  const n = unitVector(centre);
  const { east, north } = eastNorth(n);
  const mean = new Float64Array(radii.length);
  let blank = false;
  for (let ray = 0; ray < RAYS; ray++) {
    const azimuth = (2 * Math.PI * (sector + (ray + 0.5) / RAYS)) / SECTORS;
    const [s, c] = [Math.sin(azimuth), Math.cos(azimuth)];
    const towards = [0, 1, 2].map((a) => s * east[a]! + c * north[a]!);
    for (let i = 0; i < radii.length; i++) {
      const [sine, cosine] = [Math.sin(radii[i]! * DEGREE), Math.cos(radii[i]! * DEGREE)];
      const { lon, lat } = lonLatOf([
        cosine * n[0] + sine * towards[0]!,
        cosine * n[1] + sine * towards[1]!,
        cosine * n[2] + sine * towards[2]!,
      ]);
      const at = wcs.galacticToPixel(lon, lat);
      if (at === null) return 'outside';
      const value = between(plane, at.x, at.y);
      if (value === null) return 'outside';
      blank ||= Number.isNaN(value);
      mean[i] = mean[i]! + value / RAYS;
    }
  }
  return blank ? 'blank' : mean;
}

/** Bilinear interpolation between pixel centres; null beyond the outermost of them, NaN beside a blank pixel. */
function between({ values, nx, ny }: Plane, x: number, y: number): number | null {
  if (!(x >= 0 && y >= 0 && x <= nx - 1 && y <= ny - 1)) return null;
  const [i, j] = [Math.min(Math.floor(x), Math.max(nx - 2, 0)), Math.min(Math.floor(y), Math.max(ny - 2, 0))];
  const [f, g] = [x - i, y - j];
  const at = j * nx + i;
  const lower = f === 0 ? values[at]! : values[at]! * (1 - f) + values[at + 1]! * f;
  if (g === 0) return lower;
  const upper = f === 0 ? values[at + nx]! : values[at + nx]! * (1 - f) + values[at + nx + 1]! * f;
  return lower * (1 - g) + upper * g;
}

/** Smooth evenly spaced samples by a Gaussian; beyond the ends their own values go on. sigma in samples. */
export function smoothed(samples: Float64Array, sigma: number): Float64Array {
  const reach = Math.ceil(4 * sigma);
  if (!(reach > 0)) return samples;
  const weights = Float64Array.from({ length: 2 * reach + 1 }, (_, k) =>
    Math.exp(-0.5 * ((k - reach) / sigma) ** 2),
  );
  const total = weights.reduce((sum, w) => sum + w, 0);
  const last = samples.length - 1;
  return samples.map((_, i) => {
    let sum = 0;
    for (let k = -reach; k <= reach; k++)
      sum += weights[k + reach]! * samples[Math.min(Math.max(i + k, 0), last)]!;
    return sum / total;
  });
}

/** The samples less the straight line through them (least squares). */
export function withoutTrend(samples: Float64Array): Float64Array {
  const n = samples.length;
  const middle = (n - 1) / 2;
  let [mean, slope, square] = [0, 0, 0];
  for (let i = 0; i < n; i++) {
    mean += samples[i]! / n;
    slope += (i - middle) * samples[i]!;
    square += (i - middle) ** 2;
  }
  slope /= square || 1;
  return samples.map((value, i) => value - mean - slope * (i - middle));
}
