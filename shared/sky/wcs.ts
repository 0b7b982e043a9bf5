import { frameToGalactic } from './frames';
import { lonLatOf, unitVector, type Vector } from './greatCircle';
import { planeToSky } from './skyPlane';
import { spectralAxis } from './spectralAxis';
import { WcsError, type SkySpec, type WcsSpec } from './wcsSpec';

export interface SkyPoint {
  lon: number;
  lat: number;
}

export interface GalacticPoint {
  l: number;
  b: number;
}

export interface PixelPoint {
  x: number;
  y: number;
}

/** Where the pixels of an image lie on the sky. Degrees; pixels count from 0 at their centres. */
export interface Sky {
  /** Position in the header's own frame, longitude 0 … 360; null outside the projection. */
  pixelToSky(x: number, y: number): SkyPoint | null;
  /** Inverse of `pixelToSky`; null where the projection cannot show the place. */
  skyToPixel(lon: number, lat: number): PixelPoint | null;
  pixelToGalactic(x: number, y: number): GalacticPoint | null;
  galacticToPixel(l: number, b: number): PixelPoint | null;
}

/** The world coordinates of one cube: its sky and its velocities, km/s positive away; channels count from 0. */
export interface Wcs extends Sky {
  /** Velocity in the axis' own convention (FREQ: radio; WAVE: optical), km/s. */
  velocityOf(channel: number): number;
  channelOf(velocity: number): number;
  /** Frequency of a channel in Hz; null without a rest frequency (unless the axis itself counts frequency). */
  frequencyHzOf(channel: number): number | null;
  /** Median distance between neighbouring channels, km/s, positive. */
  velocityStep: number;
}

/**
 * Build the coordinate functions of a cube from its stored description.
 *
 * Agrees with wcslib (through astropy) to 1e-12 deg and 1e-10 km/s; there and back to 1e-9 deg.
 *
 * @throws WcsError naming the card when the description cannot be used (unknown projection, singular matrix …)
 */
export function buildWcs(spec: WcsSpec): Wcs {
  const sky = buildSky(spec.sky);
  const { velocityOf, channelOf, frequencyHzOf, velocityStep } = spectralAxis(spec.spectral);
  return { ...sky, velocityOf, channelOf, frequencyHzOf, velocityStep };
}

/**
 * The sky part alone: of a cube, or of an image that has no spectral axis. Accuracy as `buildWcs`.
 *
 * @throws WcsError naming the card (unknown projection, singular matrix …)
 */
export function buildSky(spec: SkySpec): Sky {
  const { toSky, toPlane } = planeToSky(spec);
  const galactic = frameToGalactic(spec.frame, spec.equinox);
  const [a, b, c, d] = spec.matrix;
  const [x0, y0] = spec.referencePixel;
  const [nx, ny] = spec.size;
  const determinant = a * d - b * c;
  if (!(Math.abs(determinant) > 1e-12 * (Math.abs(a * d) + Math.abs(b * c)))) {
    throw new WcsError('CD', 'The matrix from pixels to degrees is singular: pixels do not span the sky.');
  }

  const vectorAt = (x: number, y: number): Vector | null => {
    const v = toSky(a * (x - x0) + b * (y - y0), c * (x - x0) + d * (y - y0));
    return v && Number.isFinite(v[0] + v[1] + v[2]) ? v : null; // numbers beyond float64 name no place
  };

  /** The place in pixels; of several turns of longitude, the one in the image or nearest to it. */
  const pixelOf = (v: Vector): PixelPoint | null => {
    let best: PixelPoint | null = null;
    let least = Infinity;
    for (const { X, Y } of toPlane(v)) {
      const pixel = { x: x0 + (d * X - b * Y) / determinant, y: y0 + (a * Y - c * X) / determinant };
      const outside = beyond(pixel.x, nx) + beyond(pixel.y, ny);
      if (outside < least) {
        best = pixel;
        least = outside;
      }
    }
    return best;
  };

  return {
    pixelToSky(x, y) {
      const v = vectorAt(x, y);
      return v && lonLatOf(v);
    },
    skyToPixel: (lon, lat) => pixelOf(unitVector({ lon, lat })),
    pixelToGalactic(x, y) {
      const v = vectorAt(x, y);
      if (!v) return null;
      const { lon, lat } = lonLatOf(galactic.toGalactic(v));
      return { l: lon, b: lat };
    },
    galacticToPixel: (l, b) => pixelOf(galactic.fromGalactic(unitVector({ lon: l, lat: b }))),
  };
}

/** How far a pixel coordinate lies outside an axis of that many pixels. */
const beyond = (at: number, pixels: number) => Math.max(0, -0.5 - at, at - (pixels - 0.5));
