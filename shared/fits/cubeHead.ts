import { Problem } from '@/shared/contract/problem';
import { buildWcs } from '@/shared/sky/wcs';
import type { SkyFrame, VelocityConvention, WcsSpec } from '@/shared/sky/wcsSpec';
import { beamOf, unitOfBrightness, type Beam } from './brightness';
import { plainImageHeader } from './compressed/imageHeader';
import { tiledImage } from './compressed/tiledImage';
import { axisLengths, cubeAxes, type CubeAxes } from './cubeAxes';
import { Header } from './header';
import { bitpixOf, pixelBytes, requireBytes, requireImage, scalingOf } from './imageData';
import { linearStep } from './linearStep';
import { skyOfHeader } from './skyHeader';
import { spectralOfHeader } from './spectralHeader';
import { stokesOf, type StokesPlane } from './stokesAxis';
import { usable } from './wcsProblem';

export type { Beam };

export type Bitpix = 8 | 16 | 32 | 64 | -32 | -64;

export interface HeaderCard {
  keyword: string;
  /** As a person reads it: text without quotes, numbers as the file writes them; null for a card without value. */
  value: string | null;
  comment: string;
}

/** An image of a file that can be chosen; `usable` when it is a cube. */
export interface HduChoice {
  index: number;
  name: string;
  /** Lengths of its axes in the file's order. */
  shape: number[];
  usable: boolean;
}

/** All that the product needs to know of a cube before reading its pixels: plain JSON, stored with the cube. */
export interface CubeHead {
  shape: { nx: number; ny: number; channels: number };
  /** Which HDU of the file, from 0. */
  hdu: number;
  bitpix: Bitpix;
  bscale: number;
  bzero: number;
  /** The integer that marks a blank pixel, in decimal (64 bits do not fit a number); null when none. */
  blank: string | null;
  /** Brightness unit as understood: K, mK, Jy/beam, mJy/beam; null when missing or not understood. */
  unit: string | null;
  /** BUNIT as written. */
  bunit: string | null;
  object: string | null;
  /**
   * How the pixels are stored; absent in heads of older cubes, which are plain. A cube that is not plain is read
   * through a plain copy: its dataOffset counts in the expanded bytes, and is where the table begins for tiles.
   */
  container?: 'plain' | 'gzip' | 'tiled';
  /** What else of the file could be read: images by HDU, and planes along a Stokes axis; absent in older heads. */
  choices?: { hdus: HduChoice[]; stokes: { index: number; name: string }[] };
  /** Bytes from the start of the file to the first pixel, and bytes stored from there on (padding not counted). */
  dataOffset: number;
  dataBytes: number;
  /** Lengths of all axes in the file's order, and which of them (from 0) is which. */
  layout: {
    naxis: number[];
    longitude: number;
    latitude: number;
    spectral: number;
    /** The plane that is read of an axis beyond these three; absent: the first. */
    stokes?: StokesPlane;
  };
  beam: Beam | null;
  frame: SkyFrame;
  equinox: number | null;
  projection: string;
  spectral: {
    ctype: string;
    type: string;
    convention: VelocityConvention | null;
    frame: string | null;
    /** As the header says; null when it does not: assumedRestFrequencyHz then says what was taken, if anything. */
    restFrequencyHz: number | null;
    assumedRestFrequencyHz: number | null;
    /** km/s at the first and the last channel. */
    velocities: [first: number, last: number];
  };
  wcs: WcsSpec;
  /** Sentences for the analyst: what was doubtful in the header and how it was read. */
  cautions: string[];
  cards: HeaderCard[];
}

/** Which part of a file is described. */
export interface HduPlace {
  /** Where the header starts in the file, bytes. */
  offset?: number;
  /** Which HDU it is, from 0. */
  hdu?: number;
  /** Plane along the Stokes axis, from 0; absent: the first, with a caution. */
  stokes?: number;
}

/**
 * Describe the cube whose header these bytes are (whole 2880-byte blocks up to and with END): an image, or a table
 * that holds a tile-compressed image.
 *
 * @param headerBytes one header, from SIMPLE or XTENSION on
 * @param fileSize    bytes of the whole file; when given, a file too short for its data is refused
 * @throws Problem not-fits, fits-card (names the card), fits-shape, fits-truncated (names the missing bytes),
 *         invalid-input (field stokes)
 */
export function describeCube(
  headerBytes: Uint8Array,
  fileSize?: number,
  { offset = 0, hdu = 0, stokes }: HduPlace = {},
): CubeHead {
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
  requireBytes(dataOffset, dataBytes, fileSize);
  if (tiles) requireBytes(dataOffset, plainBytes, undefined);
  const axes = cubeAxes(header, naxis);
  const wcs = wcsOf(header, axes, cautions);
  const beam = beamOf(header);
  const { spectral } = wcs;
  const { velocityOf } = usable(() => buildWcs(wcs), axes, header);
  const velocities: [number, number] = [velocityOf(0) + 0, velocityOf(spectral.channels - 1) + 0];
  if (!velocities.every(Number.isFinite)) {
    const card = `CRVAL${axes.spectral + 1}`;
    throw new Problem('fits-card', `${card} and the rest frequency give channels no velocity.`, { card });
  }
  const { plane, choices } = stokesOf(header, axes, stokes, cautions);
  return {
    shape: { nx: naxis[axes.longitude]!, ny: naxis[axes.latitude]!, channels: naxis[axes.spectral]! },
    hdu,
    bitpix,
    ...scalingOf(header, bitpix, cautions),
    unit: unitOfBrightness(header, beam, cautions),
    bunit: header.text('BUNIT'),
    object: header.text('OBJECT'),
    container: tiles ? 'tiled' : 'plain',
    choices: { hdus: [], stokes: choices },
    dataOffset,
    dataBytes,
    layout: {
      naxis,
      longitude: axes.longitude,
      latitude: axes.latitude,
      spectral: axes.spectral,
      ...(plane && { stokes: plane }),
    },
    beam,
    frame: wcs.sky.frame,
    equinox: wcs.sky.equinox,
    projection: wcs.sky.projection,
    spectral: {
      ctype: axes.spectralType,
      ...spectralSummary(spectral, velocities),
    },
    wcs,
    cautions: [...cautions, ...header.cautions],
    cards: shownCards(header),
  };
}

/** The cards as a person reads them. */
export const shownCards = (header: Header): HeaderCard[] =>
  header.cards.map(({ keyword, value, field, comment }) => ({
    keyword,
    value: value === null ? null : typeof value === 'string' ? value : field,
    comment,
  }));

function wcsOf(header: Header, axes: CubeAxes, cautions: string[]): WcsSpec {
  const step = linearStep(header, axes, cautions);
  return {
    version: 1,
    sky: skyOfHeader(header, axes, step.sky, cautions),
    spectral: spectralOfHeader(header, axes, step, cautions),
  };
}

/** What a head says of its spectral axis: all but the name the file gives it. */
export const spectralSummary = (
  spectral: WcsSpec['spectral'],
  velocities: [first: number, last: number],
): Omit<CubeHead['spectral'], 'ctype'> => ({
  type: spectral.type,
  convention: spectral.convention,
  frame: spectral.frame,
  restFrequencyHz: spectral.restAssumed ? null : spectral.restFrequencyHz,
  assumedRestFrequencyHz: spectral.restAssumed ? spectral.restFrequencyHz : null,
  velocities,
});
