import { Problem } from '@/shared/contract/problem';
import { buildSky } from '@/shared/sky/wcs';
import type { SkyFrame, SkySpec } from '@/shared/sky/wcsSpec';
import { plainImageHeader } from './compressed/imageHeader';
import { tiledImage } from './compressed/tiledImage';
import { axisLengths } from './cubeAxes';
import { shownCards, type Bitpix, type HeaderCard } from './cubeHead';
import { Header } from './header';
import { bitpixOf, pixelBytes, requireBytes, requireImage, scalingOf } from './imageData';
import { skyStep } from './linearStep';
import type { CubeLayout } from './planeRange';
import { axisTypes, findSky, isSpectral, sameMap } from './skyAxes';
import { skyOfHeader } from './skyHeader';
import { usable } from './wcsProblem';

/** All that is known of an image of the sky before its pixels are read: plain JSON, stored with the image. */
export interface ImageHead {
  shape: { nx: number; ny: number };
  /** Which HDU of the file, from 0. */
  hdu: number;
  bitpix: Bitpix;
  bscale: number;
  bzero: number;
  /** The integer that marks a blank pixel, in decimal; null when none. */
  blank: string | null;
  /** BUNIT as written; null when the header gives none. Any unit will do. */
  unit: string | null;
  object: string | null;
  /** Tiles are read through a plain copy, as those of a cube are. */
  container: 'plain' | 'tiled';
  /** Bytes from the start of the file to the data, and bytes stored from there on (padding not counted). */
  dataOffset: number;
  dataBytes: number;
  /** Lengths of all axes in the file's order, and which of them (from 0) is which. */
  layout: { naxis: number[]; longitude: number; latitude: number };
  frame: SkyFrame;
  equinox: number | null;
  projection: string;
  sky: SkySpec;
  /** Sentences for the analyst: what was doubtful in the header and how it was read. */
  cautions: string[];
  cards: HeaderCard[];
}

/** Which part of a file is described: where its header starts, bytes, and its number, from 0. */
export interface ImagePlace {
  offset?: number;
  hdu?: number;
}

/**
 * Describe the image of the sky whose header these bytes are (whole 2880-byte blocks up to and with END): two sky axes,
 * in any order, and no other axis longer than one. A table that holds a tile-compressed image counts as that image.
 *
 * @param headerBytes one header, from SIMPLE or XTENSION on
 * @param fileSize    bytes of the whole file; when given, a file too short for its data is refused
 * @throws Problem not-fits, fits-card (names the card), fits-image (says what the file holds instead), fits-truncated
 */
export function describeImage(
  headerBytes: Uint8Array,
  fileSize?: number,
  { offset = 0, hdu = 0 }: ImagePlace = {},
): ImageHead {
  try {
    return described(headerBytes, fileSize, { offset, hdu });
  } catch (error) {
    if (!(error instanceof Problem) || error.type !== 'fits-shape') throw error;
    throw new Problem('fits-image', error.detail, error.extra); // what both kinds of file are refused for
  }
}

function described(
  headerBytes: Uint8Array,
  fileSize: number | undefined,
  { offset, hdu }: Required<ImagePlace>,
): ImageHead {
  const stored = new Header(headerBytes);
  const tiles = stored.logical('ZIMAGE') === true ? tiledImage(stored) : null;
  const header = tiles ? new Header(plainImageHeader(headerBytes)) : stored;
  const cautions: string[] = [];
  requireImage(header);
  const bitpix = bitpixOf(header);
  const naxis = axisLengths(header);
  const dataOffset = offset + headerBytes.length;
  const plainBytes = pixelBytes(naxis, bitpix);
  const dataBytes = tiles ? tiles.heapOffset + tiles.heapBytes : plainBytes;
  const types = axisTypes(header, naxis);
  requireFlat(naxis, types);
  requireBytes(dataOffset, dataBytes, fileSize);
  const axes = { naxis, ...findSky(types, naxis) };
  requireTwoSkyAxes(axes, types);
  const map = { ...axes, ...sameMap(types, axes.longitude, axes.latitude) };
  const sky = skyOfHeader(header, map, skyStep(header, map, cautions), cautions);
  usable(() => buildSky(sky), map, header);
  const unit = header.text('BUNIT');
  if (unit === null) cautions.push('BUNIT is missing: the numbers of the image have no unit.');
  return {
    shape: { nx: naxis[axes.longitude]!, ny: naxis[axes.latitude]! },
    hdu,
    bitpix,
    ...scalingOf(header, bitpix, cautions),
    unit,
    object: header.text('OBJECT'),
    container: tiles ? 'tiled' : 'plain',
    dataOffset,
    dataBytes,
    layout: axes,
    frame: sky.frame,
    equinox: sky.equinox,
    projection: sky.projection,
    sky,
    cautions: [...cautions, ...header.cautions],
    cards: shownCards(header),
  };
}

/** More than two axes longer than one make no image of the sky: say what they make. */
function requireFlat(naxis: number[], types: string[]): void {
  const long = naxis.flatMap((n, i) => (n > 1 ? [i] : []));
  if (long.length <= 2) return;
  const spectral = long.find((i) => isSpectral(types[i]!));
  if (spectral !== undefined) {
    throw new Problem(
      'fits-image',
      `This is a cube: its spectral axis (axis ${spectral + 1}) has ${naxis[spectral]} channels. Upload it as a cube, or send one plane or a map of it.`,
      { card: `NAXIS${spectral + 1}` },
    );
  }
  const other = long.findLast((i) => !/^(RA|DEC|GLON|GLAT)/.test(types[i]!)) ?? long.at(-1)!;
  throw new Problem(
    'fits-image',
    `Axis ${other + 1} (${types[other] || 'unnamed'}) has ${naxis[other]} planes; an image of the sky has one. Send the plane that you want as a file of its own.`,
    { card: `NAXIS${other + 1}` },
  );
}

/** With one sky axis a single pixel long, the second long axis is none of the sky: a slice through a cube. */
function requireTwoSkyAxes({ naxis, longitude, latitude }: ImageHead['layout'], types: string[]): void {
  const other = naxis.findIndex((n, i) => n > 1 && i !== longitude && i !== latitude);
  if (other < 0) return;
  throw new Problem(
    'fits-image',
    `Axis ${other + 1} (${types[other] || 'unnamed'}) has ${naxis[other]} pixels and is no sky axis; an image of the sky has two sky axes and nothing else.`,
    { card: `CTYPE${other + 1}` },
  );
}

/** The image as the one channel of a cube, for what reads planes. */
export const asOnePlane = ({ layout, bitpix, dataOffset, container, bscale, bzero, blank }: ImageHead) => ({
  ...{ bitpix, dataOffset, container, bscale, bzero, blank },
  layout: { ...layout, spectral: layout.naxis.length } satisfies CubeLayout['layout'],
});
