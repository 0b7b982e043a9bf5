import { Problem } from '@/shared/contract/problem';
import type { Header } from './header';

/** The axes of a cube in the file: their lengths, and which (from 0) runs along what. */
export interface CubeAxes {
  naxis: number[];
  longitude: number;
  latitude: number;
  spectral: number;
  system: 'galactic' | 'equatorial';
  /** Three-letter code as written; null when CTYPE gives no projection. */
  projection: string | null;
  /** CTYPE of the spectral axis in capitals. */
  spectralType: string;
}

const LONGITUDES: Record<string, CubeAxes['system']> = {
  GLON: 'galactic',
  'RA--': 'equatorial',
  RA: 'equatorial',
};
const LATITUDES: Record<string, CubeAxes['system']> = {
  GLAT: 'galactic',
  'DEC-': 'equatorial',
  DEC: 'equatorial',
};
const SPECTRAL = /^(FREQ|ENER|WAVN|VRAD|WAVE|VOPT|ZOPT|AWAV|VELO|BETA|FELO)(-|$)/;
/** Axis types that are known and no help: an axis of this kind may be there, of any length. */
const OTHER = /^(STOKES|COMPLEX|CUBEFACE|TIME|LINEAR|$)/;

/**
 * Lengths of the axes as NAXISn declare them (ZNAXISn of a compressed image with prefix Z).
 *
 * @throws Problem fits-card when one is missing or not positive, fits-shape when the image has none
 */
export function axisLengths(header: Header, prefix: '' | 'Z' = ''): number[] {
  const card = `${prefix}NAXIS`;
  const count = required(header, card);
  if (count < 0 || count > 999) {
    throw new Problem('fits-card', `${card} must be 0 to 999; the header says ${count}.`, { card });
  }
  return Array.from({ length: count }, (_, i) => {
    const keyword = `${card}${i + 1}`;
    const length = required(header, keyword);
    if (length < 0) throw new Problem('fits-card', `${keyword} = ${length} is no length.`, { card: keyword });
    return length;
  });
}

export function required(header: Header, keyword: string): number {
  const value = header.integer(keyword);
  if (value === null) throw new Problem('fits-card', `The header has no ${keyword} card.`, { card: keyword });
  return value;
}

/**
 * Find the longitude, latitude and spectral axis among the axes of an image, in whatever order.
 *
 * @throws Problem fits-shape when the image is not a cube, fits-card (CTYPEn) when an axis cannot be read
 */
export function cubeAxes(header: Header, naxis: number[]): CubeAxes {
  if (naxis.length < 3) {
    throw new Problem(
      'fits-shape',
      `The image has ${naxis.length} ${naxis.length === 1 ? 'axis' : 'axes'}; a cube has two sky axes and a spectral axis.`,
      { card: 'NAXIS' },
    );
  }
  const types = naxis.map((_, i) => (header.text(`CTYPE${i + 1}`) ?? '').toUpperCase());
  const find = (test: (type: string) => boolean) => types.findIndex(test);
  const longitude = find((t) => systemOf(LONGITUDES, t) !== null);
  const latitude = find((t) => systemOf(LATITUDES, t) !== null);
  const spectral = find((t) => SPECTRAL.test(t));
  const isKnown = (t: string) =>
    OTHER.test(t) || SPECTRAL.test(t) || systemOf(LONGITUDES, t) !== null || systemOf(LATITUDES, t) !== null;
  const unknown = types.findIndex((t, i) => naxis[i]! > 1 && !isKnown(t));
  if (unknown >= 0 && (longitude < 0 || latitude < 0 || spectral < 0)) {
    const card = `CTYPE${unknown + 1}`;
    throw new Problem('fits-card', `${card} = '${types[unknown]}' names no axis that can be read.`, { card });
  }
  if (longitude < 0 || latitude < 0) {
    throw new Problem(
      'fits-shape',
      `No axis is a ${longitude < 0 ? 'longitude' : 'latitude'} (CTYPEn of RA and DEC, or GLON and GLAT); the axes are ${listed(types)}.`,
      { card: 'CTYPE1' },
    );
  }
  if (spectral < 0) {
    throw new Problem(
      'fits-shape',
      `No axis is spectral (a frequency, wavelength or velocity); the axes are ${listed(types)}.`,
      {
        card: 'CTYPE3',
      },
    );
  }
  if (naxis[spectral]! < 2) {
    throw new Problem('fits-shape', 'The spectral axis has one channel; a cube needs at least two.', {
      card: `NAXIS${spectral + 1}`,
    });
  }
  return {
    naxis,
    longitude,
    latitude,
    spectral,
    ...sameMap(types, longitude, latitude),
    spectralType: types[spectral]!,
  };
}

/** System and projection, which both sky axes must name alike. */
function sameMap(types: string[], longitude: number, latitude: number) {
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

function systemOf(table: Record<string, CubeAxes['system']>, type: string): CubeAxes['system'] | null {
  const name = type.length > 4 && type[4] !== '-' ? '' : type.slice(0, 4);
  return Object.hasOwn(table, name) ? table[name]! : null;
}

const listed = (types: string[]) => types.map((t) => (t === '' ? 'unnamed' : t)).join(', ');
