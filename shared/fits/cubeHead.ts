import { Problem } from '@/shared/contract/problem';
import { buildWcs } from '@/shared/sky/wcs';
import { WcsError, type SkyFrame, type VelocityConvention, type WcsSpec } from '@/shared/sky/wcsSpec';
import { beamOf, unitOfBrightness, type Beam } from './brightness';
import { axisLengths, cubeAxes, required, type CubeAxes } from './cubeAxes';
import { Header } from './header';
import { linearStep } from './linearStep';
import { skyOfHeader } from './skyHeader';
import { spectralOfHeader } from './spectralHeader';

export type { Beam };

export type Bitpix = 8 | 16 | 32 | 64 | -32 | -64;

export interface HeaderCard {
  keyword: string;
  /** As a person reads it: text without quotes, numbers as the file writes them; null for a card without value. */
  value: string | null;
  comment: string;
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
  const header = new Header(headerBytes);
  const cautions: string[] = [];
  requireImage(header);
  const bitpix = bitpixOf(header);
  const naxis = axisLengths(header);
  const data = dataExtent(naxis, bitpix, headerOffset + headerBytes.length, fileSize);
  const axes = cubeAxes(header, naxis);
  const wcs = wcsOf(header, axes, cautions);
  const beam = beamOf(header);
  const { spectral } = wcs;
  const { velocityOf } = usable(() => buildWcs(wcs), axes, header);
  const velocities: [number, number] = [velocityOf(0), velocityOf(spectral.channels - 1)];
  const extra = naxis.findIndex(
    (n, i) => n > 1 && ![axes.longitude, axes.latitude, axes.spectral].includes(i),
  );
  if (extra >= 0) cautions.push(`Axis ${extra + 1} has ${naxis[extra]} planes; the first is read.`);
  return {
    shape: { nx: naxis[axes.longitude]!, ny: naxis[axes.latitude]!, channels: naxis[axes.spectral]! },
    hdu,
    bitpix,
    ...scaling(header, bitpix, cautions),
    unit: unitOfBrightness(header, beam, cautions),
    bunit: header.text('BUNIT'),
    object: header.text('OBJECT'),
    ...data,
    layout: { naxis, longitude: axes.longitude, latitude: axes.latitude, spectral: axes.spectral },
    beam,
    frame: wcs.sky.frame,
    equinox: wcs.sky.equinox,
    projection: wcs.sky.projection,
    spectral: {
      ctype: axes.spectralType,
      type: spectral.type,
      convention: spectral.convention,
      frame: spectral.frame,
      restFrequencyHz: spectral.restAssumed ? null : spectral.restFrequencyHz,
      assumedRestFrequencyHz: spectral.restAssumed ? spectral.restFrequencyHz : null,
      velocities,
    },
    wcs,
    cautions: [...cautions, ...header.cautions],
    cards: header.cards.map(({ keyword, value, field, comment }) => ({
      keyword,
      value: value === null ? null : typeof value === 'string' ? value : field,
      comment,
    })),
  };
}

function requireImage(header: Header): void {
  if (header.logical('SIMPLE') === false) {
    throw new Problem(
      'fits-card',
      'SIMPLE = F: the file says itself that it does not follow the FITS standard.',
      {
        card: 'SIMPLE',
      },
    );
  }
  const extension = header.text('XTENSION');
  if (header.logical('ZIMAGE') === true) {
    throw new Problem(
      'fits-shape',
      'The image is tile-compressed, which is not read yet: expand it first (for example with funpack) and send the result.',
      { card: 'ZIMAGE' },
    );
  }
  if (extension !== null && extension !== 'IMAGE') {
    throw new Problem('fits-shape', `This part of the file is a table (${extension}), not an image.`, {
      card: 'XTENSION',
    });
  }
  if (header.logical('GROUPS') === true && header.integer('NAXIS1') === 0) {
    throw new Problem('fits-shape', 'The file holds random groups (visibilities), not an image.', {
      card: 'GROUPS',
    });
  }
}

function bitpixOf(header: Header): Bitpix {
  const bitpix = required(header, 'BITPIX');
  if (![8, 16, 32, 64, -32, -64].includes(bitpix)) {
    throw new Problem('fits-card', `BITPIX must be 8, 16, 32, 64, -32 or -64; the header says ${bitpix}.`, {
      card: 'BITPIX',
    });
  }
  return bitpix as Bitpix;
}

/** Where the pixels lie; nothing of that size is allocated here. */
function dataExtent(naxis: number[], bitpix: Bitpix, dataOffset: number, fileSize: number | undefined) {
  if (naxis.length === 0) {
    throw new Problem('fits-shape', 'The file has a header and no image (NAXIS = 0).', { card: 'NAXIS' });
  }
  const empty = naxis.indexOf(0);
  if (empty >= 0) {
    const card = `NAXIS${empty + 1}`;
    throw new Problem('fits-card', `${card} = 0: the image has no pixels.`, { card });
  }
  const dataBytes = naxis.reduce((product, n) => product * n, Math.abs(bitpix) / 8);
  if (fileSize !== undefined && dataOffset + dataBytes > fileSize) {
    const missingBytes = dataOffset + dataBytes - fileSize;
    throw new Problem(
      'fits-truncated',
      `The header declares ${dataBytes} bytes of data after byte ${dataOffset}; the file ends ${missingBytes} bytes too early. Send the whole file.`,
      { missingBytes },
    );
  }
  if (!Number.isSafeInteger(dataOffset + dataBytes)) {
    throw new Problem(
      'fits-card',
      `The axes declare ${dataBytes.toPrecision(2)} bytes, more than any file has.`,
      { card: 'NAXIS' },
    );
  }
  return { dataOffset, dataBytes };
}

function scaling(header: Header, bitpix: Bitpix, cautions: string[]) {
  const bscale = header.number('BSCALE') ?? 1;
  if (bscale === 0) {
    throw new Problem('fits-card', 'BSCALE = 0: all pixels would have one value.', { card: 'BSCALE' });
  }
  if (bitpix < 0 && header.has('BLANK'))
    cautions.push('BLANK has no meaning for floating-point pixels and is ignored.');
  return {
    bscale,
    bzero: header.number('BZERO') ?? 0,
    blank: bitpix > 0 ? (header.wideInteger('BLANK')?.toString() ?? null) : null,
  };
}

function wcsOf(header: Header, axes: CubeAxes, cautions: string[]): WcsSpec {
  const step = linearStep(header, axes, cautions);
  return {
    version: 1,
    sky: skyOfHeader(header, axes, step, cautions),
    spectral: spectralOfHeader(header, axes, step, cautions),
  };
}

/** Run a step of shared/sky, with its errors turned into problems that name the card as this file writes it. */
function usable<T>(step: () => T, axes: CubeAxes, header: Header): T {
  try {
    return step();
  } catch (error) {
    if (!(error instanceof WcsError)) throw error;
    const hasCd = header.has(`CD${axes.longitude + 1}_${axes.longitude + 1}`);
    const names: Record<string, string> = {
      CTYPE: `CTYPE${axes.longitude + 1}`,
      CRVAL: `CRVAL${axes.latitude + 1}`,
      CDELT: `CDELT${axes.spectral + 1}`,
      SPECTRAL: `CRVAL${axes.spectral + 1}`,
      CD: `${hasCd ? 'CD' : 'PC'}${axes.longitude + 1}_${axes.longitude + 1}`,
      PV2_1: `PV${axes.latitude + 1}_1`,
    };
    throw new Problem('fits-card', error.message, { card: names[error.card] ?? error.card });
  }
}
