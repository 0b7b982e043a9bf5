import type { WcsSpec } from '@/shared/sky/wcsSpec';

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

/** The world coordinates of one cube. Degrees, km/s positive away, pixels and channels from 0 at their centres. */
export interface Wcs {
  /** Position in the header's own frame, longitude 0 … 360; null outside the projection. */
  pixelToSky(x: number, y: number): SkyPoint | null;
  /** Inverse of `pixelToSky`; null where the projection cannot show the place. */
  skyToPixel(lon: number, lat: number): PixelPoint | null;
  pixelToGalactic(x: number, y: number): GalacticPoint | null;
  galacticToPixel(l: number, b: number): PixelPoint | null;
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
 * @throws WcsError naming the card when the description cannot be used (unknown projection, singular matrix …)
 */
export function buildWcs(spec: WcsSpec): Wcs {
  throw new Error(`not yet: ${spec.version}`);
}
