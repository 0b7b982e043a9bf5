import { destination, positionAngle, separation, type LonLat } from '@/shared/sky/greatCircle';
import { buildWcs, type Wcs } from '@/shared/sky/wcs';
import type { WcsSpec } from '@/shared/sky/wcsSpec';

/** How a picture's pixels lie on the sky: the part of `Wcs` that has to do with the sky. */
export type SkyView = Pick<Wcs, 'pixelToGalactic' | 'galacticToPixel' | 'pixelToSky' | 'skyToPixel'>;

export interface PolarShape {
  /** Galactic. */
  centre: LonLat;
  /** Degrees from the centre at the lower edge. */
  reach: number;
  /** Pixels across (azimuth, 360 degrees) and down (distance from the centre). */
  nx: number;
  ny: number;
}

/**
 * Azimuth about a centre across, from north (left) through east; great-circle distance from it downward. A circle
 * about the centre is a straight horizontal line.
 *
 * Pixel x spans azimuths 360·x/nx to 360·(x + 1)/nx about its centre; the uppermost row (y = ny − 1) begins at the
 * centre. A place farther than `reach` lies below the picture.
 *
 * @param cube the frame in which `pixelToSky` and `skyToPixel` speak
 */
export function polarView({ centre, reach, nx, ny }: PolarShape, cube: Wcs): SkyView {
  const toSky = (x: number, y: number): LonLat | null => {
    const distance = ((ny - 0.5 - y) / ny) * reach;
    if (distance < 0 || distance > 180) return null;
    return destination(centre, ((x + 0.5) / nx) * 360, distance);
  };
  const toPixel = (at: LonLat) => ({
    x: (positionAngle(centre, at) / 360) * nx - 0.5,
    y: ny - 0.5 - (separation(centre, at) / reach) * ny,
  });
  return through(toSky, toPixel, cube);
}

/** A view given in galactic coordinates, speaking the cube's own frame too: the way there goes through its pixels. */
function through(
  toSky: (x: number, y: number) => LonLat | null,
  toPixel: (at: LonLat) => { x: number; y: number } | null,
  cube: Wcs,
): SkyView {
  return {
    pixelToGalactic(x, y) {
      const at = toSky(x, y);
      return at && { l: at.lon, b: at.lat };
    },
    galacticToPixel: (l, b) => toPixel({ lon: l, lat: b }),
    pixelToSky(x, y) {
      const at = toSky(x, y);
      const pixel = at && cube.galacticToPixel(at.lon, at.lat);
      return pixel && cube.pixelToSky(pixel.x, pixel.y);
    },
    skyToPixel(lon, lat) {
      const pixel = cube.skyToPixel(lon, lat);
      const at = pixel && cube.pixelToGalactic(pixel.x, pixel.y);
      return at && toPixel({ lon: at.l, lat: at.b });
    },
  };
}

/**
 * A stereographic map about a galactic centre, north up and longitude to the left, with the spectral axis of a cube.
 * Every circle on the sky is a circle in it.
 *
 * @param reach degrees from the centre to the middle of each side, below 175
 */
export function stereographicView(centre: LonLat, reach: number, pixels: number, cube: WcsSpec): Wcs {
  // Calabretta & Greisen 2002, equation 56: r = (360/π) tan((90° − θ)/2)
  const half = (360 / Math.PI) * Math.tan((Math.min(reach, 174) * Math.PI) / 360);
  const step = (2 * half) / pixels;
  return buildWcs({
    ...cube,
    sky: {
      frame: 'galactic',
      equinox: null,
      projection: 'STG',
      referencePixel: [(pixels - 1) / 2, (pixels - 1) / 2],
      reference: [centre.lon, centre.lat],
      matrix: [-step, 0, 0, step],
      lonPole: null,
      latPole: null,
      parameters: [],
      size: [pixels, pixels],
    },
  });
}
