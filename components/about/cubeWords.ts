import type { CubeAxes } from '@/shared/contract/cubes';
import { velocityLabel } from '@/shared/image/velocityDigits';

/** The projections by the names that the FITS standard gives their codes. */
const PROJECTIONS: Record<string, string> = {
  TAN: 'gnomonic',
  SIN: 'orthographic',
  NCP: 'orthographic about the pole',
  ARC: 'zenithal equidistant',
  STG: 'stereographic',
  ZEA: 'zenithal equal-area',
  CAR: 'plate carrée',
  CEA: 'cylindrical equal-area',
  MER: 'Mercator',
  SFL: 'sinusoidal',
  GLS: 'sinusoidal',
  AIT: 'Hammer–Aitoff',
  MOL: 'Mollweide',
};

/** Standards of rest, by what they are at rest with. */
const RESTS: Record<string, string> = {
  LSRK: 'local standard of rest, kinematic',
  LSRD: 'local standard of rest, dynamical',
  BARYCENT: 'barycentre of the solar system',
  HELIOCEN: 'the Sun',
  TOPOCENT: 'the telescope',
  GEOCENTR: 'centre of the Earth',
  GALACTOC: 'centre of the Galaxy',
  LOCALGRP: 'Local Group',
};

const SPECTRAL: Record<string, string> = {
  FREQ: 'frequency',
  ENER: 'photon energy',
  WAVN: 'wavenumber',
  VRAD: 'radio velocity',
  WAVE: 'wavelength',
  VOPT: 'optical velocity',
  ZOPT: 'redshift',
  AWAV: 'wavelength in air',
  VELO: 'relativistic velocity',
  BETA: 'velocity over light speed',
};

const SKY: Record<string, string> = {
  galactic: 'galactic, l and b',
  icrs: 'equatorial, ICRS',
  fk5: 'equatorial, FK5',
  fk4: 'equatorial, FK4',
  'fk4-no-e': 'equatorial, FK4 without E-terms',
};

const named = (code: string, names: Record<string, string>): string =>
  names[code] ? `${names[code]} (${code})` : code;

export const projectionWords = (code: string): string => named(code, PROJECTIONS);
export const restWords = (frame: string | null): string => (frame ? named(frame, RESTS) : 'not said');
export const spectralWords = (type: string): string => named(type, SPECTRAL);
export const skyWords = (frame: string): string => SKY[frame] ?? frame;

/** Up to three significant digits, as pixel sizes and beams need. */
const three = (value: number): string => String(Number(value.toPrecision(3)));

/** '0.05° (3′)', '0.00833° (30″)': degrees for the sums, minutes or seconds of arc for the eye. */
export function angleWords(degrees: number): string {
  const minutes = degrees * 60;
  const arc = minutes >= 1 ? `${three(minutes)}′` : `${three(minutes * 60)}″`;
  return minutes >= 120 ? `${three(degrees)}°` : `${three(degrees)}° (${arc})`;
}

/** '9′ × 6′ at 30°', from north through east; a round beam has one width and no angle. */
export function beamWords(beam: CubeAxes['beam']): string {
  if (!beam) return 'not said';
  const part = (degrees: number) =>
    degrees < 1 / 60 ? `${three(degrees * 3600)}″` : `${three(degrees * 60)}′`;
  const [major, minor] = [part(beam.major), part(beam.minor)];
  return major === minor ? major : `${major} × ${minor} at ${three(beam.angle)}°`;
}

/** '1420.405752 MHz'. */
export const restFrequencyWords = (hertz: number | null): string =>
  hertz === null ? 'not said' : `${Number((hertz / 1e6).toFixed(6))} MHz`;

/** '−62.1 … 14.0 km/s', whichever way the file's axis runs. */
export function rangeWords({ velocities: [first, last], channelWidth }: CubeAxes['spectral']): string {
  const [low, high] = first < last ? [first, last] : [last, first];
  return `${velocityLabel(low, channelWidth)} … ${velocityLabel(high, channelWidth)} km/s`;
}

/** BITPIX in words. */
export const bitsWords = (bitpix: number): string =>
  bitpix < 0 ? `${-bitpix}-bit floating point` : `${bitpix}-bit integers`;
