/**
 * World coordinates of a cube as plain JSON: stored with the cube, rebuilt into functions by `buildWcs` on the
 * server and in the browser. Everything in it is already in the units named here; pixels count from 0 at pixel
 * centres, x along the longitude axis, y along the latitude axis, whatever their order in the file.
 */
export interface WcsSpec {
  version: 1;
  sky: SkySpec;
  spectral: SpectralSpec;
}

export type SkyFrame = 'galactic' | 'icrs' | 'fk5' | 'fk4' | 'fk4-no-e';

export interface SkySpec {
  frame: SkyFrame;
  /** Julian year for FK5, Besselian year for FK4, null for frames without an equinox. */
  equinox: number | null;
  /** Three-letter code as the file writes it: TAN, SIN, CAR, SFL, GLS … */
  projection: string;
  /** x and y of the reference pixel. */
  referencePixel: [x: number, y: number];
  /** Longitude and latitude there, degrees in `frame`. */
  reference: [lon: number, lat: number];
  /** Degrees of projection plane per pixel, row by row: [dX/dx, dX/dy, dY/dx, dY/dy]. */
  matrix: [number, number, number, number];
  /** Native longitude of the celestial pole and native latitude of it, degrees; null: the standard's default. */
  lonPole: number | null;
  latPole: number | null;
  /** Projection parameters PV of the latitude axis by number: parameters[m] is PVi_m; null where not given. */
  parameters: (number | null)[];
  /** Pixels along x and y; which turn of longitude an image wider than the sky shows depends on it. */
  size: [nx: number, ny: number];
}

/** How a velocity is derived from a frequency; null where the header does not say. */
export type VelocityConvention = 'radio' | 'optical' | 'relativistic';

/** What the spectral axis counts in. */
export type SpectralType = 'FREQ' | 'ENER' | 'WAVN' | 'VRAD' | 'WAVE' | 'VOPT' | 'ZOPT' | 'VELO' | 'BETA';

export interface SpectralSpec {
  type: SpectralType;
  /** The quantity the axis is linear in, when not in `type` itself: F frequency, W wavelength, V velocity; LOG. */
  linearIn: 'F' | 'W' | 'V' | 'LOG' | null;
  /** Channel (from 0) of the reference, value there and step, in SI: Hz, J, 1/m, m, m/s, or a bare number. */
  referenceChannel: number;
  reference: number;
  step: number;
  /** Number of channels. */
  channels: number;
  restFrequencyHz: number | null;
  /** True when the header names no line and neutral hydrogen was assumed. */
  restAssumed: boolean;
  convention: VelocityConvention | null;
  /** SPECSYS, or what an old axis name says: LSRK, BARYCENT, TOPOCENT …; null when the header does not say. */
  frame: string | null;
}

/** A world-coordinate description that cannot be used, with the card (or parameter) at fault. */
export class WcsError extends Error {
  constructor(
    readonly card: string,
    message: string,
  ) {
    super(message);
    this.name = 'WcsError';
  }
}
