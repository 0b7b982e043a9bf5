import { Problem } from '@/shared/contract/problem';
import type { Header } from './header';
import { axisTypes, findSky, isSpectral, listed, refuseUnknown, sameMap, type SkyAxes } from './skyAxes';

/** The axes of a cube in the file: their lengths, and which (from 0) runs along what. */
export interface CubeAxes extends SkyAxes {
  spectral: number;
  /** CTYPE of the spectral axis in capitals. */
  spectralType: string;
}

/** What to do with an image that is flat. */
const COMPANION = 'an image of the sky can be added to a region as a companion image';

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
    const what = `The image has ${naxis.length} ${naxis.length === 1 ? 'axis' : 'axes'}; a cube has two sky axes and a spectral axis`;
    throw new Problem('fits-shape', naxis.length === 2 ? `${what}; ${COMPANION}.` : `${what}.`, {
      card: 'NAXIS',
    });
  }
  const types = axisTypes(header, naxis);
  const { longitude, latitude } = findSky(types, naxis);
  const spectral = types.findIndex(isSpectral);
  if (spectral < 0) {
    refuseUnknown(types, naxis);
    throw new Problem(
      'fits-shape',
      `No axis is spectral (a frequency, wavelength or velocity); the axes are ${listed(types)}.`,
      {
        card: 'CTYPE3',
      },
    );
  }
  if (naxis[spectral]! < 2) {
    throw new Problem(
      'fits-shape',
      `The spectral axis has one channel; a cube needs at least two; ${COMPANION}.`,
      { card: `NAXIS${spectral + 1}` },
    );
  }
  const map = sameMap(types, longitude, latitude);
  return { naxis, longitude, latitude, spectral, ...map, spectralType: types[spectral]! };
}
