import type { WcsSpec, VelocityConvention, SkyFrame } from '@/shared/sky/wcsSpec';

export type Bitpix = 8 | 16 | 32 | 64 | -32 | -64;

export interface HeaderCard {
  keyword: string;
  /** As a person reads it: text without quotes, numbers as the file writes them; null for a card without value. */
  value: string | null;
  comment: string;
}

export interface Beam {
  majorDeg: number;
  minorDeg: number;
  /** From north through east. */
  positionAngleDeg: number;
  source: 'keywords' | 'history';
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
  /** Bytes from the start of the file to the first pixel, and bytes of pixels (padding not counted). */
  dataOffset: number;
  dataBytes: number;
  /** Lengths of all axes in the file's order, and which of them (from 0) is which. */
  layout: { naxis: number[]; longitude: number; latitude: number; spectral: number };
  beam: Beam | null;
  frame: SkyFrame;
  equinox: number | null;
  projection: string;
  spectral: {
    ctype: string;
    type: string;
    convention: VelocityConvention | null;
    frame: string | null;
    /** As the header says; null when it does not (spectral.assumedRestFrequencyHz then says what was taken). */
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

/**
 * Describe the cube whose header these bytes are (whole 2880-byte blocks up to and with END).
 *
 * @param headerBytes  one header, from SIMPLE or XTENSION on
 * @param fileSize     bytes of the whole file; when given, a file too short for its data is refused
 * @param headerOffset where the header starts in the file, bytes
 * @param hdu          which HDU it is, from 0
 * @throws Problem not-fits, fits-card (names the card), fits-shape, fits-truncated (names the missing bytes)
 */
export function describeCube(
  headerBytes: Uint8Array,
  fileSize?: number,
  headerOffset = 0,
  hdu = 0,
): CubeHead {
  throw new Error(`not yet: ${headerBytes.length} ${fileSize} ${headerOffset} ${hdu}`);
}
