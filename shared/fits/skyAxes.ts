import { Problem } from '@/shared/contract/problem';
import type { Header } from './header';

/** The sky axes of an image in the file: the lengths of all axes, and which (from 0) are longitude and latitude. */
export interface SkyAxes {
  naxis: number[];
  longitude: number;
  latitude: number;
  system: 'galactic' | 'equatorial';
  /** Three-letter code as written; null when CTYPE gives no projection. */
  projection: string | null;
}

const LONGITUDES: Record<string, SkyAxes['system']> = {
  GLON: 'galactic',
  'RA--': 'equatorial',
  RA: 'equatorial',
};
const LATITUDES: Record<string, SkyAxes['system']> = {
  GLAT: 'galactic',
  'DEC-': 'equatorial',
  DEC: 'equatorial',
};
const SPECTRAL = /^(FREQ|ENER|WAVN|VRAD|WAVE|VOPT|ZOPT|AWAV|VELO|BETA|FELO)(-|$)/;
/** Axis types that are known and no help: an axis of this kind may be there, of any length. */
const OTHER = /^(STOKES|COMPLEX|CUBEFACE|TIME|LINEAR|$)/;

/** CTYPE of every axis, in capitals. */
export const axisTypes = (header: Header, naxis: number[]): string[] =>
  naxis.map((_, i) => (header.text(`CTYPE${i + 1}`) ?? '').toUpperCase());

export const isSpectral = (type: string): boolean => SPECTRAL.test(type);

/**
 * Which axes are longitude and latitude, in whatever order.
 *
 * @throws Problem fits-card (CTYPEn) when an axis cannot be read, fits-shape when one of the two is missing
 */
export function findSky(types: string[], naxis: number[]): { longitude: number; latitude: number } {
  const longitude = types.findIndex((t) => systemOf(LONGITUDES, t) !== null);
  const latitude = types.findIndex((t) => systemOf(LATITUDES, t) !== null);
  if (longitude >= 0 && latitude >= 0) return { longitude, latitude };
  refuseUnknown(types, naxis);
  throw new Problem(
    'fits-shape',
    `No axis is a ${longitude < 0 ? 'longitude' : 'latitude'} (CTYPEn of RA and DEC, or GLON and GLAT); the axes are ${listed(types)}.`,
    { card: 'CTYPE1' },
  );
}

/**
 * For an image that lacks an axis: the one of an unknown type may be what is missing.
 *
 * @throws Problem fits-card (CTYPEn)
 */
export function refuseUnknown(types: string[], naxis: number[]): void {
  const isKnown = (t: string) =>
    OTHER.test(t) || SPECTRAL.test(t) || systemOf(LONGITUDES, t) !== null || systemOf(LATITUDES, t) !== null;
  const unknown = types.findIndex((t, i) => naxis[i]! > 1 && !isKnown(t));
  if (unknown < 0) return;
  const card = `CTYPE${unknown + 1}`;
  throw new Problem('fits-card', `${card} = '${types[unknown]}' names no axis that can be read.`, { card });
}

/**
 * System and projection, which both sky axes must name alike.
 *
 * @throws Problem fits-card
 */
export function sameMap(
  types: string[],
  longitude: number,
  latitude: number,
): Pick<SkyAxes, 'system' | 'projection'> {
  const lon = types[longitude]!;
  const lat = types[latitude]!;
  const system = systemOf(LONGITUDES, lon)!;
  const card = `CTYPE${latitude + 1}`;
  if (system !== systemOf(LATITUDES, lat)) {
    throw new Problem('fits-card', `${lon} and ${lat} belong to different systems of coordinates.`, { card });
  }
  if (lon.slice(5) !== lat.slice(5)) {
    throw new Problem('fits-card', `${lon} and ${lat} name different projections.`, { card });
  }
  return { system, projection: lon.slice(5) || null };
}

export const listed = (types: string[]): string => types.map((t) => (t === '' ? 'unnamed' : t)).join(', ');

function systemOf(table: Record<string, SkyAxes['system']>, type: string): SkyAxes['system'] | null {
  const name = type.length > 4 && type[4] !== '-' ? '' : type.slice(0, 4);
  return Object.hasOwn(table, name) ? table[name]! : null;
}
